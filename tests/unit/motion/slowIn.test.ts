/** Lists that slow to a stop, made by school algebra: the gaps are the odd numbers run backwards, then nothing. */
import { describe, expect, it } from 'vitest'
import { framesFor, judge, plannedList } from '../../../utils/motion'
import type { CheckResult, ReadingCheck } from '../../../utils/motion'

const reads = { fps: 24, measure: 'distance', unit: 'px', slop: 1, tolerance: 0.1 } as const

/** `count` drawings on every `every`-th frame from 1001; the stop is `stop` exposures after the first. */
function slowing(count: number, stop: number, c: number, more: Partial<ReadingCheck> = {}, every = 1): ReadingCheck {
  const keys = Array.from({ length: count }, (_, i) => ({
    frame: 1001 + every * i, reading: Math.round(200 - c * Math.max(0, stop - i) ** 2),
  }))
  return { ...reads, law: 'slow-in', keys, ...more } as ReadingCheck
}
const kinds = ({ findings }: CheckResult) => findings.map(({ kind }) => kind)
const stopOf = ({ figures }: CheckResult) => figures?.find(({ kind }) => kind === 'stop')

describe('a slow in', () => {
  it.each([[12, 11, 1], [14, 10.4, 1], [30, 12, 2], [9, 6.5, 3], [40, 30.7, 4]])('%d drawings that stop after %d exposures hold, and the stop is told', (count, stop, every) => {
    for (const c of [2, -2]) {
      const result = judge(slowing(count, stop, c, {}, every))
      expect(result.verdict).toBe('holds')
      const figure = stopOf(result)
      expect(Math.abs((figure?.value ?? NaN) - (1001 + every * stop))).toBeLessThan(0.15 * every)
      expect(figure?.low).toBeLessThan(1001 + every * stop + 0.15)
      expect(figure?.high).toBeGreaterThan(1001 + every * stop - 0.15)
      expect(result.size).toBeNull()
    }
  })

  it('is told apart from an odd rule only where it stops and stays', () => {
    expect(judge(slowing(12, 11, 2, { law: 'odd-rule' })).verdict).toBe('holds')
    expect(judge(slowing(12, 11.5, 2, { law: 'odd-rule' })).verdict).toBe('holds')
    const stayed = judge(slowing(18, 11, 2, { law: 'odd-rule' }))
    expect(kinds(stayed)).toEqual(['wrong-law'])
    expect(stayed.readsAs[0]?.law).toBe('slow-in')
    // Five exposures short of its stop, it never came to one.
    const passing = judge(slowing(14, 19, 1))
    expect(kinds(passing)).toEqual(['wrong-law'])
    expect(passing.readsAs[0]?.law).toBe('odd-rule')
  })

  it('speeding up or even is another law', () => {
    const speeding = Array.from({ length: 14 }, (_, i) => ({ frame: i, reading: i * i }))
    expect(judge({ ...slowing(4, 3, 1), keys: speeding }).readsAs[0]?.law).toBe('odd-rule')
    expect(kinds(judge({ ...slowing(4, 3, 1), keys: speeding }))).toEqual(['wrong-law'])
    const even = Array.from({ length: 14 }, (_, i) => ({ frame: i, reading: 9 * i }))
    const result = judge({ ...slowing(4, 3, 1), keys: even })
    expect(kinds(result)).toEqual(['wrong-law'])
    expect(result.readsAs[0]?.law).toBe('steady')
  })

  it('a held, a skipped and a misplaced drawing are told as such', () => {
    const whole = slowing(20, 16, 2)
    const late = whole.keys.map(({ frame }, i) => ({ frame, reading: whole.keys[i >= 6 ? i - 1 : i]?.reading ?? NaN }))
    expect(judge({ ...whole, keys: late }).findings).toMatchObject([{ kind: 'held', frames: [1007], amount: 1 }])
    const early = whole.keys.slice(0, -1).map(({ frame }, i) => ({ frame, reading: whole.keys[i >= 6 ? i + 1 : i]?.reading ?? NaN }))
    expect(judge({ ...whole, keys: early }).findings).toMatchObject([{ kind: 'skipped', frames: [1007], amount: 1 }])
    const off = whole.keys.map((key, i) => (i === 8 ? { ...key, reading: key.reading + 12 } : key))
    expect(judge({ ...whole, keys: off }).findings).toMatchObject([{ kind: 'misplaced', frames: [1009] }])
  })

  it('a drawing that runs back before the stop is told as backward', () => {
    const whole = slowing(20, 16, 2)
    const back = whole.keys.map((key, i) => (i === 8 ? { ...key, reading: (whole.keys[7]?.reading ?? NaN) - 9 } : key))
    expect(judge({ ...whole, keys: back }).findings).toMatchObject([{ kind: 'backward', frames: [1009] }])
  })

  it('takes five keys to tell', () => {
    expect(judge(slowing(4, 3, 5)).reason).toContain('it takes 5')
    expect(judge(slowing(5, 3.5, 5)).verdict).toBe('holds')
  })

  it('never starts from rest', () => {
    expect(judge(slowing(14, 11, 2, { start: 'rest' })).verdict).toBe('holds')
  })
})

describe('a planned slow in', () => {
  const plan = { law: 'slow-in', fps: 24, exposure: 2, travel: 300, seconds: 0.9, step: 0.5 } as const

  it('ends on its stop and holds under its own law', () => {
    const { keys, frames } = plannedList(plan)
    expect(frames).toBeCloseTo(21.6, 9)
    expect(keys.at(-1)).toEqual({ frame: 23, reading: 300 })
    const result = judge({ ...reads, law: 'slow-in', keys })
    expect(result.verdict).toBe('holds')
    expect(stopOf(result)?.value).toBeCloseTo(22.6, 1)
  })

  it('takes as long as travel and deceleration say: t = √(2s/a)', () => {
    expect(framesFor({ law: 'slow-in', fps: 24, exposure: 1, travel: 200, deceleration: 400 })).toBe(24)
  })
})
