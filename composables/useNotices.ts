export interface Notice {
  id: number
  text: string
  /** A problem stays until it is put away; plain news leaves by itself. */
  kind: 'news' | 'problem'
}

const STAYS_MS = 8_000
const LEFT = 'tiltyard:notice'

/** Leaves a word for the page that comes after a full load, where nothing else survives. */
export function leaveNotice(text: string) {
  try {
    sessionStorage.setItem(LEFT, text)
  } catch {
    // A browser that keeps nothing: the word is lost, the way on is not.
  }
}
/** What the page before left, once. */
export function takeLeftNotice(): string | null {
  try {
    const text = sessionStorage.getItem(LEFT)
    sessionStorage.removeItem(LEFT)
    return text
  } catch {
    return null
  }
}

/** Short words at the foot of the page, read out politely. `say` from anywhere in the browser; UiNotices shows them. */
export function useNotices() {
  const notices = useState<Notice[]>('notices', () => [])
  const held = useState<boolean>('notices-held', () => false)

  function dismiss(id: number) {
    notices.value = notices.value.filter((notice) => notice.id !== id)
  }
  function leaveLater(id: number) {
    setTimeout(() => (held.value ? leaveLater(id) : dismiss(id)), STAYS_MS)
  }
  function say(text: string, kind: Notice['kind'] = 'news') {
    if (import.meta.server) return
    const id = Math.max(0, ...notices.value.map((notice) => notice.id)) + 1
    // Saying the same thing twice at once helps nobody.
    notices.value = [...notices.value.filter((notice) => notice.text !== text), { id, text, kind }].slice(-4)
    if (kind === 'news') leaveLater(id)
  }
  return {
    notices: readonly(notices),
    say,
    problem: (text: string) => say(text, 'problem'),
    dismiss,
    hold: () => (held.value = true),
    release: () => (held.value = false),
  }
}
