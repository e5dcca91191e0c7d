/** Dying swings by the bench's own integrator. */
import { describe, expect, it } from 'vitest'
import { judge } from '../../../utils/motion'
import type { CheckResult, ReadingCheck } from '../../../utils/motion'
import { GRAVITY } from '../../bench/lists/motion'
import { dragged } from '../../bench/lists/moreMotion'

const DEGREE = 180 / Math.PI
const reads = { fps: 24, measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1, law: 'swing-decay' } as const

/** A bob on `length` metres, every swing losing `share`, on twos from frame 1. */
function dying(degrees: number, share: number, length: number, frames: number, turn = 0): ReadingCheck {
  const angles = dragged(GRAVITY / length, -Math.log(1 - share), false, degrees / DEGREE, turn / DEGREE, 24, frames)
  const keys = angles.map((angle, i) => ({ frame: 1 + i, reading: Math.round(angle * DEGREE * 10) / 10 })).filter((_, i) => i % 2 === 0)
  return { ...reads, keys }
}
const kinds = ({ findings }: CheckResult) => findings.map(({ kind }) => kind)
const lost = ({ figures }: CheckResult) => figures?.find(({ kind }) => kind === 'share-lost')?.value

describe('a dying swing', () => {
  it.each([[40, 0.1, 1, 120, 0], [-60, 0.05, 3, 150, 0], [0, 0.08, 2, 120, 100], [20, 0.2, 0.6, 90, -40], [70, 0.12, 8, 240, 0]])(
    'from %d° that loses %d per swing holds, and both size and share are told', (degrees, share, length, frames, turn) => {
      const result = judge(dying(degrees, share, length, frames, turn))
      expect(result.verdict).toBe('holds')
      expect(Math.abs((lost(result) ?? NaN) - 100 * share)).toBeLessThan(0.6)
      expect((result.size?.value ?? NaN) / length).toBeCloseTo(1, 2)
    },
  )

  it('held, skipped and misplaced drawings are told as such', () => {
    const whole = dying(40, 0.1, 1, 150)
    for (const by of [1, -1]) {
      const keys = whole.keys.slice(0, -1).map(({ frame }, i) => ({ frame, reading: whole.keys[i >= 20 ? i - by : i]?.reading ?? NaN }))
      expect(judge({ ...whole, keys }).findings).toMatchObject([{ kind: by > 0 ? 'held' : 'skipped', frames: [41], amount: 2 }])
    }
    const off = whole.keys.map((key, i) => (i === 20 ? { ...key, reading: key.reading - 6 } : key))
    expect(judge({ ...whole, keys: off }).findings).toMatchObject([{ kind: 'misplaced', frames: [41] }])
  })

  it('another size is told; a swing that does not die holds with nothing lost', () => {
    expect(kinds(judge({ ...dying(40, 0.1, 1, 120), subject: { shape: 'bob', length: 4 } }))).toEqual(['wrong-scale'])
    const undying = judge(dying(40, 0, 1, 120))
    expect(undying.verdict).toBe('holds')
    expect(lost(undying)).toBeLessThan(0.2)
    // A pendulum does as well with one number fewer.
    expect(undying.readsAs[0]?.law).toBe('pendulum')
  })

  it('posted as a pendulum it reads as what it is, however many drawings one could blame instead', () => {
    const result = judge({ ...dying(40, 0.12, 1, 150), law: 'pendulum' })
    expect(result.findings.map(({ text }) => text)).toEqual(['This is not a pendulum; it reads as a dying swing.'])
  })

  it('let go at its first drawing it starts from rest, six frames later it does not', () => {
    const whole: ReadingCheck = { ...dying(50, 0.1, 2, 150), start: 'rest' }
    expect(judge(whole).verdict).toBe('holds')
    const { findings } = judge({ ...whole, keys: whole.keys.slice(3) })
    expect(findings.map(({ kind }) => kind)).toEqual(['not-at-rest'])
    expect(findings[0]?.amount).toBeCloseTo(6, 0)
  })

  it('takes six keys to tell', () => {
    expect(judge(dying(40, 0.1, 1, 8)).reason).toContain('it takes 6')
  })
})
