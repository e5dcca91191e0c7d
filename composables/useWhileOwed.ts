/**
 * Looks again every few seconds while `owed` holds and the page is seen: letters change by themselves, and nobody should have
 * to reload to learn that one was sent.
 */
export function useWhileOwed(owed: () => boolean, look: () => Promise<unknown>, everyMs = 4_000) {
  onMounted(() => {
    const timer = setInterval(() => {
      if (owed() && document.visibilityState === 'visible') void look()
    }, everyMs)
    onBeforeUnmount(() => clearInterval(timer))
  })
}
