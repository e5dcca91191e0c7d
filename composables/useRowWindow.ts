import type { MaybeRefOrGetter, ShallowRef } from 'vue'

/**
 * Which rows of a long table to draw: those in sight of its scrolling region and some more at either side. Short tables are
 * drawn whole, and so is every table when the page is printed.
 */
export function useRowWindow(
  region: Readonly<ShallowRef<HTMLElement | null>>,
  count: MaybeRefOrGetter<number>,
  { rowHeight, wholeUpTo, spare = 20, firstPaint = 30 }: { rowHeight: number; wholeUpTo: number; spare?: number; firstPaint?: number },
) {
  const windowed = computed(() => toValue(count) > wholeUpTo && !printing.value)
  const printing = ref(false)
  const scrolled = ref(0)
  const inSight = ref(firstPaint)

  const from = computed(() => (windowed.value ? Math.max(0, Math.min(scrolled.value, toValue(count)) - spare) : 0))
  const to = computed(() =>
    windowed.value ? Math.min(toValue(count), scrolled.value + inSight.value + spare) : toValue(count),
  )

  function measure() {
    const element = region.value
    if (!element) return
    scrolled.value = Math.floor(element.scrollTop / rowHeight)
    inSight.value = Math.ceil(element.clientHeight / rowHeight)
  }
  /**
   * Scrolls the region just far enough to bring a row into it; the page itself stays where it is. `above` is what lies over the
   * first row in pixels, `head` the part of it that stays in sight.
   */
  function reveal(index: number, above: number, head: number) {
    const element = region.value
    if (!element || index < 0) return
    const top = above + index * rowHeight
    if (top < element.scrollTop + head) element.scrollTop = top - head
    else if (top + rowHeight > element.scrollTop + element.clientHeight) element.scrollTop = top + rowHeight - element.clientHeight
    measure()
  }

  onMounted(() => {
    measure()
    const before = () => (printing.value = true)
    const after = () => (printing.value = false)
    addEventListener('beforeprint', before)
    addEventListener('afterprint', after)
    onBeforeUnmount(() => {
      removeEventListener('beforeprint', before)
      removeEventListener('afterprint', after)
    })
  })
  return { from, to, windowed, measure, reveal }
}
