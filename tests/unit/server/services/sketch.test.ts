import { describe, expect, it } from 'vitest'
import { headline } from '~/server/services/headline'
import { makeSketch, MAX_MARKS } from '~/server/services/sketch'
import { requestFor } from '~/utils/contracts/check'
import { judge } from '~/utils/motion'
import type { CheckResult, Finding, Key } from '~/utils/motion/types'
import type { Claim } from '~/utils/contracts/production'
import { brokenFall, fall, fallClaim } from '../../../helpers/seed'

const judged = (claim: Claim, keys: Key[]) => judge(requestFor(claim, 24, keys))
const topple: Claim = { law: 'topple', measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1, subject: { shape: 'rod', height: 38 } }

describe('the headline of a sheet', () => {
  it('says of a misplaced drawing which one and by how many frames', () => {
    expect(headline(judged(fallClaim, brokenFall()), fallClaim)).toMatch(/^Frame 1015 lands \d+(\.\d)? frames? early$/)
  })

  it('says that a list holds, and what size it reads as where a body is claimed', () => {
    expect(headline(judged(fallClaim, fall()), fallClaim)).toMatch(/^Holds( · reads as .+)?$/)
    const answer = { ...judged(fallClaim, fall()), size: { value: 1.7, low: 1.6, high: 1.8, unit: 'm' } }
    expect(headline(answer, topple)).toBe('Holds · reads as 1.7 m')
    expect(headline({ ...answer, size: null }, topple)).toBe('Holds')
  })

  it('says the size that the timing reads as, against the claimed one', () => {
    const wrongScale: Finding = { kind: 'wrong-scale', frames: [], amount: 8.2 / 38, text: 'Reads as 8.2 m (7.9–8.5); 38 m needs 187 frames, not 89.' }
    const answer: CheckResult = { ...judged(fallClaim, fall()), verdict: 'breaks', findings: [wrongScale], size: { value: 8.2, low: 7.9, high: 8.5, unit: 'm' } }
    expect(headline(answer, topple)).toBe('Reads as 8.2 m, not 38 m')
  })

  it('says which law the list follows instead, when one is clearly ahead', () => {
    const steady: Claim = { ...fallClaim, law: 'steady' }
    expect(headline(judged(steady, fall(20)), steady)).toBe('Reads as odd rule, not steady')
  })

  it('says that a start claimed at rest is under way', () => {
    const claim: Claim = { ...fallClaim, start: 'rest' }
    const late = fall(20).slice(6)
    expect(headline(judged(fallClaim, late), fallClaim)).toMatch(/^Holds/)
    expect(headline(judged(claim, late), claim)).toBe('Already moving at the first drawing')
  })

  it('of several laws, says which frames are meant, and where a joint is broken', () => {
    const claim: Claim = { ...fallClaim, spans: [{ from: 1, to: 21, law: 'odd-rule' }, { from: 21, to: 41, law: 'steady' }] }
    const frames = Array.from({ length: 21 }, (_, i) => 1 + 2 * i)
    const list = (formula: (t: number) => number) => frames.map((frame) => ({ frame, reading: formula(frame - 1) }))
    // Both halves are falls; then a fall that stops gathering speed with a jump of it.
    expect(headline(judged(claim, list((t) => t * t)), claim)).toMatch(/^From frame 21 to 41: [a-z]/)
    expect(headline(judged(claim, list((t) => (t <= 20 ? t * t : 400 + 12 * (t - 20)))), claim)).toMatch(/^At frame 21 the speed jumps from 40\.0 to 12\.0 px per frame$/)
  })

  it('says why a list can’t be told', () => {
    expect(headline(judged(fallClaim, fall(3)), fallClaim)).toMatch(/^3 keys are too few for /)
  })

  it('is one short line, whatever the judge found', () => {
    const lists = [fall(3), fall(5), fall(40), brokenFall(), brokenFall(30), fall().map((key, i) => ({ ...key, reading: i % 2 ? 900 : -900 }))]
    for (const keys of lists)
      for (const law of ['odd-rule', 'steady'] as const) {
        const text = headline(judged({ ...fallClaim, law }, keys), { law })
        expect(text.length, text).toBeLessThanOrEqual(90)
        expect(text).toMatch(/^[A-Z0-9].*[^.:;(]$/)
      }
  })
})

describe('a take drawn small', () => {
  it('draws every drawing of a short list', () => {
    const answer = judged(fallClaim, fall(12))
    const sketch = makeSketch(4, answer, fallClaim)
    expect(sketch).toMatchObject({ number: 4, verdict: 'holds', drawings: 12 })
    expect(sketch.marks.map(({ frame }) => frame)).toEqual(fall(12).map(({ frame }) => frame))
  })

  it('keeps of 2,000 drawings its ends and all that break, in order, and crosses the wire small', () => {
    const keys = fall(2000).map((key, i) => ([400, 1200, 1201].includes(i) ? { ...key, reading: key.reading + 5e3 } : key))
    const answer = judged(fallClaim, keys.map(({ frame, reading }) => ({ frame, reading: reading / 10 })))
    const breaking = answer.keys.filter(({ breaks }) => breaks).map(({ frame }) => frame)
    const { marks, drawings } = makeSketch(1, answer, fallClaim)
    expect(breaking.length).toBeGreaterThan(0)
    expect(drawings).toBe(2000)
    expect(marks).toHaveLength(MAX_MARKS)
    const frames = marks.map(({ frame }) => frame)
    expect(frames).toEqual([...new Set(frames)].sort((a, b) => a - b))
    expect(frames[0]).toBe(keys[0]!.frame)
    expect(frames.at(-1)).toBe(keys.at(-1)!.frame)
    for (const frame of breaking.slice(0, MAX_MARKS - 2)) expect(frames).toContain(frame)
    expect(JSON.stringify(marks).length).toBeLessThan(6_000)
  })

  it('never has more marks than a sheet has room for, even when everything breaks', () => {
    const answer = judged(fallClaim, fall(200))
    const all = { ...answer, keys: answer.keys.map((key) => ({ ...key, breaks: true })) }
    const { marks } = makeSketch(1, all, fallClaim)
    expect(marks).toHaveLength(MAX_MARKS)
    expect(marks.every(({ breaks }) => breaks)).toBe(true)
  })

  it('draws no line of the law where none could be fitted', () => {
    expect(makeSketch(1, judged(fallClaim, fall(3)), fallClaim).marks.map(({ law }) => law)).toEqual([null, null, null])
  })

  it('rounds to what can be seen, however small or large the readings are', () => {
    for (const factor of [1e-4, 1, 1e4]) {
      const keys = fall(10).map(({ frame, reading }) => ({ frame, reading: (reading * factor) / 3 }))
      const span = keys.at(-1)!.reading
      for (const [i, mark] of makeSketch(1, judged({ ...fallClaim, slop: 0 }, keys), fallClaim).marks.entries())
        expect(Math.abs(mark.reading - keys[i]!.reading)).toBeLessThanOrEqual(span / 1000)
    }
  })
})
