import type { ComputedRef, InjectionKey, MaybeRefOrGetter, Ref } from 'vue'
import { nearest } from '~/utils/drawing/axis'

/**
 * The one frame that every drawing of a page looks at. A pointer passing over a drawing shows its frame for as long as it is
 * there; a click, a key or a link pins it.
 */
export interface FrameCursor {
  frames: ComputedRef<readonly number[]>
  /** The frame looked at: hovered, else pinned, else the first of interest. Null only for an empty list. */
  frame: ComputedRef<number | null>
  /** Its position on the list, −1 for an empty one. */
  index: ComputedRef<number>
  /** The frame that was chosen on purpose: what belongs into a link. */
  pinned: Readonly<Ref<number | null>>
  /** Pins the drawing nearest to `frame`. */
  set: (frame: number) => void
  unpin: () => void
  hover: (frame: number) => void
  leave: () => void
  /** Goes `by` drawings on (or back), stopping at the ends. */
  step: (by: number) => void
  first: () => void
  last: () => void
  /** ←/→, Home/End and PageUp/PageDown (ten drawings) for any drawing that has the focus. */
  onKey: (event: KeyboardEvent) => void
}

const CURSOR: InjectionKey<FrameCursor> = Symbol('frame cursor')

/** Makes the page's cursor and shares it with everything inside. `interest` is where it starts while nothing is pinned. */
export function provideFrameCursor(
  frames: MaybeRefOrGetter<readonly number[]>,
  options: { pinned?: number | null; interest?: MaybeRefOrGetter<number | null | undefined> } = {},
): FrameCursor {
  const cursor = makeCursor(frames, options)
  provide(CURSOR, cursor)
  return cursor
}

/** The page's cursor; a drawing that stands alone gets one of its own over `frames`. */
export function useFrameCursor(frames: MaybeRefOrGetter<readonly number[]> = []): FrameCursor {
  return inject(CURSOR, () => makeCursor(frames, {}), true)
}

function makeCursor(
  source: MaybeRefOrGetter<readonly number[]>,
  options: { pinned?: number | null; interest?: MaybeRefOrGetter<number | null | undefined> },
): FrameCursor {
  const frames = computed(() => toValue(source))
  const pinned = ref<number | null>(options.pinned ?? null)
  const hovered = ref<number | null>(null)
  const index = computed(() => {
    const wanted = hovered.value ?? pinned.value ?? toValue(options.interest) ?? frames.value[0]
    return wanted === undefined ? -1 : nearest(frames.value, wanted)
  })
  const frame = computed(() => frames.value[index.value] ?? null)
  const at = (position: number) => frames.value[Math.min(Math.max(position, 0), frames.value.length - 1)]

  function set(wanted: number) {
    hovered.value = null
    pinned.value = frames.value[nearest(frames.value, wanted)] ?? null
  }
  function goTo(position: number) {
    const there = at(position)
    if (there !== undefined) set(there)
  }
  const step = (by: number) => goTo(index.value + by)
  const first = () => goTo(0)
  const last = () => goTo(frames.value.length - 1)
  const moves: Record<string, () => void> = {
    ArrowRight: () => step(1),
    ArrowUp: () => step(1),
    ArrowLeft: () => step(-1),
    ArrowDown: () => step(-1),
    PageUp: () => step(10),
    PageDown: () => step(-10),
    Home: first,
    End: last,
  }
  return {
    frames,
    frame,
    index,
    pinned: readonly(pinned),
    set,
    unpin: () => (pinned.value = null),
    hover: (wanted) => (hovered.value = wanted),
    leave: () => (hovered.value = null),
    step,
    first,
    last,
    onKey: (event) => {
      const move = event.altKey || event.ctrlKey || event.metaKey ? undefined : moves[event.key]
      if (!move) return
      event.preventDefault()
      move()
    },
  }
}
