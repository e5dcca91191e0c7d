/** The law's line beside a list that is not its own: from rest, through both ends, with the law's own curve. */
import { describe, expect, it } from 'vitest'
import { judge, judgeInDepth, lawCurve } from '../../../utils/motion'
import type { Key, ReadingCheck } from '../../../utils/motion'
import { swung } from '../../bench/lists/motion'

const DEGREE = 180 / Math.PI

const even = (count: number, gap: number, from: number): Key[] => Array.from({ length: count }, (_, i) => ({ frame: 1 + i, reading: from + i * gap }))
const claim = (law: ReadingCheck['law'], keys: Key[]): ReadingCheck => law === 'odd-rule'
  ? { law, keys, fps: 24, measure: 'distance', unit: 'px', slop: 1, tolerance: 0.1 }
  : { law, keys, fps: 24, measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1 }

describe('even spacing under another law', () => {
  it('is shown the odd rule: gaps 1 : 3 : 5 : 7 from the first drawing to the last', () => {
    const { keys, findings, readsAs, ruled } = judge(claim('odd-rule', even(9, 26, 100)))
    expect(findings.map(({ kind }) => kind)).toEqual(['wrong-law'])
    expect(readsAs[0]?.law).toBe('steady')
    // 8 gaps of 1 + 3 + … + 15 = 64 parts.
    keys.slice(0, -1).forEach(({ lawGap }, i) => expect(lawGap).toBeCloseTo((2 * i + 1) * 208 / 64, 9))
    expect(keys[0]?.law).toBeCloseTo(100, 9)
    expect(keys.filter(key => key.breaks).length).toBeGreaterThan(6)
    expect(ruled.fit.map(({ reading }) => reading)).toEqual(keys.map(({ law }) => law))
  })

  // The integrator is told only angle and turn rate at the first key and k; it shares nothing with the judge.
  it.each([
    ['topple', even(12, 7, 5)], ['topple', even(12, -7, -3)], ['pendulum', even(9, -5, 30)], ['pendulum', even(9, 5, -10)], ['pendulum', even(13, 5, -30)],
  ] as const)('is shown a %s that starts and ends where it does (%#)', (law, keys) => {
    const request = claim(law, [...keys])
    const { line, result } = judgeInDepth(request)
    expect(result.findings.map(({ kind }) => kind)).toEqual(['wrong-law'])
    if (!line) throw new Error('a list under another law has a line')
    const [log = NaN, angle = NaN, turn = NaN] = line.numbers
    const gaps = keys.length - 1
    const exact = swung(law === 'topple' ? 1 : -1, Math.exp(2 * log), angle, turn, gaps, gaps)
    result.keys.forEach((key, i) => expect(key.law).toBeCloseTo((exact[i] as number) * DEGREE, 5))
    expect(result.keys[0]?.law).toBeCloseTo(keys[0]?.reading ?? NaN, 6)
    expect(result.keys.at(-1)?.law).toBeCloseTo(keys.at(-1)?.reading ?? NaN, 5)
    expect(result.keys.filter(key => key.breaks).length).toBeGreaterThan(keys.length / 2)
    expect(lawCurve(line, request, keys.map(({ frame }) => frame))).toEqual(result.keys.map(key => key.law))
  })

  it('from balance falls from a lean too small to see', () => {
    const { keys } = judge(claim('topple', even(12, 7, 0)))
    expect(keys[0]?.law).toBeCloseTo(0.3, 6)
    expect(keys.at(-1)?.law).toBeCloseTo(77, 5)
  })
})

describe('a list whose law already shows its curve', () => {
  it('keeps the plain best line: a fall posted as a topple', () => {
    const keys = Array.from({ length: 16 }, (_, i) => ({ frame: i, reading: Math.round(10 * (6 + 76 * (i / 15) ** 2)) / 10 }))
    const result = judge(claim('topple', keys))
    expect(result.findings[0]?.text).toBe('This is not a topple; it reads as the odd rule.')
    // The line from rest through both ends would leave the middle far behind; the plain best shares its offsets out.
    expect(result.keys.some(key => (key.offset ?? 0) < 0) && result.keys.some(key => (key.offset ?? 0) > 0)).toBe(true)
  })
})
