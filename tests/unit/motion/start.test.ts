/** Claims that start from rest, on lists made by school algebra and by the bench's own integrator. */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { judge, judgeInDepth, lawCurve } from '../../../utils/motion'
import type { ReadingCheck, CheckResult, Law } from '../../../utils/motion'
import { GRAVITY, swung } from '../../bench/lists/motion'
import { startLists } from '../../bench/lists/start'
import type { StartList } from '../../bench/lists/start'

const DEGREE = 180 / Math.PI

/** A body of equal-pendulum length 2 m on ones, to hundredths of a degree. */
function turning(law: 'topple' | 'pendulum', from: number, turn: number, frames: number): ReadingCheck {
  const angles = swung(law === 'topple' ? 1 : -1, GRAVITY / 2, from / DEGREE, turn / DEGREE, 24, frames)
  return {
    law, fps: 24, measure: 'angle', unit: 'deg', slop: 0.1, tolerance: 0.05, start: 'rest',
    keys: angles.map((angle, frame) => ({ frame, reading: Math.round(angle * DEGREE * 100) / 100 })),
  }
}

const kinds = ({ findings }: CheckResult) => findings.map(({ kind }) => kind)
const claimed = ({ before: _, size: __, ...request }: StartList): ReadingCheck => request

describe('turning bodies', () => {
  it.each([['topple', 6, 24], ['pendulum', 40, 50], ['pendulum', -40, 50]] as const)('a %s let go at %d° holds, from rest', (law, from, frames) => {
    const { result, line } = judgeInDepth(turning(law, from, 0, frames))
    expect(result.verdict).toBe('holds')
    if (!line) throw new Error('a list that holds has a line')
    expect(line.numbers[2]).toBe(0)
    // 2 m of equal-pendulum length: a rod of 3 m on its foot, a bob on 2 m.
    expect((result.size?.value ?? NaN) / (law === 'topple' ? 3 : 2)).toBeCloseTo(1, 2)
    const request = turning(law, from, 0, frames)
    expect(lawCurve(line, request, request.keys.map(({ frame }) => frame))).toEqual(result.keys.map(({ law: reading }) => reading))
  })

  it.each([['topple', 4, 30], ['pendulum', 50, 60]] as const)('a %s whose first five drawings are left out was let go five frames before', (law, from, frames) => {
    const whole = turning(law, from, 0, frames)
    const { findings } = judge({ ...whole, keys: whole.keys.slice(5) })
    expect(findings.map(({ kind }) => kind)).toEqual(['not-at-rest'])
    expect(findings[0]?.frames).toEqual([5])
    expect(findings[0]?.amount).toBeGreaterThan(4.8)
    expect(findings[0]?.amount).toBeLessThan(5.2)
  })

  it('a topple pushed harder than any fall was never at rest', () => {
    const { findings } = judge(turning('topple', 5, 60, 20))
    expect(findings).toEqual([{ kind: 'not-at-rest', frames: [0], amount: 0, text: 'Already moving at the first drawing: too fast ever to have been at rest.' }])
  })

  it('a swing caught at the bottom is moving', () => {
    expect(kinds(judge(turning('pendulum', 0, 90, 50)))).toEqual(['not-at-rest'])
  })

  it('another law stays another law', () => {
    const keys = Array.from({ length: 20 }, (_, i) => ({ frame: i, reading: 4 * i }))
    const result = judge({ ...turning('pendulum', 40, 0, 1), keys })
    expect(kinds(result)).toEqual(['wrong-law'])
  })

  it('a wrong size under way is told beside it, once each', () => {
    const whole = turning('topple', 4, 0, 30)
    const result = judge({ ...whole, keys: whole.keys.slice(5), subject: { shape: 'rod', height: 12 } })
    expect(kinds(result)).toEqual(['not-at-rest', 'wrong-scale'])
    expect((result.size?.value ?? NaN) / 3).toBeCloseTo(1, 1)
  })
})

describe('made lists', () => {
  it('from rest, and claimed so, hold', () => {
    const flagged = startLists(240, false, 20263).map(claimed).filter(list => judge(list).findings.length > 0)
    expect(flagged.length).toBeLessThanOrEqual(2)
  })

  it('under way by what could be noticed, and claimed at rest, are told so and nothing else', () => {
    const lists = startLists(120, true, 20264)
    const told = lists.map(list => ({ before: list.before, result: judge(claimed(list)) })).filter(({ result }) => kinds(result).join() === 'not-at-rest')
    expect(told.length / lists.length).toBeGreaterThanOrEqual(0.95)
    // And by how much, to a tenth at the middle of them.
    const errors = told.map(({ before, result }) => Math.abs((result.findings[0]?.amount ?? NaN) / before - 1)).sort((a, b) => a - b)
    expect(errors[errors.length >> 1]).toBeLessThan(0.1)
  }, 60_000)

  it('a bad drawing in a list from rest is still that drawing', () => {
    const lists = startLists(120, false, 20265).map(claimed).map((list) => {
      const at = 3 + list.keys.length % 5
      const [before, here, after] = [list.keys[at - 1], list.keys[at], list.keys[at + 1]]
      const off = 5 * (list.slop + 0.1 * Math.abs((after?.reading ?? 0) - (before?.reading ?? 0)) / 2)
      return { frame: here?.frame, list: { ...list, keys: list.keys.map((key, i) => (i === at ? { ...key, reading: key.reading + off } : key)) } }
    })
    const right = lists.filter(({ frame, list }) => {
      const { findings } = judge(list)
      return findings.length === 1 && ['misplaced', 'backward'].includes(findings[0]?.kind ?? '') && findings[0]?.frames[0] === frame
    })
    expect(right.length / lists.length).toBeGreaterThanOrEqual(0.95)
  })
})

describe('any start', () => {
  const readings = fc.array(fc.integer({ min: -500, max: 500 }), { minLength: 3, maxLength: 30 })
  const smooth = fc.tuple(fc.integer({ min: 6, max: 30 }), fc.integer({ min: -40, max: 40 }), fc.integer({ min: 1, max: 20 }))
    .map(([count, speed, pull]) => Array.from({ length: count }, (_, i) => Math.round(speed * i + pull * i * i) / 10))

  it('answers as if nothing had been said of it', () => {
    fc.assert(fc.property(fc.oneof(readings, smooth), fc.constantFrom<Law>('odd-rule', 'topple', 'pendulum', 'steady'), (list, law) => {
      const request: ReadingCheck = {
        law, fps: 24, measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1, keys: list.map((reading, frame) => ({ frame, reading })),
      }
      expect(JSON.stringify(judge({ ...request, start: 'any' }))).toBe(JSON.stringify(judge(request)))
    }), { numRuns: 120, seed: 4712 })
  })

  it('a start from rest never answers NaN, and the line drawn is the line judged by', () => {
    fc.assert(fc.property(fc.oneof(readings, smooth), fc.constantFrom<Law>('odd-rule', 'topple', 'pendulum'), (list, law) => {
      const request: ReadingCheck = {
        law, fps: 24, measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1, start: 'rest', keys: list.map((reading, frame) => ({ frame, reading })),
      }
      const { line, result } = judgeInDepth(request)
      // JSON writes NaN and Infinity as null: what survives the way there and back was finite.
      expect(JSON.parse(JSON.stringify(result))).toEqual(result)
      expect(result.findings.filter(({ kind }) => kind === 'not-at-rest').length).toBeLessThanOrEqual(1)
      if (result.verdict === 'holds') expect(result.findings).toEqual([])
      if (line) expect(lawCurve(line, request, request.keys.map(({ frame }) => frame))).toEqual(result.keys.map(key => key.law))
    }), { numRuns: 200, seed: 4713 })
  }, 60_000)
})
