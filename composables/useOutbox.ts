import type { MaybeRefOrGetter } from 'vue'
import { useOutboxStore } from '~/stores/outbox'
import { useSessionStore } from '~/stores/session'
import { useShotStore } from '~/stores/shot'
import type { Thread } from '~/utils/contracts/thread'
import type { Pin, Unsent } from '~/utils/outbox'

/**
 * Comments of one shot that were written here and are not on the server's list yet. They survive a reload and go out
 * again under the same id; show `unsent` after the server's own comments, each with its `state`.
 *
 * `threads`: the server's list as the page holds it, the shot store's unless told otherwise; whatever of one's own appears
 * there leaves `unsent`.
 */
export function useOutbox(
  production: MaybeRefOrGetter<string>,
  code: MaybeRefOrGetter<string>,
  threads: () => readonly Thread[] | undefined = threadsOnScreen(),
) {
  const store = useOutboxStore()
  const session = useSessionStore()
  const ready = ref(false)

  const ofShot = computed<Unsent[]>(() =>
    store.list.filter((entry) => entry.production === toValue(production) && entry.code === toValue(code)),
  )

  onMounted(() => {
    // What the page's own list holds must be known before anything is sent a second time.
    watch(threads, settle, { immediate: true })
    watch(() => store.list, () => settle(threads()))
    store.open()
    ready.value = true
  })
  function settle(shown: readonly Thread[] | undefined) {
    const me = session.me?.id
    const mine = (shown ?? []).flatMap(({ comments }) => comments).filter(({ by }) => by.id === me)
    if (mine.length > 0) store.seen(new Set(mine.map(({ clientId }) => clientId)))
  }

  return {
    /** Empty on the first paint, so that server and browser agree. */
    unsent: computed<Unsent[]>(() => (ready.value ? ofShot.value : [])),
    /** Those that answer in a thread, in the order they were written. */
    unsentIn: (thread: string) => (ready.value ? ofShot.value.filter(({ to }) => 'thread' in to && to.thread === thread) : []),
    /** Those that open a thread. */
    unsentThreads: computed(() => (ready.value ? ofShot.value.filter(({ to }) => 'pin' in to) : [])),
    answer: (thread: string, body: string) => store.add(toValue(production), toValue(code), { thread }, body),
    openThread: (pin: Pin, body: string) => store.add(toValue(production), toValue(code), { pin }, body),
    /** Sends a refused one again, as it is. */
    retry: store.retry,
    /** Gives one up; answers its text so that it can go back into the field. */
    discard: store.discard,
    /** What is being typed and not sent, by place: `thread:<id>`, `frame:37`, `take:3`. */
    draft: (place: MaybeRefOrGetter<string>) =>
      useKeptText(() => `${toValue(production)}:${toValue(code)}:${toValue(place)}:${session.me?.id}`),
  }
}

function threadsOnScreen(): () => readonly Thread[] | undefined {
  const shot = useShotStore()
  return () => shot.page?.threads
}
