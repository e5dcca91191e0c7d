/** The bars for divided lists, on a fixed set made by the bench's own generator (tests/bench/lists/makeSpans.ts): eight rounds of all families. */
import { describe, expect, it } from 'vitest'
import { makeSpans, SPAN_ROUND } from '../../bench/lists/makeSpans'
import { scoreSpans } from '../../bench/spanScore'

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
