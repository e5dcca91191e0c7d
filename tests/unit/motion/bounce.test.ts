/** Bouncing balls, flown from contact to contact by the bench's own school algebra. */
import { describe, expect, it } from 'vitest'
import { judge, judgeInDepth, lawCurve } from '../../../utils/motion'
import type { CheckResult, ReadingCheck } from '../../../utils/motion'
import { bounced } from '../../bench/lists/moreMotion'

const reads = { fps: 24, measure: 'distance', unit: 'px', slop: 1, tolerance: 0.1, law: 'bounce' } as const

/** `every` frames from frame 1, 200 units to the metre; `up` +1 or −1: which way counts. */
function ball(height: number, speed: number, e: number, frames: number, every = 1, up = 1): ReadingCheck {
  const { heights } = bounced(height, speed, e, 24, frames)
  const keys = heights.map((metres, i) => ({ frame: 1 + i, reading: Math.round(2 * (30 + up * 200 * metres)) / 2 })).filter((_, i) => i % every === 0)
  return { ...reads, keys }
}
const kinds = ({ findings }: CheckResult) => findings.map(({ kind }) => kind)
const restitution = ({ figures }: CheckResult) => figures?.find(({ kind }) => kind === 'restitution')?.value
const contacts = ({ figures }: CheckResult) => (figures ?? []).filter(({ kind }) => kind === 'contact').map(({ value }) => value)

describe('a bounce', () => {
  it.each([
    ['let go', 2, 0, 0.7, 60, 1], ['falling', 1.5, -2, 0.8, 60, 2], ['rising', 1, 3, 0.6, 70, 2], ['off the ground', 0, 5, 0.75, 70, 2],
    ['to rest', 1, 0, 0.4, 60, 1], ['one contact', 3, 0, 0.8, 36, 1], ['on threes', 4, 0, 0.85, 120, 3],
  ] as const)('%s holds, either way up', (_, height, speed, e, frames, every) => {
    for (const up of [1, -1]) {
      const result = judge(ball(height, speed, e, frames, every, up))
      expect(result.verdict).toBe('holds')
      expect(restitution(result)).toBeCloseTo(e, 1)
      const [first] = bounced(height, speed, e, 24, frames).contacts
      expect(contacts(result)[0]).toBeCloseTo(1 + (first ?? NaN), 0)
      expect((result.size?.value ?? NaN) / 200).toBeCloseTo(1, 1)
    }
  })

  it('a held and a skipped drawing are told in the flight and after the contact', () => {
    const whole = ball(3, 0, 0.8, 60)
    for (const at of [8, 30]) {
      for (const by of [1, -1]) {
        const keys = whole.keys.slice(0, -1).map(({ frame }, i) => ({ frame, reading: whole.keys[i >= at ? i - by : i]?.reading ?? NaN }))
        expect(judge({ ...whole, keys }).findings).toMatchObject([{ kind: by > 0 ? 'held' : 'skipped', frames: [at + 1], amount: 1 }])
      }
    }
  })

  it('a drawing off the line is told, and nothing is ever backward', () => {
    const whole = ball(3, 0, 0.8, 60)
    const keys = whole.keys.map((key, i) => (i === 12 ? { ...key, reading: key.reading + 40 } : key))
    expect(judge({ ...whole, keys }).findings).toMatchObject([{ kind: 'misplaced', frames: [13] }])
  })

  it('another scale is told with its frames', () => {
    const result = judge({ ...ball(2, 0, 0.7, 60), subject: { unitsPerMetre: 600 } })
    expect(kinds(result)).toEqual(['wrong-scale'])
    expect((result.size?.value ?? NaN) / (9.80665 / 3)).toBeCloseTo(1, 1)
  })

  it('without a contact it is a fall; a ball posted as a fall reads as a bounce', () => {
    const fall = ball(3, 0, 0.8, 17)
    const falling = judge(fall)
    expect(kinds(falling)).toEqual(['wrong-law'])
    expect(falling.readsAs[0]?.law).toBe('odd-rule')
    const posted = judge({ ...ball(3, 0, 0.8, 60), law: 'odd-rule' })
    expect(posted.findings.map(({ text }) => text)).toEqual(['This is not the odd rule; it reads as a bounce.'])
  })

  it('let go at its first drawing it starts from rest; four frames later it does not', () => {
    const whole: ReadingCheck = { ...ball(3, 0, 0.7, 60), start: 'rest' }
    const { result, line } = judgeInDepth(whole)
    expect(result.verdict).toBe('holds')
    if (!line) throw new Error('a list that holds has a line')
    expect(lawCurve(line, whole, whole.keys.map(({ frame }) => frame))).toEqual(result.keys.map(({ law }) => law))
    const { findings } = judge({ ...whole, keys: whole.keys.slice(4) })
    expect(findings.map(({ kind }) => kind)).toEqual(['not-at-rest'])
    expect(findings[0]?.amount).toBeCloseTo(4, 0)
  })

  it('takes seven keys to tell', () => {
    expect(judge(ball(0.4, 0, 0.8, 5)).reason).toContain('it takes 7')
  })
})
