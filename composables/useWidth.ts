import type { ShallowRef } from 'vue'

/**
 * Width in pixels of an element, so that a drawing can be redrawn for it. `before` is what the server and the first paint
 * draw for.
 */
export function useWidth(element: Readonly<ShallowRef<HTMLElement | null>>, before = 720) {
  const width = ref(before)
  onMounted(() => {
    const target = element.value
    if (!target) return
    const take = (measured: number) => {
      // A hidden drawing has no width; keep the last good one.
      if (measured > 0) width.value = Math.round(measured)
    }
    take(target.clientWidth)
    const observer = new ResizeObserver(([entry]) => entry && take(entry.contentRect.width))
    observer.observe(target)
    onBeforeUnmount(() => observer.disconnect())
  })
  return width
}
