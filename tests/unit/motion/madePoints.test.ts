/** The judge's bars on a fixed set of lists of points (tests/bench/lists/points.ts): six rounds of all families. */
import { describe, expect, it } from 'vitest'
import { POINT_PLAN, makePointLists } from '../../bench/lists/points'
import { scorePoints } from '../../bench/pointScore'

describe('made lists of points', () => {
  const rounds = 6
  const score = scorePoints(makePointLists(rounds * POINT_PLAN.length, 20263))

  it('finds the right kind at the right frames in 98 of 100', () => {
    expect(score.lists).toBe(rounds * POINT_PLAN.length)
    expect(score.right / score.lists).toBeGreaterThanOrEqual(0.98)
  })

  it('does so in every family', () => {
    // Six lists a family and 95 in 100 leave room for no more than one slip.
    for (const row of score.rows) expect(row.lists - row.right, row.family).toBeLessThanOrEqual(1)
  })

  it('leaves clean lists alone and tells one cause once', () => {
    expect(score.cleanFlagged).toBeLessThanOrEqual(0.01)
    expect(score.doubled).toBeLessThanOrEqual(0.01)
  })

  it('reads sizes with an honest interval, whether the pivot was given or had to be found', () => {
    // 300 clean topples and swings: 95 % is 285, and three spreads of a binomial below it are 273.
    const clean = scorePoints(makePointLists(300, 99, [['clean', 'topple'], ['clean', 'pendulum']]))
    expect(clean.covered).toBeGreaterThanOrEqual(290)
    expect(clean.coverage).toBeGreaterThanOrEqual(0.91)
    expect(clean.coverage).toBeLessThan(0.99)
    expect(clean.medianSizeError).toBeLessThan(0.02)
  })
})
