import { defineStore } from 'pinia'
import { v7 as uuid } from 'uuid'
import { useLiveStore } from '~/stores/live'
import { useSessionStore } from '~/stores/session'
import { shotPath } from '~/stores/shot'
import { Outbox } from '~/utils/outbox'
import type { Pin, Sending, Unsent } from '~/utils/outbox'
import { refusedBy } from '~/utils/refusal'

const SEND_WITHIN = 15_000

/**
 * Comments that were written here and are not on the server's list yet, of the person who is signed in and of all
 * shots: what is kept on one page is sent from any other that is live.
 */
export const useOutboxStore = defineStore('outbox', () => {
  const list = shallowRef<Unsent[]>([])
  const session = useSessionStore()
  const live = useLiveStore()
  let outbox: Outbox | null = null
  let owner: string | null = null

  /** Opens the outbox of whoever is signed in; in the browser only, and once. */
  function open(): Outbox | null {
    const me = session.me?.id ?? null
    if (outbox && owner === me) return outbox
    outbox?.close()
    outbox = null
    list.value = []
    if (me === null) return null
    if (owner === null) listen()
    owner = me
    outbox = new Outbox({ prefix: prefixOf(me), storage: storage(), send, changed: (now) => (list.value = now), later })
    void outbox.flush()
    return outbox
  }

  function listen(): void {
    // Entries that another window of the same person's wrote or sent.
    window.addEventListener('storage', ({ key }) => {
      if (owner !== null && (key === null || key.startsWith(prefixOf(owner)))) outbox?.reload()
    })
    window.addEventListener('online', () => void outbox?.flush())
    watch(() => live.state, (now) => now === 'live' && void outbox?.flush())
  }

  async function send({ production, code, to, clientId, body }: Omit<Unsent, 'state'>): Promise<Sending> {
    const threads = `${shotPath(production, code)}/threads`
    const comment = { clientId, body }
    const [address, whole] =
      'thread' in to ? [`${threads}/${to.thread}/comments`, comment] : [threads, { clientId: to.opens, ...to.pin, comment }]
    try {
      await $fetch<unknown>(address, { method: 'POST', body: whole, retry: 0, timeout: SEND_WITHIN })
      // Over a live line the news of it is already on its way.
      if (live.state !== 'live') void live.catchUp()
      return 'done'
    } catch (problem) {
      const { statusCode, message } = refusedBy(problem)
      // No answer, a server in trouble, too much at once, signed out: each passes. Anything else is a refusal.
      const passes = statusCode < 400 || statusCode >= 500 || [401, 408, 429].includes(statusCode)
      return passes ? 'later' : { refused: message }
    }
  }

  function add(production: string, code: string, to: { thread: string } | { pin: Pin }, body: string): void {
    const at = new Date().toISOString()
    open()?.add({ clientId: uuid(), production, code, body, at, to: 'pin' in to ? { opens: uuid(), pin: to.pin } : to })
  }

  return {
    list: computed(() => list.value),
    open,
    add,
    retry: (clientId: string) => void open()?.retry(clientId),
    discard: (clientId: string) => open()?.discard(clientId) ?? null,
    seen: (ids: ReadonlySet<string>) => open()?.seen(ids),
  }
})

const prefixOf = (person: string) => `tiltyard:unsent:${person}:`

function storage(): Storage | null {
  try {
    return window.localStorage
  } catch {
    // Storage may be switched off: then a reload loses what was not sent, and nothing else.
    return null
  }
}
function later(task: () => void, ms: number): () => void {
  const timer = setTimeout(task, ms)
  return () => clearTimeout(timer)
}
