import type { MaybeRefOrGetter } from 'vue'

/**
 * A text that survives a reload until it is sent: `clear()` it then. Kept in this browser under `key`, which should name
 * the place and the person. Empty on the server and on the first paint, so that both agree.
 */
export function useKeptText(key: MaybeRefOrGetter<string>) {
  const text = ref('')
  const name = computed(() => `tiltyard:text:${toValue(key)}`)
  const store = () => {
    try {
      return window.localStorage
    } catch {
      // Storage may be switched off: then a reload loses what was typed, and nothing else.
      return null
    }
  }
  onMounted(() => {
    watch(name, (now) => (text.value = store()?.getItem(now) ?? ''), { immediate: true, flush: 'sync' })
    watch(text, (now) => {
      if (now === '') store()?.removeItem(name.value)
      else store()?.setItem(name.value, now)
    })
  })
  return { text, clear: () => (text.value = '') }
}
