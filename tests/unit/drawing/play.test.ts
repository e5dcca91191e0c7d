import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { Claim } from '~/utils/contracts/production'
import { postedList, ruledLists } from '~/utils/drawing/play/lists'
import { overTheEdge } from '~/utils/drawing/play/overTheEdge'
import { drawPlay } from '~/utils/drawing/play/stage'
import { pullOf } from '~/utils/drawing/play/straight'
import { readsOf } from '~/utils/drawing/reads'
import type { CheckResult, JudgedKey, Law } from '~/utils/motion/types'

const key = (frame: number, reading: number, law: number | null = reading): JudgedKey => ({
  frame, reading, law, offset: 0, offsetFrames: 0, gap: null, lawGap: null, allowance: 1, breaks: false,
})
const answer = (keys: JudgedKey[], more: Partial<CheckResult> = {}): CheckResult => ({
  verdict: 'holds', reason: null, keys, findings: [], readsAs: [], size: null, claim: null, ruled: { fit: [], claim: null }, ...more,
})
const claim = (law: Law, measure: Claim['measure'], subject?: Claim['subject']): Claim => ({ law, measure, unit: measure === 'angle' ? 'deg' : 'px', slop: 0.3, tolerance: 0.1, ...(subject && { subject }) })
const stageOf = (told: CheckResult, of: Claim, width = 700) => drawPlay(told, of, readsOf(told, of), [postedList(told), ...ruledLists(told, of.subject).slice(0, 1)], width)
const numbers = (path: string) => path.match(/-?\d+(\.\d+)?/g)!.map(Number)

describe('what is watched beside what', () => {
  const keys = [key(1, 0), key(3, 4), key(5, 16)]
  it('is the law through the drawings, and the claimed size first where that is what is wrong', () => {
    const sized = { fit: keys.map(({ frame, reading }) => ({ frame, reading })), claim: keys.map(({ frame }) => ({ frame, reading: 1 })) }
    const subject = { shape: 'rod', height: 38 } as const
    expect(ruledLists(answer(keys, { ruled: sized }), subject).map(({ by, name }) => [by, name])).toEqual([['fit', 'ruled'], ['claim', 'ruled for 38 m']])
    const wrong = answer(keys, { ruled: sized, findings: [{ kind: 'wrong-scale', frames: [], amount: 0.2, text: '' }] })
    expect(ruledLists(wrong, subject)[0]).toMatchObject({ by: 'claim', readings: [1, 1, 1] })
  })
  it('is nothing where no law could be fitted', () => {
    const mute = answer(keys.map((one) => ({ ...one, law: null })))
    expect(ruledLists(mute, undefined)).toEqual([])
    expect(stageOf(mute, claim('topple', 'angle')).panels).toHaveLength(1)
  })
})

describe('the stage', () => {
  const bodies = [
    ['rod', claim('topple', 'angle', { shape: 'rod', height: 3 })],
    ['block', claim('topple', 'angle', { shape: 'block', width: 1, height: 3 })],
    ['cylinder', claim('topple', 'angle', { shape: 'cylinder', radius: 1, height: 3 })],
    ['pole', claim('topple', 'angle', { shape: 'pole', height: 3, mass: 4, headMass: 6, headHeight: 2.8 })],
    ['bob', claim('pendulum', 'angle', { shape: 'bob', length: 2 })],
    ['hung rod', claim('swing-decay', 'angle', { shape: 'hung-rod', length: 2 })],
    ['custom body', claim('spin', 'angle', { shape: 'custom', equalLength: 2 })],
    ['fall', claim('odd-rule', 'distance')],
    ['ramp', claim('odd-rule', 'distance', { slope: 20, roll: 'ball' })],
    ['slide to a stop', claim('slow-in', 'distance')],
    ['bounce', claim('bounce', 'distance')],
  ] as const
  it.each(bodies)('keeps every pose of a %s on the paper, posted and ruled alike', (_, of) => {
    fc.assert(fc.property(fc.array(fc.double({ min: -85, max: 89, noNaN: true }), { minLength: 3, maxLength: 20 }), fc.integer({ min: 280, max: 1200 }), (readings, width) => {
      const told = answer(readings.map((reading, i) => key(i * 2 + 1, reading)))
      const stage = stageOf(told, of, width)
      expect(stage.panels).toHaveLength(2)
      for (const panel of stage.panels) {
        expect(panel.x + panel.width).toBeLessThanOrEqual(width + 0.1)
        expect(panel.y + panel.height).toBeLessThanOrEqual(stage.height)
        for (let i = 0; i < readings.length; i++) {
          const pose = panel.pose(i)
          expect(pose).not.toMatch(/NaN|Infinity|undefined/)
          const [x, y] = numbers(pose)
          expect(x).toBeGreaterThan(-panel.x - 20)
          expect(x).toBeLessThan(panel.width + 20)
          expect(y).toBeGreaterThan(-20)
          expect(y).toBeLessThan(panel.height + 20)
        }
      }
      expect(stage.panels[0]!.pose(1)).toBe(stage.panels[1]!.pose(1))
    }), { numRuns: 40 })
  })
  it('puts a ball where points are, y down or up as posted', () => {
    const points = [{ x: 10, y: 100 }, { x: 20, y: 60 }, { x: 30, y: 40 }]
    const told = answer(points.map((point, i) => ({ ...key(i + 1, i), point, lawPoint: point })), { reads: { measure: 'distance', unit: 'px' }, path: null })
    const height = (of: Claim, i: number) => numbers(stageOf(told, of).panels[0]!.pose(i))[1]!
    const down = claim('flight', 'point')
    expect(height(down, 0)).toBeGreaterThan(height(down, 2))
    expect(height({ ...down, yAxis: 'up' }, 0)).toBeLessThan(height({ ...down, yAxis: 'up' }, 2))
  })
  it('knows which way gravity pulls, whichever way the readings count, and through a bounce', () => {
    const fall = (sign: number) => [0, 1, 4, 9, 16].map((reading, i) => key(i, sign * reading))
    expect([pullOf(fall(1)), pullOf(fall(-1))]).toEqual([1, -1])
    // Heights over the floor: down, off the floor, up and down again.
    expect(pullOf([16, 15, 12, 7, 0, 5, 8, 9, 8, 5, 0].map((reading, i) => key(i, reading)))).toBe(-1)
  })
})

describe('over the edge', () => {
  /**
   * A thin rod from upright rest leaves at cos θ = 3/5 (53.13°, a textbook value); by energy it turns there at θ′² = (3g/h)(1 − cos θ)
   * (moment of inertia mh²/3 about its foot). After that its centre has nothing but gravity on it.
   */
  const g = 9.80665
  const [h, fps] = [2, 24]
  const left = Math.acos(0.6)
  const rate = Math.sqrt(((3 * g) / h) * 0.4) / fps
  const angleAt = (frames: number) => ((left + rate * frames) * 180) / Math.PI
  const told = answer([-1, 0, 2, 4, 6, 8].map((after) => key(20 + after, angleAt(after))), {
    figures: [
      { kind: 'release', value: 20, low: 19, high: 21, unit: 'frame' },
      { kind: 'release-angle', value: (left * 180) / Math.PI, low: 53, high: 54, unit: 'deg' },
    ],
  })
  const of = claim('over-edge', 'angle', { shape: 'rod', height: h })
  const foot = overTheEdge(told, of, 1)!
  /** Centre of the rod in metres, x the way it falls and y down. */
  const centre = (i: number) => {
    const turned = left + rate * (told.keys[i]!.frame - 20)
    return { x: (foot(i).x + Math.sin(turned) / 2) * h, y: (foot(i).y - Math.cos(turned) / 2) * h }
  }
  it('stays on the brink until it leaves', () => {
    expect([foot(0), foot(1)]).toEqual([{ x: 0, y: 0 }, { x: 0, y: 0 }])
  })
  it('flies with one gravity, steadily sideways', () => {
    const step = 2 / fps
    for (const i of [2, 3, 4]) {
      const [a, b, c] = [centre(i - 1), centre(i), centre(i + 1)]
      expect((c.y - 2 * b.y + a.y) / step ** 2).toBeCloseTo(g, 6)
      expect(c.x - 2 * b.x + a.x).toBeCloseTo(0, 9)
      // Half the length times the rate, along the arc: the speed that it left with.
      expect((b.x - a.x) / step).toBeCloseTo((h / 2) * rate * fps * Math.cos(left), 6)
    }
  })
  it('falls the way it leans, and stays put where no release was found', () => {
    expect(overTheEdge(told, of, -1)!(3).x).toBeCloseTo(-foot(3).x, 9)
    expect(overTheEdge({ ...told, figures: [] }, of, 1)).toBeNull()
    expect(overTheEdge(told, { ...of, law: 'topple' }, 1)).toBeNull()
  })
})
