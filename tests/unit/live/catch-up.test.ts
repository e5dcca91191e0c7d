import fc from 'fast-check'
import { describe, expect, it, vi } from 'vitest'
import { CatchUp } from '~/utils/catch-up'
import type { EventsAnswer, ProductionEvent } from '~/utils/contracts/event'

const event = (n: number): ProductionEvent => ({ n, kind: 'shot', shot: null, by: null, at: '2026-01-01T00:00:00.000Z' })

/** A record that grows, and answers in pages; each answer waits until it is let go. */
class Record {
  length = 0
  pageSize = 500
  asked: number[] = []
  readonly held: (() => void)[] = []
  holding = false

  fetchAfter = async (after: number): Promise<EventsAnswer> => {
    this.asked.push(after)
    const last = Math.min(this.length, after + this.pageSize)
    const events = Array.from({ length: Math.max(0, last - after) }, (_, i) => event(after + 1 + i))
    const answer = { events, more: last < this.length }
    if (this.holding) await new Promise<void>((resolve) => this.held.push(resolve))
    return answer
  }
  letGo(): void {
    this.held.shift()?.()
  }
}

function reader(record: Record, after = 0) {
  const seen: number[] = []
  const catchUp = new CatchUp({ after, fetchAfter: record.fetchAfter, deliver: ({ n }) => seen.push(n) })
  return { catchUp, seen }
}
const settle = () => new Promise<void>((resolve) => setImmediate(resolve))

describe('catching up', () => {
  it('hands on what came after its number, in order, page after page', async () => {
    const record = new Record()
    record.length = 12
    record.pageSize = 5
    const { catchUp, seen } = reader(record, 3)
    await catchUp.run()
    expect(seen).toEqual([4, 5, 6, 7, 8, 9, 10, 11, 12])
    expect(record.asked).toEqual([3, 8])
    expect(catchUp.after).toBe(12)
  })

  it('asks nothing when it knows the number it hears', async () => {
    const record = new Record()
    const { catchUp } = reader(record, 7)
    await catchUp.hear(7)
    expect(record.asked).toEqual([])
  })

  it('never asks twice at once, and asks again for what it hears of meanwhile', async () => {
    const record = new Record()
    record.length = 1
    record.holding = true
    const { catchUp, seen } = reader(record)
    const first = catchUp.hear(1)
    await settle()
    record.length = 3
    void catchUp.hear(2)
    void catchUp.hear(3)
    await settle()
    expect(record.asked).toEqual([0])
    record.letGo()
    await settle()
    expect(record.asked).toEqual([0, 1])
    record.letGo()
    await first
    expect(seen).toEqual([1, 2, 3])
  })

  it('asks again when told to while a question is under way that was answered too early', async () => {
    const record = new Record()
    record.holding = true
    const { catchUp, seen } = reader(record)
    const running = catchUp.run()
    await settle()
    record.length = 1
    const again = catchUp.run()
    record.letGo()
    await settle()
    record.letGo()
    await Promise.all([running, again])
    expect(seen).toEqual([1])
  })

  it('asks again for a number heard while the question under way found nothing', async () => {
    const record = new Record()
    record.holding = true
    const { catchUp, seen } = reader(record)
    const running = catchUp.run()
    await settle()
    record.length = 1
    void catchUp.hear(1)
    record.letGo()
    await settle()
    record.letGo()
    await running
    expect(seen).toEqual([1])
  })

  it('gives up on a number that the record does not have, instead of asking for ever', async () => {
    const record = new Record()
    record.length = 2
    const { catchUp, seen } = reader(record)
    await catchUp.hear(9)
    expect(seen).toEqual([1, 2])
    expect(record.asked.length).toBeLessThanOrEqual(2)
  })

  it('goes on from the same number after a failure', async () => {
    const record = new Record()
    record.length = 2
    const seen: number[] = []
    const fetchAfter = vi.fn(record.fetchAfter).mockRejectedValueOnce(new Error('no line'))
    const catchUp = new CatchUp({ after: 0, fetchAfter, deliver: ({ n }) => seen.push(n) })
    await expect(catchUp.run()).rejects.toThrow('no line')
    await catchUp.run()
    expect(seen).toEqual([1, 2])
  })

  it('can be asked again after a port that threw at once', async () => {
    let down = true
    const catchUp = new CatchUp({
      after: 0,
      deliver: () => {},
      fetchAfter: () => {
        if (down) throw new Error('at once')
        return Promise.resolve({ events: [event(1)], more: false })
      },
    })
    await expect(catchUp.run()).rejects.toThrow('at once')
    down = false
    await catchUp.run()
    expect(catchUp.after).toBe(1)
  })

  it('goes on after an event that its reader fails over, and does not repeat it', async () => {
    const complained = vi.spyOn(console, 'error').mockImplementation(() => {})
    const record = new Record()
    record.length = 3
    const seen: number[] = []
    const deliver = ({ n }: ProductionEvent) => {
      seen.push(n)
      if (n === 2) throw new Error('cannot show it')
    }
    const catchUp = new CatchUp({ after: 0, fetchAfter: record.fetchAfter, deliver })
    await catchUp.run()
    await catchUp.run()
    expect(seen).toEqual([1, 2, 3])
    expect(complained).toHaveBeenCalledOnce()
  })

  it('hands nothing on after it was stopped, not even what was under way', async () => {
    const record = new Record()
    record.length = 1
    record.holding = true
    const { catchUp, seen } = reader(record)
    const running = catchUp.run()
    await settle()
    catchUp.stop()
    record.letGo()
    await running
    expect(seen).toEqual([])
  })

  it('hands on every event once, in order, whatever it hears and whatever fails', async () => {
    const step = fc.oneof(
      fc.record({ do: fc.constant('grow' as const), by: fc.integer({ min: 1, max: 4 }), tell: fc.boolean() }),
      fc.record({ do: fc.constant('run' as const) }),
      fc.record({ do: fc.constant('wait' as const) }),
      fc.record({ do: fc.constant('fail' as const) }),
    )
    await fc.assert(
      fc.asyncProperty(fc.array(step, { maxLength: 40 }), fc.integer({ min: 1, max: 3 }), async (steps, pageSize) => {
        const record = new Record()
        record.pageSize = pageSize
        const seen: number[] = []
        let failing = false
        let under = 0
        const fetchAfter = async (n: number) => {
          under += 1
          expect(under).toBe(1)
          await settle()
          under -= 1
          if (failing) {
            failing = false
            throw new Error('no line')
          }
          return record.fetchAfter(n)
        }
        const catchUp = new CatchUp({ after: 0, fetchAfter, deliver: ({ n }) => seen.push(n) })
        const forgive = (asked: Promise<void>) => void asked.catch(() => {})
        for (const one of steps) {
          if (one.do === 'grow') {
            record.length += one.by
            if (one.tell) forgive(catchUp.hear(record.length))
          } else if (one.do === 'run') forgive(catchUp.run())
          else if (one.do === 'wait') await settle()
          else failing = true
        }
        failing = false
        await catchUp.run().catch(() => catchUp.run())
        expect(seen).toEqual(Array.from({ length: record.length }, (_, i) => i + 1))
      }),
      { numRuns: 200 },
    )
  })
})
