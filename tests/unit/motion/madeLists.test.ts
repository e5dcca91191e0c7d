/** The judge's bars, on a fixed set of 407 lists made by the bench's own integrator (tests/bench/lists): eleven rounds of all families. */
import { describe, expect, it } from 'vitest'
import { scoreLists } from '../../bench/judgeScore'
import { makeLists } from '../../bench/lists/make'

describe('made lists', () => {
  const score = scoreLists(makeLists(407, 20261))

  it('finds the right kind at the right frames in 98 of 100', () => {
    expect(score.lists).toBe(407)
    expect(score.right / score.lists).toBeGreaterThanOrEqual(0.98)
  })

  it('does so in every family', () => {
    for (const row of score.rows) {
      // Eleven lists a family and 95 in 100 leave room for no more than one slip.
      expect(row.lists - row.right, row.family).toBeLessThanOrEqual(1)
    }
  })

  it('leaves clean lists alone and tells one cause once', () => {
    expect(score.cleanFlagged).toBeLessThanOrEqual(0.01)
    expect(score.doubled).toBeLessThanOrEqual(0.01)
  })

  it('reads sizes with an honest interval', () => {
    // 44 lists: 95 % of them is 41.8, and two spreads of a binomial either way are 39 to 44.
    expect(score.covered).toBe(44)
    expect(score.coverage).toBeGreaterThanOrEqual(39 / 44)
    expect(score.medianSizeError).toBeLessThan(0.02)
  })
})
