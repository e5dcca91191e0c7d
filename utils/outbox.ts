import { z } from 'zod'
import { clientId, LIMITS, shotCode, slug } from '~/utils/contracts/common'

const pin = z.object({ take: z.number().nullable(), fromFrame: z.number().nullable(), toFrame: z.number().nullable() })
/** Where a new thread is pinned: a take, a frame or a run of frames. */
export type Pin = z.infer<typeof pin>

const kept = z.object({
  v: z.literal(1),
  /** The comment's own id, made here once: sending it again under the same id stores it once. */
  clientId,
  production: slug,
  code: shotCode,
  body: z.string().min(1).max(LIMITS.commentChars * 2),
  /** ISO 8601. */
  at: z.string(),
  /** Answers in this thread of the server's, or opens one under an id of its own. */
  to: z.union([z.object({ thread: z.string() }), z.object({ opens: clientId, pin })]),
  /** What the server said against it; until somebody changes their mind it is not sent again. */
  problem: z.string().nullable(),
})
type Kept = z.infer<typeof kept>

/**
 * A comment written here that the server's list does not show yet. `waiting`: for the line or for its turn; `sending`;
 * `sent`: answered for, and about to be seen; `failed`: refused, with the `problem` to read.
 */
export interface Unsent extends Kept {
  state: 'waiting' | 'sending' | 'sent' | 'failed'
}

/** What the server says of a sending: `later` when it may yet work, otherwise the sentence of its refusal. */
export type Sending = 'done' | 'later' | { refused: string }

interface Ports {
  /** Entries of one person begin with this. */
  prefix: string
  storage: Pick<Storage, 'getItem' | 'setItem' | 'removeItem' | 'key' | 'length'> | null
  send: (unsent: Kept) => Promise<Sending>
  /** The list is another one now. */
  changed: (list: Unsent[]) => void
  /** Runs the task after some milliseconds; answers how to call it off. */
  later: (task: () => void, ms: number) => () => void
}

const FIRST_WAIT = 1_000
const LONGEST_WAIT = 30_000

/**
 * Comments on their way. Each is kept in the browser's storage, under a key of its own so that two windows do not write
 * over each other, until the server has answered for it. One goes at a time, in the order they were written.
 */
export class Outbox {
  #list: Unsent[] = []
  #flushing: Promise<void> | null = null
  #wait = FIRST_WAIT
  #callOff: (() => void) | null = null
  #closed = false

  constructor(private readonly ports: Ports) {
    this.reload()
  }

  get list(): readonly Unsent[] {
    return this.#list
  }

  /** Reads the storage again: at the start, and when another window has changed it. */
  reload(): void {
    const stored = new Map(this.#read().map((entry) => [entry.clientId, entry]))
    // What is not stored any more was sent or given up in another window; what is under way here is ours to finish.
    const stays = this.#list.filter(({ clientId, state }) => stored.has(clientId) || state === 'sending' || state === 'sent')
    const known = new Set(stays.map(({ clientId }) => clientId))
    const fresh = [...stored.values()].filter(({ clientId }) => !known.has(clientId))
    this.#set([...stays, ...fresh.map((entry) => ({ ...entry, state: entry.problem ? ('failed' as const) : ('waiting' as const) }))])
  }

  /** Keeps a comment and sends it as soon as its turn comes. */
  add(entry: Omit<Kept, 'v' | 'problem'>): void {
    const made: Kept = { v: 1, ...entry, problem: null }
    this.#keep(made)
    this.#set([...this.#list, { ...made, state: 'waiting' }])
    void this.flush()
  }

  /** Sends what waits, now. Calls that come while one is under way share it. */
  flush(): Promise<void> {
    this.#callOff?.()
    this.#callOff = null
    this.#flushing ??= this.#sendAll().finally(() => (this.#flushing = null))
    return this.#flushing
  }

  /** Somebody wants a refused one sent again. */
  retry(id: string): Promise<void> {
    const entry = this.#list.find(({ clientId, state }) => clientId === id && state === 'failed')
    if (entry) {
      this.#keep({ ...entry, problem: null })
      this.#change(id, { state: 'waiting', problem: null })
    }
    return this.flush()
  }

  /** Gives one up that is not under way. @returns its text, which belongs back in somebody's hands. */
  discard(id: string): string | null {
    const entry = this.#list.find(({ clientId, state }) => clientId === id && (state === 'failed' || state === 'waiting'))
    if (!entry) return null
    this.#forget(id)
    this.#set(this.#list.filter((each) => each !== entry))
    return entry.body
  }

  /** The server's own list shows these: what stood for them here goes. */
  seen(ids: ReadonlySet<string>): void {
    const gone = this.#list.filter(({ clientId }) => ids.has(clientId))
    if (gone.length === 0) return
    for (const { clientId } of gone) this.#forget(clientId)
    this.#set(this.#list.filter((entry) => !gone.includes(entry)))
  }

  /** Sends nothing any more. What is kept stays kept. */
  close(): void {
    this.#closed = true
    this.#callOff?.()
  }

  async #sendAll(): Promise<void> {
    for (;;) {
      const next = this.#list.find(({ state }) => state === 'waiting')
      if (!next || this.#closed) return
      this.#change(next.clientId, { state: 'sending' })
      const answer = await this.ports.send(next).catch((): Sending => 'later')
      if (answer === 'later') {
        this.#change(next.clientId, { state: 'waiting' })
        return this.#tryLater()
      }
      this.#wait = FIRST_WAIT
      if (answer === 'done') {
        this.#forget(next.clientId)
        this.#change(next.clientId, { state: 'sent' })
      } else if (this.#list.some(({ clientId }) => clientId === next.clientId)) {
        // Only this one's own place changes: whatever came from the server meanwhile stays as it is.
        this.#keep({ ...next, problem: answer.refused })
        this.#change(next.clientId, { state: 'failed', problem: answer.refused })
      }
    }
  }
  #tryLater(): void {
    if (this.#closed) return
    this.#callOff?.()
    this.#callOff = this.ports.later(() => void this.flush(), this.#wait)
    this.#wait = Math.min(this.#wait * 2, LONGEST_WAIT)
  }

  #set(list: Unsent[]): void {
    // Ids are made in the order of time.
    this.#list = list.sort((a, b) => (a.clientId < b.clientId ? -1 : 1))
    this.ports.changed([...this.#list])
  }
  #change(id: string, change: Partial<Unsent>): void {
    this.#set(this.#list.map((entry) => (entry.clientId === id ? { ...entry, ...change } : entry)))
  }
  #keep({ v, clientId, production, code, body, at, to, problem }: Kept): void {
    const text = JSON.stringify({ v, clientId, production, code, body, at, to, problem } satisfies Kept)
    try {
      this.ports.storage?.setItem(this.ports.prefix + clientId, text)
    } catch {
      // Full or forbidden: the comment is still sent, it only would not survive a reload.
    }
  }
  #forget(id: string): void {
    this.ports.storage?.removeItem(this.ports.prefix + id)
  }
  #read(): Kept[] {
    const { storage, prefix } = this.ports
    const keys = Array.from({ length: storage?.length ?? 0 }, (_, i) => storage?.key(i) ?? '').filter((key) => key.startsWith(prefix))
    return keys.flatMap((key) => {
      try {
        return [kept.parse(JSON.parse(storage?.getItem(key) ?? ''))]
      } catch {
        // Of an older make, or somebody else's: it can't be sent, and is not ours to delete.
        return []
      }
    })
  }
}
