import { describe, expect, it } from 'vitest'
import { laws } from '~/utils/contracts/check'
import { findingKey } from '~/utils/drawing/findings'
import { verdictInWords } from '~/utils/drawing/verdict'
import { sizeWithInterval } from '~/utils/motion/sizeWords'
import {
  bodyInWords,
  claimInWords,
  dayInWords,
  dueWords,
  earlyOrLate,
  exposureInWords,
  figure,
  frameCount,
  framesInWords,
  initials,
  metres,
  roundFigure,
  shortTime,
  signedFigure,
  tellingFrames,
  withUnit,
} from '~/utils/drawing/words'
import type { CheckResult, Finding } from '~/utils/motion/types'

describe('figures', () => {
  it('has a true minus, and none on a zero', () => {
    expect(figure(-0.14)).toBe('−0.1')
    expect(figure(-0.04)).toBe('0.0')
    expect(signedFigure(3.21)).toBe('+3.2')
    expect(signedFigure(0.04)).toBe('0.0')
  })
  it('writes a dash where there is no number', () => {
    for (const none of [null, undefined, Number.NaN, Number.POSITIVE_INFINITY]) expect(figure(none)).toBe('–')
    expect(withUnit(null, 'deg')).toBe('–')
  })
  it('keeps the telling digits only', () => {
    expect([8.24, 38, 0.4512, 1200, 0.05].map((value) => roundFigure(value))).toEqual(['8.2', '38', '0.45', '1200', '0.05'])
    expect([0.05, 0.5, 8.2, 38].map((value) => metres(value))).toEqual(['5 cm', '0.5 m', '8.2 m', '38 m'])
  })
  it('counts frames as people do', () => {
    expect([0.8, 1, 2.7, 85].map((value) => frameCount(value))).toEqual(['0.8 frame', '1 frame', '2.7 frames', '85 frames'])
    expect([2.71, -0.8, 0.01].map(earlyOrLate)).toEqual(['2.7 early', '0.8 late', 'on the line'])
  })
  it('says nothing in frames about an offset that nobody can see', () => {
    expect(tellingFrames({ offset: 0.01, offsetFrames: 16.7, breaks: false }, 1)).toBeNull()
    expect(tellingFrames({ offset: 0.4, offsetFrames: 16.7, breaks: false }, 1)).toBe(16.7)
  })
})

describe('names of things', () => {
  it('names the body and the claim', () => {
    expect(bodyInWords({ shape: 'block', width: 6, height: 38 })).toBe('block 6 × 38 m')
    expect(bodyInWords({ unitsPerMetre: 80 })).toBe('80 px/m')
    expect(bodyInWords({ slope: 12, roll: 'ball' })).toBe('12° ramp, a rolling ball')
    expect(claimInWords({ law: 'pendulum', unit: 'deg', subject: { shape: 'bob', length: 1.4 } })).toBe('pendulum · bob on 1.4 m')
    expect(claimInWords(null)).toBe('not claimed yet')
  })
  it('names frames, a run only where it has no hole', () => {
    expect(framesInWords([])).toBe('whole list')
    expect(framesInWords([61])).toBe('61')
    expect(framesInWords([41, 43, 45], [39, 41, 43, 45, 47])).toBe('41–45')
    expect(framesInWords([41, 45, 47], [39, 41, 43, 45, 47])).toBe('41, 45, 47')
  })
  it('tells the exposure', () => {
    expect(exposureInWords([1, 3, 5, 7])).toBe('on twos')
    expect(exposureInWords([1, 3, 4])).toBeNull()
  })
  it('finds initials in any script', () => {
    expect(['Mira Ilves', '王小明', 'Ольга Демидова', 'Zoë', 'ñandú 🦤', '🦤', 'Anne-Marie de la Tour'].map(initials)).toEqual([
      'MI', '王', 'ОД', 'Z', 'Ñ', '?', 'AT',
    ])
  })
  it('tells findings of the same kind apart', () => {
    expect(findingKey({ kind: 'misplaced', frames: [61] })).not.toBe(findingKey({ kind: 'misplaced', frames: [63] }))
  })
})

describe('days', () => {
  it('says when', () => {
    expect(shortTime('2026-12-01T10:42:07.000Z', '2026-12-03')).toBe('1 Dec, 10:42')
    expect(dayInWords('2025-12-01', '2026-12-03')).toBe('1 Dec 2025')
  })
  it.each([
    ['2026-12-01', 'due today', false],
    ['2026-12-02', 'due tomorrow', false],
    ['2026-12-04', 'due Fri', false],
    ['2026-12-07', 'due Mon', false],
    ['2026-12-08', 'due 8 Dec', false],
    ['2027-01-04', 'due 4 Jan 2027', false],
    ['2026-11-30', '1 day late', true],
    ['2026-11-29', '2 days late', true],
  ])('on 1 December, %s is "%s"', (day, text, late) => {
    expect(dueWords(day, '2026-12-01')).toMatchObject({ text, late })
  })
})

describe('the verdict in a sentence', () => {
  const answer: CheckResult = {
    verdict: 'holds', reason: null, keys: [], findings: [], readsAs: [], size: null, claim: null, ruled: { fit: [], claim: null },
  }
  const claim = { law: 'topple', unit: 'deg', subject: { shape: 'block', width: 6, height: 38 } } as const
  const size = { value: 8.2, low: 7.8, high: 8.6, unit: 'm' }

  it('tells the size read, the size claimed and the frames it takes', () => {
    const wrong: CheckResult = {
      ...answer,
      verdict: 'breaks',
      size,
      claim: { frames: 182, usedFrames: 85 },
      findings: [{ kind: 'wrong-scale', frames: [], amount: 0.22, text: 'unused' }],
    }
    expect(verdictInWords(wrong, claim)).toEqual({
      word: 'Breaks.',
      rest: 'The shape is a topple, but it reads as 8.2 m (7.8–8.6), not 38 m: that size needs 182 frames, this takes 85.',
    })
  })
  it('says a start under way before the size, and from rest where that was claimed and holds', () => {
    const moving: Finding = { kind: 'not-at-rest', frames: [1], amount: 0.5, text: 'Already moving at the first drawing: reads as let go half a frame before it.' }
    const scale: Finding = { kind: 'wrong-scale', frames: [], amount: 0.22, text: 'unused' }
    expect(verdictInWords({ ...answer, verdict: 'breaks', size, findings: [moving, scale] }, claim).rest).toBe(`${moving.text} One more finding below.`)
    expect(verdictInWords(answer, { ...claim, start: 'rest' }).rest).toBe('Every drawing sits inside its allowance: it reads as a topple, from rest.')
  })
  it('names every law of a list under several, and every single one', () => {
    const span = { contact: false, verdict: 'holds', reason: null, misfit: 0.2, readsAs: [], size: null, figures: [] } as const
    const joint = { frame: 20, contact: false, before: 4, after: 4, apart: 0, holds: true }
    const thrown: CheckResult = { ...answer, spans: [{ ...span, readsAs: [], figures: [], from: 1, to: 20, law: 'slow-in' }, { ...span, readsAs: [], figures: [], from: 20, to: 40, law: 'steady' }], joints: [joint] }
    expect(verdictInWords(thrown, { law: 'slow-in', unit: 'px' }).rest).toBe('Every drawing sits inside its allowance, and the joints hold: it reads as a slow in, then even spacing.')
    for (const law of laws) expect(verdictInWords(answer, { law, unit: 'px' }).rest).toMatch(/it reads as (an? |the |even )[a-z ]+\.$/)
  })
  it('gives the reason where nothing can be told', () => {
    expect(verdictInWords({ ...answer, verdict: 'undecided', reason: 'Four keys are too few.' }, claim).rest).toBe('Four keys are too few.')
  })
  it('widens an interval to the digits that make it one', () => {
    expect(sizeWithInterval(size)).toBe('8.2 m (7.8–8.6)')
    expect(sizeWithInterval({ ...size, low: 8.19, high: 8.21 })).toBe('8.20 m (8.19–8.21)')
    expect(sizeWithInterval({ ...size, value: 38, low: 30, high: 47 })).toBe('38 m (30–47)')
    expect(sizeWithInterval({ ...size, value: 0.046, low: 0.041, high: 0.052 })).toBe('4.6 cm (4.1–5.2)')
    expect(sizeWithInterval({ value: 81.2, low: 0, high: 200, unit: 'px/m' })).toBe('81 px/m (up to 200)')
  })
  it('says no interval that would read the same at both ends, and none that says nothing', () => {
    expect(sizeWithInterval({ ...size, low: 8.2, high: 8.2 })).toBe('8.2 m')
    expect(sizeWithInterval({ ...size, value: 7.535, low: 7.5349, high: 7.5351 })).toBe('7.535 m')
    expect(sizeWithInterval({ ...size, low: 8.2e-6, high: 8.2e6 })).toBe('8.2 m (from under a tenth to over ten times that)')
  })
})
