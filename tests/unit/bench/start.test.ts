import { describe, expect, it } from 'vitest'
import { listIn, motionIn } from '~/utils/bench/planning'
import type { BenchLaw } from '~/utils/bench/laws'
import { freshSetup, withBenchLaw } from '~/utils/bench/setup'
import type { BenchSetup } from '~/utils/bench/setup'
import type { PointKey } from '~/utils/motion/types'
import { draftFrom, fitsClaim, keysFor, shotsFor, writtenIn } from '~/utils/bench/start'
import type { Claim, Sheet } from '~/utils/contracts/production'
import { readDraft } from '~/utils/posting/draft'
import { readRows } from '~/utils/posting/rows'

const claim: Claim = { law: 'topple', measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1 }
const rod = { ...freshSetup(), height: 1, lean: 1 }

describe('from the bench into a draft', () => {
  it('counts from the shot’s own first frame', () => {
    const keys = keysFor(rod, { claim, fps: 24, firstFrame: 1001 })
    expect(keys[0]).toEqual({ frame: 1001, reading: 1 })
    expect(keys.map((key) => 'reading' in key && key.reading)).toEqual(listIn(rod).map(({ reading }) => reading))
  })

  it('plans at the shot’s rate and in its drawing scale', () => {
    expect(keysFor(rod, { claim, fps: 48, firstFrame: 1 }).length).toBe(33)
    const drop = { ...freshSetup(), law: 'odd-rule' as const, way: 1 }
    const scaled: Claim = { ...claim, law: 'odd-rule', measure: 'distance', unit: 'px', subject: { unitsPerMetre: 400 } }
    const last = keysFor({ ...drop, on: 1 }, { claim: scaled, fps: 24, firstFrame: 1 }).at(-1)!
    const exact = motionIn({ ...drop, on: 1, scale: 400 }).moments.at(-1)!.reading
    expect(last).toMatchObject({ reading: expect.closeTo(exact, 0) })
  })

  it('tells angles along an arc, and from the drawing that reads 0', () => {
    const [first] = keysFor(rod, { claim: { ...claim, measure: 'arc', unit: 'px', radius: 180 / Math.PI, zeroAt: 0.4 }, fps: 24, firstFrame: 1 })
    expect(first).toMatchObject({ reading: expect.closeTo(0.6, 6) })
  })

  describe('where the claim reads points', () => {
    const paper: Claim = { ...claim, law: 'flight', measure: 'point', unit: 'px' }
    const xy = (setup: BenchSetup, part: Partial<Claim> = {}) => keysFor(setup, { claim: { ...paper, ...part }, fps: 24, firstFrame: 101 }) as PointKey[]
    const shot = withBenchLaw({ ...freshSetup(), throwAngle: 60, landing: 0, scale: 200 }, 'flight')

    it('a throw is told in points, from the first frame, y the way the claim counts it', () => {
      expect(xy(shot)[0]).toEqual({ frame: 101, x: 0, y: 0 })
      expect(xy(shot)[2]!.y).toBeLessThan(0)
      expect(xy(shot, { yAxis: 'up' }).map(({ y }) => -y || 0)).toEqual(xy(shot).map(({ y }) => y || 0))
      expect(xy(shot, { subject: { unitsPerMetre: 400 } })[2]!.x / xy(shot)[2]!.x).toBeCloseTo(2, 1)
    })

    it('a body over the edge is told by its middle, from the brink that the claim has as its pivot', () => {
      const body = withBenchLaw({ ...freshSetup(), height: 1, scale: 100 }, 'over-edge')
      const [first] = xy(body, { law: 'over-edge', pivot: { x: 640, y: 360 } })
      // Half the rod's height from the brink, a degree from upright.
      expect(first!.x).toBeCloseTo(640 + 50 * Math.sin(Math.PI / 180), 0)
      expect(first!.y).toBeCloseTo(360 - 50 * Math.cos(Math.PI / 180), 0)
      expect(keysFor(body, { claim: { ...claim, law: 'over-edge' }, fps: 24, firstFrame: 1 })[0]).toEqual({ frame: 1, reading: 1 })
    })

    it('a bounce runs straight down, a ramp along its slope', () => {
      const ball = withBenchLaw({ ...freshSetup(), way: 2 }, 'bounce')
      expect(new Set(xy(ball, { law: 'bounce' }).map(({ x }) => x))).toEqual(new Set([0]))
      const ramp = withBenchLaw({ ...freshSetup(), slope: 30, way: 2 }, 'odd-rule')
      const last = xy(ramp, { law: 'odd-rule' }).at(-1)!
      expect(last.y / last.x).toBeCloseTo(Math.tan(Math.PI / 6), 2)
    })

    it('what can’t be told in a measure is not offered for it', () => {
      const can = (law: BenchLaw) => (['angle', 'arc', 'distance', 'point'] as const).filter((measure) => fitsClaim({ law }, { measure }))
      expect(can('flight')).toEqual(['point'])
      expect(can('over-edge')).toEqual(['angle', 'arc', 'point'])
      expect(can('bounce')).toEqual(['distance', 'point'])
      expect(can('spin')).toEqual(['angle', 'arc'])
      expect(can('slow-in')).toEqual(['distance', 'point'])
      expect(can('swing-decay')).toEqual(['angle', 'arc'])
    })

    it('is a draft that the posting form can read', () => {
      const stored = JSON.stringify(draftFrom(xy(shot), '0190a2a4-9c8e-7b61-8a3e-1f2d3c4b5a69', '2026-01-01T00:00:00.000Z'))
      expect(writtenIn(stored)).toBe(xy(shot).length)
    })
  })

  it('offers only shots that it can be told to, that aren’t settled, and where one may post', () => {
    const sheet = (code: string, part: Partial<Sheet>) => ({ code, desk: 'animator', claim, animator: null, ...part }) as Sheet
    const sheets = [sheet('A-1', {}), sheet('A-2', { desk: 'settled' }), sheet('A-3', { claim: null }), sheet('A-4', { claim: { ...claim, law: 'steady', measure: 'distance', unit: 'px' } }), sheet('A-5', {})]
    expect(shotsFor(rod, sheets, ({ code }) => code !== 'A-5').map(({ code }) => code)).toEqual(['A-1'])
    expect(fitsClaim({ ...rod, law: 'steady' }, { measure: 'distance' })).toBe(true)
  })

  it('is a draft that the posting form can read, and says how much is written in one', () => {
    const stored = JSON.stringify(draftFrom(listIn(rod), '0190a2a4-9c8e-7b61-8a3e-1f2d3c4b5a69', '2026-01-01T00:00:00.000Z'))
    expect(readRows(readDraft(stored)!.rows).keys).toEqual(listIn(rod))
    expect(writtenIn(stored)).toBe(17)
    expect(writtenIn(null)).toBe(0)
    expect(writtenIn('not a draft')).toBe(0)
  })
})
