/** A ruled list sets out once and never steps back, on lists made by the bench's own integrator and school algebra. */
import { describe, expect, it } from 'vitest'
import { judge } from '../../../utils/motion'
import type { ReadingCheck } from '../../../utils/motion'
import { makeLists } from '../../bench/lists/make'
import { startLists } from '../../bench/lists/start'

/** The largest step against the way from first to last. */
function backStep(readings: readonly number[]): number {
  const way = Math.sign((readings.at(-1) ?? 0) - (readings[0] ?? 0))
  return readings.slice(1).reduce((most, reading, i) => Math.max(most, way * ((readings[i] as number) - reading)), 0)
}

const ruled = (request: ReadingCheck) => judge(request).ruled.fit.map(({ reading }) => reading)

describe('the ruled list of a motion that never turns', () => {
  it('never steps back where the list was let go at its first drawing and nothing is said of it', () => {
    const lists = startLists(150, false, 99).filter(({ law }) => law !== 'pendulum').map(({ before: _, size: __, start: ___, ...request }) => request)
    expect(lists.length).toBe(100)
    for (const list of lists) expect(backStep(ruled(list)), JSON.stringify(list.keys)).toBe(0)
  })

  it('waits for its start where a drawing near it is held', () => {
    const lists = makeLists(100, 51, [['held', 'topple']])
    for (const { request, family } of lists) expect(backStep(ruled(request)), `${family} ${JSON.stringify(request.keys)}`).toBe(0)
  })
})

it('a list that turns within it is ruled with its turn', () => {
  // Up and down again: apex at frame 6 of 20, r = (t − 6)².
  const keys = Array.from({ length: 20 }, (_, frame) => ({ frame, reading: (frame - 6) ** 2 }))
  const readings = ruled({ law: 'odd-rule', fps: 24, measure: 'distance', unit: 'px', slop: 1, tolerance: 0.1, keys })
  expect(Math.min(...readings)).toBeCloseTo(0, 6)
  expect(readings[0]).toBeCloseTo(36, 6)
})
