import { v4 as uuid } from 'uuid'
import { draftKey, readDraft } from '~/utils/posting/draft'
import type { TakeDraft } from '~/utils/posting/draft'
import type { Row } from '~/utils/posting/rows'

const SAVE_AFTER_MS = 250
const STEPS_BACK = 20

/**
 * The list being written: kept in this browser while it grows, with a way back from every big change (a paste, a fill, a
 * start from another list). Empty until mounted: the server has no draft.
 */
export function useTakeDraft(production: string, code: string, person: string) {
  const rows = shallowRef<Row[]>([])
  const note = ref('')
  const clientId = ref('')
  /** When the draft on screen was last kept; null for a new one. */
  const savedAt = ref<string | null>(null)
  const loaded = ref(false)
  const undoable = shallowRef<{ rows: Row[]; what: string }[]>([])
  const key = draftKey(production, code, person)
  let timer: ReturnType<typeof setTimeout> | null = null
  let stored = true

  function load() {
    const draft = readDraft(read())
    rows.value = draft?.rows ?? []
    note.value = draft?.note ?? ''
    clientId.value = draft?.clientId ?? uuid()
    savedAt.value = draft?.savedAt ?? null
    loaded.value = true
  }
  function read(): string | null {
    try {
      return localStorage.getItem(key)
    } catch {
      stored = false
      return null
    }
  }
  function save() {
    timer = null
    if (!stored) return
    try {
      if (rows.value.length === 0 && note.value === '') return localStorage.removeItem(key)
      const draft: TakeDraft = { v: 2, clientId: clientId.value, rows: rows.value, note: note.value, savedAt: new Date().toISOString() }
      localStorage.setItem(key, JSON.stringify(draft))
    } catch {
      // A full or closed storage must not stop anyone from writing: the list is still on screen.
      stored = false
    }
  }
  function saveSoon() {
    timer ??= setTimeout(save, SAVE_AFTER_MS)
  }

  /** Replaces the whole list, and remembers the one before for `undo`. */
  function replace(next: Row[], what: string) {
    undoable.value = [...undoable.value, { rows: rows.value, what }].slice(-STEPS_BACK)
    rows.value = next
  }
  function undo() {
    const last = undoable.value.at(-1)
    if (!last) return
    undoable.value = undoable.value.slice(0, -1)
    rows.value = last.rows
  }
  /** After the take is posted, or thrown away: the next one is another take. */
  function clear() {
    rows.value = []
    note.value = ''
    clientId.value = uuid()
    undoable.value = []
    if (timer) clearTimeout(timer)
    save()
  }

  onMounted(() => {
    load()
    watch([rows, note], saveSoon)
    addEventListener('pagehide', save)
  })
  onBeforeUnmount(() => {
    if (timer) {
      clearTimeout(timer)
      save()
    }
    removeEventListener('pagehide', save)
  })
  return { rows, note, clientId, savedAt, loaded, undoable, replace, undo, clear }
}
