import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest'
import { Letter } from '~/server/models'
import { run, write } from '~/server/models/database'
import { oweRulingLetters } from '~/server/services/letters'
import { outbox } from '~/server/services/letters/wake'
import { paceOf } from '~/server/services/letters/pace'
import { startMailWorker } from '~/server/services/letters/worker'
import type { MailWorker } from '~/server/services/letters/worker'
import type { Outcome } from '~/server/services/letters/queue'
import { openHouse, rule, tellStory } from '../../helpers/rulingStory'

// Stops after 1 s of patience, looks every 3 s.
const pace = paceOf(3)
let close: () => Promise<void>
let worker: MailWorker | null = null
beforeAll(async () => {
  close = await openHouse()
})
afterAll(() => close())
afterEach(async () => {
  await worker?.stop()
  worker = null
  outbox.removeAllListeners()
  await run('DELETE FROM letters')
})

async function owe(readers: number): Promise<Letter[]> {
  const others = Object.fromEntries(Array.from({ length: readers - 1 }, (_, i) => [`cora${i}`, { role: 'coordinator' as const }]))
  const { take, people } = await tellStory(others)
  return rule(take, people.sam!, async (ruling) => {
    await oweRulingLetters(ruling)
    return Letter.findAll({ where: { rulingId: ruling.id } })
  })
}
async function until(holds: () => boolean | Promise<boolean>): Promise<void> {
  const deadline = Date.now() + 10_000
  while (!(await holds())) {
    if (Date.now() > deadline) throw new Error('It did not come to that.')
    await new Promise((resolve) => setTimeout(resolve, 10))
  }
}
const sent: Outcome = { state: 'sent' }

describe('the mail worker', () => {
  it('sends everything owed, one at a time, each once', async () => {
    const letters = await owe(6)
    const seen: string[] = []
    let inHand = 0
    worker = startMailWorker(pace, async ({ id }) => {
      expect(++inHand).toBe(1)
      await new Promise((resolve) => setTimeout(resolve, 5))
      inHand -= 1
      seen.push(id)
      return sent
    })
    await until(async () => (await Letter.count({ where: { state: 'sent' } })) === 6)
    expect(seen.sort()).toEqual(letters.map(({ id }) => id).sort())
  })

  it('is woken by the commit that owes a letter, and not before it', async () => {
    const states: (string | undefined)[] = []
    worker = startMailWorker(paceOf(600), async (letter) => {
      states.push(letter.state)
      return sent
    })
    outbox.on('owed', worker.wake)
    await owe(1)
    await until(() => states.length > 0)
    expect(states).toEqual(['sending'])
    await until(async () => (await Letter.count({ where: { state: 'sent' } })) === 1)
  })

  it('works outside of the transaction that woke it', async () => {
    const done: string[] = []
    worker = startMailWorker(paceOf(600), async ({ id }) => {
      done.push(id)
      return sent
    })
    const { wake } = worker
    const [letter] = await owe(1)
    // Woken from within a transaction that then fails: the worker's own marks must stay.
    await expect(
      write(async () => {
        wake()
        throw new Error('rolled back')
      }),
    ).rejects.toThrow('rolled back')
    await until(async () => (await letter!.reload()).state === 'sent')
    expect(done).toEqual([letter!.id])
  })

  it('waits with the next letter until the one in hand is done when it stops, and marks it', async () => {
    await owe(3)
    let begun = 0
    let release = () => {}
    worker = startMailWorker(pace, () => {
      begun += 1
      return new Promise((resolve) => (release = () => resolve(sent)))
    })
    await until(() => begun === 1)
    const stopped = worker.stop()
    release()
    await stopped
    expect(begun).toBe(1)
    const states = (await Letter.findAll()).map(({ state }) => state).sort()
    expect(states).toEqual(['sent', 'waiting', 'waiting'])
  })

  it('breaks off a letter that hangs while it stops, and keeps it', async () => {
    const [letter] = await owe(1)
    let begun = false
    worker = startMailWorker(pace, (_letter, signal) => {
      begun = true
      return new Promise((resolve) => signal.addEventListener('abort', () => resolve({ state: 'waiting', why: String(signal.reason.message) })))
    })
    await until(() => begun)
    const start = Date.now()
    await worker.stop()
    expect(Date.now() - start).toBeLessThan(pace.send)
    expect(await letter!.reload()).toMatchObject({ state: 'waiting', attempts: 1, lastError: 'The server stopped while the letter was on its way.' })
  })

  it('gives up a delivery that takes too long', async () => {
    const [letter] = await owe(1)
    worker = startMailWorker(paceOf(0.3), (_letter, signal) => new Promise((resolve) => signal.addEventListener('abort', () => resolve({ state: 'waiting', why: 'too long' }))))
    await until(async () => (await letter!.reload()).attempts === 1 && letter!.state === 'waiting')
    expect(letter!.lastError).toBe('too long')
  })
})
