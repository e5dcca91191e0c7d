import type { FrameCursor } from '~/composables/useFrameCursor'

/**
 * Keeps the address in step with the chosen frame, so that it can be sent to somebody: `?take=3&frame=37`. Quietly: no
 * history entry and no navigation. A link that comes in, or Back, sets the frame.
 */
export function useAddressFrame(cursor: FrameCursor, take: () => number | null) {
  const route = useRoute()
  const asked = computed(() => {
    const frame = route.query.frame
    return typeof frame === 'string' && /^-?\d{1,8}$/.test(frame) ? Number(frame) : null
  })
  watch(asked, (frame) => frame !== null && cursor.set(frame))

  onMounted(() => {
    watch(cursor.pinned, (frame) => {
      const address = new URL(window.location.href)
      address.searchParams.delete('frame')
      if (frame !== null) {
        // A frame alone would mean another drawing once a newer take is there.
        if (take() !== null) address.searchParams.set('take', String(take()))
        address.searchParams.set('frame', String(frame))
      }
      // The router keeps its own notes in the state: they stay, under the new address.
      window.history.replaceState({ ...window.history.state, current: address.pathname + address.search + address.hash }, '', address)
    })
  })
  return { asked }
}
