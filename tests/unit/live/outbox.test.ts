import { v7 as uuid } from 'uuid'
import { beforeEach, describe, expect, it } from 'vitest'
import { Outbox } from '~/utils/outbox'
import type { Sending, Unsent } from '~/utils/outbox'

/** What a browser keeps; survives the outbox that wrote it, as it survives a reload. */
class Kept {
  readonly entries = new Map<string, string>()
  get length() {
    return this.entries.size
  }
  key = (i: number) => [...this.entries.keys()][i] ?? null
  getItem = (key: string) => this.entries.get(key) ?? null
  setItem = (key: string, text: string) => void this.entries.set(key, text)
  removeItem = (key: string) => void this.entries.delete(key)
}

let storage: Kept
let sent: string[]
let answer: (id: string) => Promise<Sending>
let waits: { task: () => void; ms: number; off: boolean }[]
let shown: Unsent[]

function open(prefix = 'tiltyard:unsent:me:', kept: Kept | null = storage) {
  return new Outbox({
    prefix,
    storage: kept,
    changed: (list) => (shown = list),
    send: ({ clientId }) => {
      sent.push(clientId)
      return answer(clientId)
    },
    later: (task, ms) => {
      const wait = { task, ms, off: false }
      waits.push(wait)
      return () => (wait.off = true)
    },
  })
}
const comment = (body = 'The settle reads late.', clientId: string = uuid()) => ({
  clientId,
  production: 'pier',
  code: 'PIR-010',
  body,
  at: '2026-01-01T00:00:00.000Z',
  to: { thread: 'thread-1' },
})
const settle = () => new Promise<void>((resolve) => setImmediate(resolve))
const states = () => shown.map(({ state }) => state)

beforeEach(() => {
  storage = new Kept()
  sent = []
  waits = []
  shown = []
  answer = () => Promise.resolve('done')
})

describe('a comment on its way', () => {
  it('is kept before it is sent, and forgotten by the storage once it is answered for', async () => {
    let release: (said: Sending) => void = () => {}
    answer = () => new Promise((resolve) => (release = resolve))
    const outbox = open()
    const one = comment()
    outbox.add(one)
    expect([...storage.entries.keys()]).toEqual([`tiltyard:unsent:me:${one.clientId}`])
    await settle()
    expect(states()).toEqual(['sending'])
    release('done')
    await settle()
    expect(storage.length).toBe(0)
    expect(states()).toEqual(['sent'])
  })

  it('leaves the list when the server shows it, not before', async () => {
    const outbox = open()
    const one = comment()
    outbox.add(one)
    await settle()
    outbox.seen(new Set([uuid()]))
    expect(shown).toHaveLength(1)
    outbox.seen(new Set([one.clientId]))
    expect(shown).toEqual([])
  })

  it('survives a reload and goes out again under the same id', async () => {
    answer = () => Promise.resolve('later')
    const one = comment()
    open().add(one)
    await settle()
    answer = () => Promise.resolve('done')
    await open().flush()
    expect(sent).toEqual([one.clientId, one.clientId])
    expect(shown).toMatchObject([{ clientId: one.clientId, body: one.body, state: 'sent' }])
  })

  it('is not sent again after a reload when the server shows it already', async () => {
    answer = () => new Promise(() => {})
    const one = comment()
    open().add(one)
    await settle()
    const outbox = open()
    outbox.seen(new Set([one.clientId]))
    await outbox.flush()
    expect(sent).toEqual([one.clientId])
    expect(storage.length).toBe(0)
  })

  it('waits for the one before it, in the order of writing', async () => {
    const outbox = open()
    const three = [comment('1'), comment('2'), comment('3')]
    three.forEach((one) => outbox.add(one))
    await outbox.flush()
    expect(sent).toEqual(three.map(({ clientId }) => clientId))
  })

  it('is tried again after growing waits, and at once when somebody says that the line is back', async () => {
    answer = () => Promise.resolve('later')
    const outbox = open()
    outbox.add(comment())
    for (let i = 0; i < 7; i++) {
      await settle()
      waits.at(-1)?.task()
    }
    await settle()
    expect(waits.map(({ ms }) => ms)).toEqual([1_000, 2_000, 4_000, 8_000, 16_000, 30_000, 30_000, 30_000])
    answer = () => Promise.resolve('done')
    await outbox.flush()
    expect(waits.at(-1)?.off).toBe(true)
    expect(states()).toEqual(['sent'])
  })

  it('counts a sender that throws as no answer', async () => {
    answer = () => Promise.reject(new Error('no line'))
    open().add(comment())
    await settle()
    expect(states()).toEqual(['waiting'])
    expect(storage.length).toBe(1)
  })
})

describe('a refused comment', () => {
  it('stays with the reason, holds up nobody, and is sent again only when asked', async () => {
    const bad = comment('bad')
    const good = comment('good')
    answer = (id) => Promise.resolve(id === bad.clientId ? { refused: 'This thread is settled.' } : 'done')
    const outbox = open()
    outbox.add(bad)
    outbox.add(good)
    await outbox.flush()
    expect(states()).toEqual(['failed', 'sent'])
    expect(shown[0]?.problem).toBe('This thread is settled.')
    await outbox.flush()
    expect(sent).toEqual([bad.clientId, good.clientId])
    answer = () => Promise.resolve('done')
    await outbox.retry(bad.clientId)
    expect(sent.at(-1)).toBe(bad.clientId)
    expect(states()).toEqual(['sent', 'sent'])
  })

  it('is still refused after a reload', async () => {
    answer = () => Promise.resolve({ refused: 'This thread is settled.' })
    open().add(comment())
    await settle()
    await open().flush()
    expect(sent).toHaveLength(1)
    expect(shown).toMatchObject([{ state: 'failed', problem: 'This thread is settled.' }])
  })

  it('gives its text back when it is given up, and takes nothing else along', async () => {
    const bad = comment('my words')
    answer = (id) => Promise.resolve(id === bad.clientId ? { refused: 'No.' } : 'later')
    const outbox = open()
    outbox.add(bad)
    outbox.add(comment('other words'))
    await settle()
    expect(outbox.discard(bad.clientId)).toBe('my words')
    expect(shown).toMatchObject([{ body: 'other words' }])
    expect(storage.length).toBe(1)
  })

  it('cannot be given up while it is under way: it may have arrived', async () => {
    answer = () => new Promise(() => {})
    const outbox = open()
    const one = comment()
    outbox.add(one)
    await settle()
    expect(outbox.discard(one.clientId)).toBeNull()
    expect(states()).toEqual(['sending'])
  })
})

describe('what is kept', () => {
  it('is one person’s: nobody else at this machine sees or sends it', async () => {
    answer = () => Promise.resolve('later')
    open().add(comment())
    await settle()
    sent = []
    const other = open('tiltyard:unsent:you:')
    await other.flush()
    expect(other.list).toEqual([])
    expect(sent).toEqual([])
  })

  it('leaves out what cannot be read, without deleting it', () => {
    storage.setItem('tiltyard:unsent:me:x', '{"v":9}')
    storage.setItem('tiltyard:unsent:me:y', 'not JSON')
    expect(open().list).toEqual([])
    expect(storage.length).toBe(2)
  })

  it('is shared with another window: what that one sent goes here, too, and what it wrote comes', async () => {
    answer = () => Promise.resolve('later')
    const here = open()
    const one = comment('1')
    here.add(one)
    await settle()
    const there = open()
    answer = () => Promise.resolve('done')
    await there.flush()
    answer = () => new Promise(() => {})
    there.add(comment('2'))
    here.reload()
    expect(here.list.map(({ body }) => body)).toEqual(['2'])
  })

  it('is not needed for sending', async () => {
    const outbox = open('tiltyard:unsent:me:', null)
    outbox.add(comment())
    await outbox.flush()
    expect(states()).toEqual(['sent'])
  })

  it('does not stop a comment when the storage is full', async () => {
    storage.setItem = () => {
      throw new Error('full')
    }
    const outbox = open()
    outbox.add(comment())
    await outbox.flush()
    expect(states()).toEqual(['sent'])
  })

  it('sends nothing any more once the outbox is closed', async () => {
    answer = () => Promise.resolve('later')
    const outbox = open()
    outbox.add(comment())
    await settle()
    outbox.close()
    waits.at(-1)?.task()
    await settle()
    expect(sent).toHaveLength(1)
  })
})
