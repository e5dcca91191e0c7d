/**
 * Over the edge, against textbook angles, against energy, and against odex (E. Hairer, S. Nørsett, G. Wanner, Solving Ordinary
 * Differential Equations I, II.9) run on Newton's laws with the moment of leaving found by halving the time.
 */
import { describe, expect, it } from 'vitest'
import { edgeMotion, edgeRatio, leavesEdgeAt, plannedEdge, toppleMeasure } from '../../utils/motion'
import type { BodySubject } from '../../utils/motion'
import { edgeEnergy, leavingCosine, overBrink, releaseAt } from '../../utils/motion/edge'
import { overEdgeStates } from '../bench/lists/edgeMotion'
import type { EdgeBody } from '../bench/lists/edgeMotion'

const G = 9.80665
const DEGREE = 180 / Math.PI

/** Bodies with their distance and central moment from first principles: rod h²/12, block (w²+h²)/12, solid ball 2r²/5, point 0. */
const BODIES: [string, EdgeBody][] = [
  ['thin rod', { d: 0.5, inertia: 1 / 12, gravity: G }],
  ['block', { d: Math.hypot(1, 3) / 2, inertia: (1 + 9) / 12, gravity: G }],
  ['solid ball', { d: 0.2, inertia: 0.4 * 0.04, gravity: G }],
  ['sliding point', { d: 2, inertia: 0, gravity: G }],
  ['rod on the Moon', { d: 4, inertia: 64 / 12, gravity: 1.62 }],
]
const ratioOf = ({ d, inertia }: EdgeBody) => 2 * d * d / (inertia + d * d)
const paceOf = ({ d, inertia, gravity }: EdgeBody) => Math.sqrt(gravity * d / (inertia + d * d))

describe('where it leaves', () => {
  it('is where textbooks say, from balance: 53.13° rod, 53.97° ball, 48.19° point', () => {
    const at = (name: string) => leavesEdgeAt(ratioOf(BODIES.find(([each]) => each === name)?.[1] as EdgeBody))
    // cos = 3/5, the 3-4-5 triangle; cos = 10/17, ball rolling off; cos = 2/3, the point sliding down a dome (all three: motion.md).
    expect(at('thin rod')).toBeCloseTo(53.13010235415598, 10)
    expect(at('solid ball')).toBeCloseTo(53.97, 2)
    expect(Math.cos(at('solid ball') / DEGREE)).toBeCloseTo(10 / 17, 12)
    expect(at('sliding point')).toBeCloseTo(48.19, 2)
    expect(Math.cos(at('sliding point') / DEGREE)).toBeCloseTo(2 / 3, 12)
  })

  it('agrees with the bodies of the bench', () => {
    expect(edgeRatio({ shape: 'rod', height: 1 })).toBeCloseTo(ratioOf(BODIES[0]?.[1] as EdgeBody), 12)
    expect(edgeRatio({ shape: 'block', width: 1, height: 3 })).toBeCloseTo(ratioOf(BODIES[1]?.[1] as EdgeBody), 12)
  })

  it.each(BODIES)('%s: the same angle, moment and turn as by integration, at rest, pushed on, pushed back', (_name, body) => {
    const q = ratioOf(body)
    const k = paceOf(body)
    let compared = 0
    for (const lean of [-25, -3, 0.5, 4, 30, 70]) {
      for (const push of [-0.7, -0.05, 0, 0.02, 0.4, 0.9]) {
        const start = lean / DEGREE
        const { release: truth } = overEdgeStates(body, start, push * k, 0.5 / k, 60, state => state.free)
        const found = releaseAt(start, push, leavingCosine(q, edgeEnergy(start, push)))
        if (!truth) throw new Error('never left')
        // The integrator's own error grows like e^{kt} near balance; 1e-8 of a radian is far below any pencil.
        expect(found.angle).toBeCloseTo(truth.angle, 8)
        expect(found.tau / k).toBeCloseTo(truth.t, 7)
        expect(found.turn * k).toBeCloseTo(truth.turn, 7)
        if (found.tau > 0) expect(leavesEdgeAt(q, lean, push)).toBeCloseTo(Math.abs(truth.angle) * DEGREE, 6)
        compared++
      }
    }
    expect(compared).toBe(36)
  })

  it('is reached after the topple’s own time', () => {
    for (const lean of [0.1, 2, 15]) {
      const start = lean / DEGREE
      const { tau, angle } = releaseAt(start, 0, leavingCosine(1.5, edgeEnergy(start, 0)))
      expect(tau).toBeCloseTo(toppleMeasure(lean, angle * DEGREE), 10)
    }
  })

  it('is at once where the body is too fast to stay on: v² > g·d at the top (school mechanics)', () => {
    // p² = (d/g)·θ′²·2/q: at upright the brink lets go where p²/2 > 1/q.
    expect(releaseAt(0, Math.sqrt(2 / 1.5) * 1.001, leavingCosine(1.5, edgeEnergy(0, Math.sqrt(2 / 1.5) * 1.001))).tau).toBe(0)
    expect(releaseAt(0, Math.sqrt(2 / 1.5) * 0.999, leavingCosine(1.5, edgeEnergy(0, Math.sqrt(2 / 1.5) * 0.999))).tau).toBeGreaterThan(0)
  })
})

describe('energy', () => {
  it('is kept to 1e-9 over the arc', () => {
    const angle = new Float64Array(400)
    const rate = new Float64Array(400)
    for (const [start, push] of [[0.001, 0], [0.05, 0], [0.4, 0], [-0.3, 0.6], [0.02, -0.3]] as const) {
      const energy = edgeEnergy(start, push)
      const release = releaseAt(start, push, leavingCosine(1.5, energy))
      const taus = Float64Array.from({ length: 400 }, (_, i) => i / 399 * release.tau)
      overBrink(start, push, release, taus, 400, angle, rate)
      for (let i = 0; i < 400; i++) expect(Math.abs(edgeEnergy(angle[i] as number, rate[i] as number) - energy)).toBeLessThan(1e-9)
      // And nothing jumps where it lets go.
      expect(Math.abs(edgeEnergy(release.angle, release.turn) - energy)).toBeLessThan(1e-9)
    }
  })

  it('of the flying body, fall and turn together, is that of the body at rest: m·g·h = m·v²/2 + I·ω²/2', () => {
    const subject = { shape: 'block', width: 1, height: 3 } as const
    const motion = edgeMotion(subject, 4)
    const h = 1e-4
    const inertia = (1 + 9) / 12
    const rest = G * motion.reach * Math.cos(4 / DEGREE)
    const end = motion.landsAfter(10)
    for (const part of [0.2, 0.6, 0.9, 0.999]) {
      const t = part * end
      const [a, b, c] = [motion.at(t - h), motion.at(t), motion.at(t + h)]
      const v = Math.hypot(c.centre.x - a.centre.x, c.centre.y - a.centre.y) / (2 * h)
      const w = (c.angle - a.angle) / DEGREE / (2 * h)
      // Speeds by differences: good to h².
      expect(G * b.centre.y + v * v / 2 + inertia * w * w / 2).toBeCloseTo(rest, 5)
    }
  })
})

describe('the planned body', () => {
  const cases: [BodySubject, EdgeBody, number][] = [
    [{ shape: 'rod', height: 2 }, { d: 1, inertia: 4 / 12, gravity: G }, 3],
    [{ shape: 'block', width: 1, height: 3, gravity: 1.62 }, { d: Math.hypot(1, 3) / 2, inertia: 10 / 12, gravity: 1.62 }, 10],
    [{ shape: 'cylinder', radius: 0.4, height: 1.5 }, { d: Math.hypot(0.4, 0.75), inertia: 0.4 ** 2 / 4 + 1.5 ** 2 / 12, gravity: G }, -6],
  ]

  it.each(cases)('%o stands at every frame where the integration has it', (subject, body, lean) => {
    const plan = { subject, lean, drop: 6, fps: 24, exposure: 1, firstFrame: 1, unitsPerMetre: 80, brink: { x: 300, y: 200 } }
    const planned = plannedEdge(plan)
    const { states, release } = overEdgeStates(body, lean / DEGREE, 0, 1 / 24, 2000, state => state.y < -6)
    expect(planned.angles.length).toBe(states.length - 1)
    planned.angles.forEach(({ reading }, i) => expect(reading).toBeCloseTo((states[i]?.angle ?? NaN) * DEGREE, 6))
    planned.points.forEach(({ x, y }, i) => {
      expect(x).toBeCloseTo(300 + 80 * (states[i]?.x ?? NaN), 5)
      expect(y).toBeCloseTo(200 - 80 * (states[i]?.y ?? NaN), 5)
    })
    expect(planned.release.seconds).toBeCloseTo(release?.t ?? NaN, 7)
    expect(planned.release.centre.x).toBeCloseTo(release?.x ?? NaN, 7)
    expect(planned.turnRate).toBeCloseTo((release?.turn ?? NaN) * DEGREE, 6)
    expect(planned.landing.centre.y).toBeCloseTo(-6, 9)
    expect(Math.ceil(planned.frames)).toBe(states.length - 1)
  })

  it('needs twice the frames at four times the size and drop (common practice; exact here)', () => {
    const plan = { lean: 5, fps: 24, exposure: 1 }
    const small = plannedEdge({ ...plan, subject: { shape: 'rod', height: 1 }, drop: 2 })
    const large = plannedEdge({ ...plan, subject: { shape: 'rod', height: 4 }, drop: 8 })
    expect(large.frames / small.frames).toBeCloseTo(2, 12)
    expect(large.release.angle).toBeCloseTo(small.release.angle, 12)
  })
})
