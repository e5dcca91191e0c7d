/** Constant turning, running on past a full turn or beginning again at one: plain arithmetic. */
import { describe, expect, it } from 'vitest'
import { judge, judgeInDepth, lawCurve, plannedList } from '../../../utils/motion'
import type { CheckResult, ReadingCheck } from '../../../utils/motion'

/** `perFrame` units on ones from frame 1, starting at 10; `within`: the turn that readings begin again at, or none. */
function turning(perFrame: number, within: number | null, more: Partial<ReadingCheck> = {}): ReadingCheck {
  const keys = Array.from({ length: 20 }, (_, i) => {
    const reading = 10 + perFrame * i
    return { frame: 1 + i, reading: within === null ? reading : reading - within * Math.floor(reading / within) }
  })
  return { law: 'spin', fps: 24, measure: 'angle', unit: 'deg', slop: 0.5, tolerance: 0.1, keys, ...more } as ReadingCheck
}
const turnsOf = ({ figures }: CheckResult) => figures?.find(({ kind }) => kind === 'turns')?.value

describe('a spin', () => {
  it.each([[7, 360], [30, 360], [-45, 360], [120, 360], [150, null], [600, null], [-30, null]])('at %d° a frame, beginning again at %s, holds', (perFrame, within) => {
    const result = judge(turning(perFrame, within))
    expect(result.verdict).toBe('holds')
    expect(turnsOf(result)).toBeCloseTo(Math.abs(perFrame) * 24 / 360, 9)
  })

  it('along an arc a full turn is the circle', () => {
    const result = judge(turning(40, 2 * Math.PI * 100, { measure: 'arc', unit: 'px', radius: 100 }))
    expect(result.verdict).toBe('holds')
    // 40 units a frame on 24 of them, over 2π·100.
    expect(turnsOf(result)).toBeCloseTo(960 / 628.3185307, 6)
  })

  it('tells the law in the turn that was posted, and the gaps as they are turned', () => {
    const request = turning(30, 360)
    const { result, line } = judgeInDepth(request)
    result.keys.forEach((key, i) => {
      expect(key.reading).toBe(request.keys[i]?.reading)
      expect(key.law).toBeCloseTo(key.reading, 9)
      expect(key.offset).toBeCloseTo(0, 9)
      if (key.gap !== null) expect(key.gap).toBeCloseTo(30, 9)
      if (key.lawGap !== null) expect(key.lawGap).toBeCloseTo(30, 9)
    })
    result.ruled.fit.forEach(({ reading }, i) => expect(reading).toBeCloseTo(request.keys[i]?.reading ?? NaN, 9))
    if (!line) throw new Error('a list that holds has a line')
    const drawn = lawCurve(line, request, request.keys.map(({ frame }) => frame))
    drawn.forEach((reading, i) => expect(reading).toBe(result.keys[i]?.law))
  })

  it('a held, a skipped and a misplaced drawing are told as such across the turn', () => {
    const whole = turning(30, 360)
    const shifted = (by: 1 | -1) => whole.keys.slice(0, 18).map(({ frame }, i) => ({ frame, reading: whole.keys[i >= 9 ? i - by : i]?.reading ?? NaN }))
    expect(judge({ ...whole, keys: shifted(1) }).findings).toMatchObject([{ kind: 'held', frames: [10], amount: 1 }])
    expect(judge({ ...whole, keys: shifted(-1) }).findings).toMatchObject([{ kind: 'skipped', frames: [10], amount: 1 }])
    // The drawing after the turn, ten degrees short of it.
    const off = whole.keys.map((key, i) => (i === 12 ? { ...key, reading: 358 } : key))
    const { findings } = judge({ ...whole, keys: off })
    expect(findings).toMatchObject([{ kind: 'misplaced', frames: [13] }])
    expect(findings[0]?.amount).toBeCloseTo(-12, 9)
  })

  it('and even spacing are one line: neither is read as the other', () => {
    for (const law of ['spin', 'steady'] as const) {
      const result = judge(turning(11, null, { law }))
      expect(result.verdict).toBe('holds')
      expect(result.readsAs[0]?.law).toBe(law)
    }
  })

  it.each([30, -45, 120])('claimed as even spacing, %d° a frame beginning again at 360° reads as a spin', (perFrame) => {
    const result = judge(turning(perFrame, 360, { law: 'steady' }))
    expect(result.findings.map(({ text }) => text)).toEqual(['This is not even spacing; it reads as a spin.'])
    expect(result.readsAs[0]?.law).toBe('spin')
    expect(new Set(result.readsAs.map(({ law }) => law)).size).toBe(result.readsAs.length)
  })

  it('a swing is not a spin', () => {
    const keys = Array.from({ length: 40 }, (_, i) => ({ frame: i, reading: Math.round(400 * Math.cos(i / 5)) / 10 }))
    const result = judge(turning(1, null, { keys }))
    expect(result.findings.map(({ kind }) => kind)).toEqual(['wrong-law'])
    expect(result.readsAs[0]?.law).toBe('pendulum')
  })

  it('planned at ⅔ of a turn a second takes three seconds for two turns', () => {
    const { keys, seconds } = plannedList({ law: 'spin', fps: 24, exposure: 3, turns: 2, turnsPerSecond: -2 / 3, step: 1 })
    expect(seconds).toBeCloseTo(3, 12)
    expect(keys.at(-1)).toEqual({ frame: 73, reading: -720 })
    expect(turnsOf(judge(turning(1, null, { keys })))).toBeCloseTo(2 / 3, 6)
  })
})
