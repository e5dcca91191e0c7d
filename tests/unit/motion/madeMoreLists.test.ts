/** The judge's bars on slow ins, spins, dying swings and bounces: a fixed set of 320 lists, ten rounds of all families (tests/bench/lists). */
import { describe, expect, it } from 'vitest'
import { judge } from '../../../utils/motion'
import type { ReadingCheck } from '../../../utils/motion'
import { scoreLists } from '../../bench/judgeScore'
import { makeMoreLists } from '../../bench/lists/moreLaws'

describe('made lists of the further laws', () => {
  const lists = makeMoreLists(320, 20261)
  const score = scoreLists(lists)

  it('come out right in 98 of 100, and no family with more than one slip', () => {
    expect(score.lists).toBe(320)
    expect(score.right / score.lists).toBeGreaterThanOrEqual(0.98)
    // Ten lists a family and 95 in 100 leave room for no more than one.
    for (const row of score.rows) expect(row.lists - row.right, row.family).toBeLessThanOrEqual(1)
  })

  it('are left alone where they are clean, and told one cause once', () => {
    expect(score.cleanFlagged).toBeLessThanOrEqual(0.01)
    expect(score.doubled).toBeLessThanOrEqual(0.01)
  })

  it('give their stops, turns, losses and restitutions with an honest interval', () => {
    let inside = 0
    let told = 0
    for (const { request, truth } of lists) {
      if (truth.kind !== 'clean' || !truth.figure) continue
      const { kind, value } = truth.figure
      const figure = judge(request as ReadingCheck).figures?.find(each => each.kind === kind)
      expect(figure, kind).toBeDefined()
      told++
      if (figure && figure.low <= value && value <= figure.high) inside++
    }
    // Slow ins, spins and bounces, and those dying swings that have one share: 95 % of 36 is 34, less two spreads of a binomial.
    expect(told).toBeGreaterThanOrEqual(33)
    expect(inside / told).toBeGreaterThanOrEqual(0.87)
  })
})
