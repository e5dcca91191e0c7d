/** A start from rest by school algebra: the sums of the odd numbers are the squares; half a frame later the gaps are the even ones. */
import { describe, expect, it } from 'vitest'
import { judge } from '../../utils/motion'
import type { ReadingCheck } from '../../utils/motion'

function fall(gaps: readonly number[], unit: number, more: Partial<ReadingCheck> = {}): ReadingCheck {
  const every = 1
  let reading = 0
  const keys = [{ frame: 1, reading }, ...gaps.map((gap, i) => ({ frame: 1 + (i + 1) * every, reading: (reading += gap * unit) }))]
  return { law: 'odd-rule', fps: 24, measure: 'distance', unit: 'px', slop: 0.3, tolerance: 0.1, keys, start: 'rest', ...more }
}
const onTwos = (request: ReadingCheck): ReadingCheck => ({ ...request, keys: request.keys.map(({ frame, reading }) => ({ frame: 2 * frame - 1, reading })) })

const odd = (count: number) => Array.from({ length: count }, (_, i) => 2 * i + 1)
const even = (count: number) => Array.from({ length: count }, (_, i) => 2 * i + 2)

describe('the odd rule from rest', () => {
  it.each([4, 5, 8, 20])('holds for %d gaps 1 : 3 : 5 : 7, whose sums are the squares', (count) => {
    const result = judge(fall(odd(count), 10))
    expect(result.verdict).toBe('holds')
    expect(result.findings).toEqual([])
    result.keys.forEach((key, i) => expect(key.law).toBeCloseTo(10 * i * i, 9))
  })

  // n(n + 1) = (n + ½)² − ¼: the same squares, let go half a gap before the first drawing.
  it.each([4, 5, 8, 20])('%d gaps 2 : 4 : 6 : 8 read as let go half a frame before', (count) => {
    const result = judge(fall(even(count), 10))
    expect(result.verdict).toBe('breaks')
    expect(result.findings).toEqual([{
      kind: 'not-at-rest', frames: [1], amount: expect.closeTo(0.5, 9) as number,
      text: 'Already moving at the first drawing: reads as let go half a frame before it.',
    }])
  })

  it('on twos the same gaps are a whole frame', () => {
    const { findings } = judge(onTwos(fall(even(8), 10)))
    expect(findings.map(({ kind, text }) => [kind, text])).toEqual([['not-at-rest', 'Already moving at the first drawing: reads as let go 1 frame before it.']])
  })

  it('without the claim of rest the same gaps are an odd rule', () => {
    expect(judge(fall(even(8), 10, { start: 'any' })).verdict).toBe('holds')
    expect(judge(fall(even(8), 10, { start: undefined })).verdict).toBe('holds')
  })

  it('rules by the best parabola whose apex is the first drawing', () => {
    const { keys, ruled } = judge(fall(even(4), 10))
    // Least squares of 0, 20, 60, 120, 200 on 1 and n²: 80.4 − 6(slope) with slope 428/34.8, by hand.
    const slope = 428 / 34.8
    keys.forEach((key, i) => expect(key.law).toBeCloseTo(80 - 6 * slope + slope * i * i, 9))
    expect(ruled.fit.map(({ reading }) => reading)).toEqual(keys.map(({ law }) => law))
  })

  it('a throw that turns on the way is at rest only after the first drawing', () => {
    const [finding, ...others] = judge(fall([-3, -1, 1, 3, 5, 7], 10)).findings
    expect(others).toEqual([])
    expect(finding).toMatchObject({ kind: 'not-at-rest', text: 'Already moving at the first drawing: reads as at rest 2 frames after it.' })
    expect(finding?.amount).toBeCloseTo(-2, 9)
  })

  it('a start that waits is told once', () => {
    const { findings } = judge(fall([0, 0, 1, 3, 5, 7, 9, 11], 10))
    expect(findings.map(({ kind, text }) => [kind, text])).toEqual([['not-at-rest', 'Not yet moving at the first drawing: reads as let go 2 frames after it.']])
  })

  it('takes one key fewer to tell', () => {
    expect(judge(fall(odd(3), 10)).verdict).toBe('holds')
    expect(judge(fall(odd(3), 10, { start: 'any' })).reason).toContain('it takes 5')
    expect(judge(fall(odd(2), 10)).reason).toContain('it takes 4')
  })
})
