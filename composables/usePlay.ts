/** A breath at the end before it starts over. */
const REST_SECONDS = 0.7

/**
 * The clock of Play: whole frames from 0 to `last` at the true rate, over and over. It runs by itself once on screen, never
 * where the person asked their system for less motion: there it waits to be started by hand, and stops when they ask meanwhile.
 */
export function usePlay(last: () => number, fps: () => number) {
  const frame = ref(0)
  const playing = ref(false)
  let waiting = 0
  let began = 0

  function tick(now: number) {
    const passed = ((now - began) / 1000) * fps()
    const round = last() + 1 + REST_SECONDS * fps()
    if (passed >= round) began = now
    frame.value = passed >= round ? 0 : Math.max(0, Math.min(Math.floor(passed), last()))
    waiting = requestAnimationFrame(tick)
  }
  function play() {
    if (playing.value) return
    playing.value = true
    if (frame.value >= last()) frame.value = 0
    began = performance.now() - (frame.value / fps()) * 1000
    waiting = requestAnimationFrame(tick)
  }
  function pause() {
    playing.value = false
    cancelAnimationFrame(waiting)
  }
  /** Goes to a frame and stays there. */
  function seek(to: number) {
    pause()
    frame.value = Math.max(0, Math.min(Math.round(to), last()))
  }
  watch([last, fps], () => {
    frame.value = Math.min(frame.value, last())
    if (playing.value) began = performance.now() - (frame.value / fps()) * 1000
  })
  onMounted(() => {
    const calm = matchMedia('(prefers-reduced-motion: reduce)')
    const heed = () => calm.matches && pause()
    if (!calm.matches) play()
    calm.addEventListener('change', heed)
    onBeforeUnmount(() => calm.removeEventListener('change', heed))
  })
  onBeforeUnmount(pause)
  return { frame, playing, play, pause, seek, toggle: () => (playing.value ? pause() : play()), step: (by: number) => seek(frame.value + by) }
}
