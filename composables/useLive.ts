import type { MaybeRefOrGetter } from 'vue'
import type { Presence, ProductionEvent } from '~/utils/contracts/event'
import { useLiveStore } from '~/stores/live'

export interface LiveHandlers {
  /** The page payload's `eventNumber`; while it is undefined (still loading) nothing is followed. */
  after: MaybeRefOrGetter<number | undefined>
  /**
   * Hears every event after that number once, in order. The page may have loaded again meanwhile and hold some of them
   * already: adding a comment that is there must change nothing.
   */
  event: (event: ProductionEvent) => void
  /** Code of the shot on this screen, so that others see who looks at it. */
  shot?: MaybeRefOrGetter<string | null>
}

/**
 * Follows a production while the component is mounted. Nothing happens on the server, where the state is `connecting`.
 *
 * `state`: `live`; `connecting` for a moment; `offline` when that lasts. `heardAt`: when this page last knew everything
 * (ISO 8601, null before the first time): "offline: showing what was here at 10:42". `lookers`: who has which shot on
 * screen, oneself included. `catchUp()`: asks now, for instance right after a write; true when all is known.
 */
export function useLive(production: MaybeRefOrGetter<string>, handlers: LiveHandlers) {
  const store = useLiveStore()
  const slug = computed(() => toValue(production))
  const ready = computed(() => toValue(handlers.after) !== undefined)
  let stop: (() => void) | null = null
  let catchUp: (() => Promise<boolean>) | null = null

  function end() {
    stop?.()
    stop = catchUp = null
  }
  function begin() {
    end()
    const after = toValue(handlers.after)
    if (after === undefined) return
    const follower = store.follow({
      production: slug.value,
      after,
      event: (event) => handlers.event(event),
      shot: () => toValue(handlers.shot) ?? null,
    })
    stop = follower.stop
    catchUp = follower.catchUp
  }

  onMounted(() => {
    // A newer payload changes `after`, but the follower has its own number by then: only the first one counts.
    watch([slug, ready], begin, { immediate: true })
    watch(() => toValue(handlers.shot), () => store.lookAgain())
  })
  onBeforeUnmount(end)

  return {
    state: computed(() => store.state),
    heardAt: computed(() => store.heardAt),
    lookers: computed<Presence['lookers']>(() => store.lookersOf(slug.value)),
    catchUp: () => catchUp?.() ?? Promise.resolve(false),
  }
}
