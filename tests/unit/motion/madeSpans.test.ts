/** The bars for divided lists, on a fixed set made by the bench's own generator (tests/bench/lists/makeSpans.ts): eight rounds of all families. */
import { describe, expect, it } from 'vitest'
import { makeLists } from '../../bench/lists/make'
import { makeSpans, SPAN_ROUND } from '../../bench/lists/makeSpans'
import { isWhole, scoreFinder, scoreSpans } from '../../bench/spanScore'

describe('made lists of two and three spans', () => {
  const score = scoreSpans(makeSpans(8 * SPAN_ROUND, 20262))

  it('finds the right kind at the right frames in 98 of 100', () => {
    expect(score.lists).toBe(8 * SPAN_ROUND)
    expect(score.right / score.lists).toBeGreaterThanOrEqual(0.98)
  })

  it('does so in every family', () => {
    // Eight lists a family (sixteen of clean ones) leave room for one slip.
    for (const row of score.rows) expect(row.lists - row.right, row.family).toBeLessThanOrEqual(1)
  })

  it('leaves clean lists alone', () => {
    expect(score.cleanFlagged).toBeLessThanOrEqual(0.01)
  })
})

describe('joints looked for', () => {
  const score = scoreFinder(makeSpans(3 * SPAN_ROUND, 20263), makeLists(80, 20264).filter(isWhole))

  it('finds them within one key in 95 of 100', () => {
    expect(score.divided).toBeGreaterThan(70)
    expect(score.found / score.divided).toBeGreaterThanOrEqual(0.95)
  })

  it('leaves a single law whole in 98 of 100', () => {
    expect(score.single).toBeGreaterThan(40)
    expect(score.kept / score.single).toBeGreaterThanOrEqual(0.98)
  })
})
