/** The judge's bars on bodies over the edge, on a fixed set of lists made by the bench's own integrator (tests/bench/lists/edge.ts). */
import { describe, expect, it } from 'vitest'
import { scoreEdge } from '../../bench/edgeScore'
import { makeEdgeLists } from '../../bench/lists/edge'

/** Ten lists a family: one slip each, and the bench asks for 95 in 100 of many more. */
describe.each([['angle', 100], ['point', 90]] as const)('made lists of bodies over the edge: %ss', (measure, count) => {
  const score = scoreEdge(makeEdgeLists(count, 20262, [measure]))

  it('finds the right kind at the right frames in 98 of 100', () => {
    expect(score.lists).toBe(count)
    expect(score.right / score.lists).toBeGreaterThanOrEqual(0.98)
  })

  it('does so in every family', () => {
    for (const row of score.rows) expect(row.lists - row.right, row.family).toBeLessThanOrEqual(1)
  })

  it('leaves clean lists alone and tells one cause once', () => {
    expect(score.cleanFlagged).toBeLessThanOrEqual(0.01)
    expect(score.doubled).toBeLessThanOrEqual(0.01)
  })

  it('knows where they let go, and their size', () => {
    // 20 lists: 95 % of them is 19, and two spreads of a binomial below that are 17.
    expect(score.covered).toBe(20)
    expect(score.sizes).toBeGreaterThanOrEqual(17 / 20)
    expect(score.angles).toBeGreaterThanOrEqual(17 / 20)
    expect(score.frames).toBeGreaterThanOrEqual(17 / 20)
    expect(score.medianSizeError).toBeLessThan(0.02)
    expect(score.medianAngleError).toBeLessThan(1)
  })
})
