import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { courseIn } from '~/utils/bench/course'
import { askedFields } from '~/utils/bench/fields'
import { cornersAt, touchesAfter } from '~/utils/bench/ground'
import { endsEarly, happeningsIn } from '~/utils/bench/happenings'
import { benchLaws } from '~/utils/bench/laws'
import { listTable } from '~/utils/bench/listTable'
import { meaningOf } from '~/utils/bench/meaning'
import { chartKeysIn, listIn, motionIn, outcomeIn, planKeysIn, pointListIn } from '~/utils/bench/planning'
import { problemIn } from '~/utils/bench/plans'
import { rangeOf } from '~/utils/bench/size'
import { freshSetup, toldBy, withBenchLaw } from '~/utils/bench/setup'
import type { BenchLaw } from '~/utils/bench/laws'
import type { BenchSetup } from '~/utils/bench/setup'
import { laws } from '~/utils/contracts/check'

/** The laws that came to the bench later, against what a school book says of them. */

const G = 9.80665
const bench = (law: BenchLaw, part: Partial<BenchSetup> = {}): BenchSetup => ({ ...withBenchLaw(freshSetup(), law), ...part })
const told = (setup: BenchSetup, what: string) => happeningsIn(setup, courseIn(setup)).find((each) => each.what.startsWith(what))!

describe('slow in', () => {
  const stop = bench('slow-in', { way: 3, stopAfter: 1.5, scale: 100, on: 1 })

  it('told by seconds or by its first speed is one motion: way = ½·speed·time', () => {
    const fast = { ...stop, ...toldBy(stop, 'speed') }
    expect(fast.startSpeed).toBeCloseTo(4, 12)
    expect(outcomeIn(fast).seconds).toBeCloseTo(1.5, 12)
    expect(listIn(fast)).toEqual(listIn(stop))
    expect({ ...fast, ...toldBy(fast, 'seconds') }.stopAfter).toBeCloseTo(1.5, 12)
  })

  it('is the odd rule backwards: equal times before the stop leave 1 : 4 : 9 of the way', () => {
    const left = courseIn(stop).keys.map(({ reading }) => 300 - reading).reverse()
    expect(left[0]).toBeCloseTo(0, 9)
    for (const n of [2, 3, 7]) expect(left[n]! / left[1]!).toBeCloseTo(n * n, 6)
    expect(told(stop, 'Stands').frame).toBeCloseTo(37, 9)
  })
})

describe('spin', () => {
  it('turns by 360° · turns per second · time, and says what that is from drawing to drawing', () => {
    const spin = bench('spin', { rate: 1.5, turns: 3, fps: 24, on: 2 })
    expect(outcomeIn(spin).seconds).toBeCloseTo(2, 12)
    courseIn(spin).keys.forEach(({ reading }, i) => expect(reading).toBeCloseTo(45 * i, 9))
    expect(told(spin, 'From drawing').much).toBe('45.0°')
    expect(told(spin, 'More than half')).toBeUndefined()
    expect(told({ ...spin, rate: 7 }, 'More than half').much).toContain('other way')
  })
})

describe('bounce', () => {
  // Newton's law of restitution: speed by e, so height by e² and time in the air by e, at every contact. Any mechanics textbook.
  const e = 0.6
  const ball = bench('bounce', { way: 2, back: 60, bounces: 4, on: 1, fps: 240, scale: 100 })
  const fall = Math.sqrt((2 * 2) / G)
  const contacts = [0, 1, 2, 3].map((n) => fall * (1 + (2 * e * (1 - e ** n)) / (1 - e)))

  it('meets the ground when the geometric series says, and ends on the last contact', () => {
    contacts.forEach((seconds, n) => expect(told(ball, `Contact ${n + 1}`).frame).toBeCloseTo(1 + 240 * seconds, 6))
    expect(outcomeIn(ball).seconds).toBeCloseTo(contacts[3]!, 9)
    expect(motionIn(ball).end.reading).toBeCloseTo(200, 6)
  })

  it('comes back to e² of the height before', () => {
    const heights = courseIn(ball).keys.map(({ reading }) => 2 - reading / 100)
    for (const n of [1, 2, 3]) {
      const [from, to] = [240 * contacts[n - 1]!, 240 * contacts[n]!]
      const highest = Math.max(...heights.filter((_, frame) => frame >= from && frame <= to))
      // Between two drawings at 240 fps nothing near the top falls further than ½·g·(1/480 s)².
      expect(Math.abs(highest - 2 * e ** (2 * n))).toBeLessThan((G / 2) * (1 / 480) ** 2 + 1e-9)
    }
  })
})

describe('dying swing', () => {
  it('has lost its share after every full swing', () => {
    const swing = bench('swing-decay', { length: 1, amplitude: 12, lost: 8, swings: 4 })
    const after = (swings: number) => motionIn({ ...swings ? { ...swing, swings } : swing }).end.reading
    for (const n of [1, 2, 4]) expect(after(n) / (12 * 0.92 ** n)).toBeCloseTo(1, 2)
    expect(told(swing, 'Amplitude left').much).toBe('8.6°')
    expect(told(swing, 'Half').much).toBe('after 8.31 swings')
  })
})

describe('flight', () => {
  // Projectile without air: range v²·sin 2α/g on level ground, height v²·sin²α/2g, apex after v·sin α/g. Any mechanics textbook.
  it.each([[6, 45], [9, 30], [9, 60], [20, 75]])('thrown at %s m/s and %s°', (speed, angle) => {
    const shot = bench('flight', { throwSpeed: speed, throwAngle: angle, landing: 0 })
    const alpha = (angle * Math.PI) / 180
    expect(rangeOf(shot)).toBeCloseTo((speed ** 2 * Math.sin(2 * alpha)) / G, 9)
    expect(courseIn(shot).flight!.range).toBeCloseTo(rangeOf(shot), 9)
    expect(courseIn(shot).flight!.height).toBeCloseTo((speed * Math.sin(alpha)) ** 2 / (2 * G), 9)
    expect(told(shot, 'Apex').frame).toBeCloseTo(1 + (24 * speed * Math.sin(alpha)) / G, 9)
  })

  it('thrown level it falls as what is dropped: √(2h/g)', () => {
    const level = bench('flight', { throwSpeed: 3, throwAngle: 0, landing: 5 })
    expect(outcomeIn(level).seconds).toBeCloseTo(Math.sqrt(10 / G), 9)
    expect(told(level, 'Apex')).toBeUndefined()
    expect(problemIn({ ...level, landing: 0 })).toContain('drop')
  })

  it('lists points: steady sideways, second gaps even downward, y down', () => {
    const points = pointListIn(bench('flight', { on: 2, scale: 1000 }))!
    expect(points[0]).toEqual({ frame: 1, x: 0, y: 0 })
    const gaps = points.slice(1).map(({ x, y }, i) => ({ x: x - points[i]!.x, y: y - points[i]!.y }))
    for (const { x } of gaps) expect(x).toBeCloseTo(gaps[0]!.x, 0)
    gaps.slice(1).forEach(({ y }, i) => expect(y - gaps[i]!.y).toBeCloseTo((G * 1000) / 12 ** 2, 0))
  })

  it('is charted by the way along its path', () => {
    const shot = bench('flight', { throwAngle: 60 })
    const chart = chartKeysIn(courseIn(shot))
    const points = courseIn(shot).points!
    expect(chart[1]!.reading).toBeCloseTo(Math.hypot(points[1]!.x, points[1]!.y), 9)
    chart.slice(1).forEach(({ reading }, i) => expect(reading).toBeGreaterThan(chart[i]!.reading))
  })
})

describe('over the edge', () => {
  // The motion sheet: a thin rod from balance leaves at 53.13°; from a lean, cos θ = q·cos θ₀/(1+q), q = 3/2.
  it('lets go where the motion sheet says', () => {
    const release = (lean: number) => courseIn(bench('over-edge', { lean })).edge!.release.angle
    expect(release(0.01)).toBeCloseTo(53.13, 2)
    expect(Math.cos((release(10) * Math.PI) / 180)).toBeCloseTo(0.6 * Math.cos(Math.PI / 18), 9)
  })

  it.each(['rod', 'block', 'cylinder', 'pole'] as const)('a %s flies until its lowest corner is on the ground', (body) => {
    const setup = bench('over-edge', { body, brink: 8 })
    const { end, edge } = courseIn(setup)
    const pivot = { x: end.at!.x - edge!.reach * Math.sin((end.reading * Math.PI) / 180), y: end.at!.y - edge!.reach * Math.cos((end.reading * Math.PI) / 180) }
    const subject = { rod: { shape: 'rod', height: 2 }, block: { shape: 'block', width: 0.5, height: 2 }, cylinder: { shape: 'cylinder', radius: 0.3, height: 2 }, pole: { shape: 'pole', height: 2, mass: 4, headMass: 6, headHeight: 1.8 } } as const
    expect(Math.min(...cornersAt(subject[body], end.reading).map(({ y }) => pivot.y + y))).toBeCloseTo(-8, 6)
    expect(problemIn(setup)).toBeNull()
  })

  it('a block has its corners where it stood: square at its own upright lean', () => {
    const upright = (Math.atan2(0.5, 2) * 180) / Math.PI
    const corners = cornersAt({ shape: 'block', width: 0.5, height: 2 }, -upright)
    for (const [x, y] of [[0, 0], [-0.5, 0], [-0.5, 2], [0, 2]])
      expect(corners.some((corner) => Math.hypot(corner.x - x!, corner.y - y!) < 1e-12)).toBe(true)
  })

  it('says when nothing can leave the brink', () => {
    expect(problemIn(bench('over-edge', { body: 'block', width: 2, height: 1, brink: 0.01 }))).toContain('higher')
    expect(touchesAfter({ shape: 'block', width: 2, height: 1 }, 1, 5).tooSoon).toBe(false)
  })
})

describe('a block’s topple', () => {
  it('says that it is planned until its side meets the ground', () => {
    expect(endsEarly(bench('topple', { body: 'block', width: 1, height: 1 }))).toContain('45.0° past balance')
    expect(endsEarly(bench('topple', { body: 'rod' }))).toBeNull()
    expect(endsEarly(bench('over-edge', { body: 'block' }))).toBeNull()
  })
})

describe('the list in figures', () => {
  const table = (setup: BenchSetup) => listTable(planKeysIn(setup), 'deg', 'px', setup.fps)
  const heads = (setup: BenchSetup) => table(setup).columns.map(({ head }) => head)

  it('tells readings and gaps, of a throw its points, of a fall over the edge both', () => {
    expect(heads(bench('spin'))).toEqual(['drawing', 'reading °', 'gap °', 'time s'])
    expect(heads(bench('flight'))).toEqual(['drawing', 'x px', 'y px', 'to the next px', 'time s'])
    expect(heads(bench('over-edge'))).toEqual(['drawing', 'reading °', 'gap °', 'x px', 'y px', 'time s'])
  })

  it('has one cell per column on every row, and the last drawing no next one', () => {
    const setup = bench('flight')
    const count = planKeysIn(setup).length
    for (let i = 0; i < count; i++) expect(table(setup).row(i).cells).toHaveLength(heads(setup).length)
    expect(table(setup).row(0)).toEqual({ frame: 1, cells: ['1', '0.0', '0.0', expect.stringMatching(/^\d+\.\d$/), '0.00'] })
    expect(table(setup).row(count - 1).cells[3]).toBe('–')
  })
})

describe('every law', () => {
  it('stands in one group of the form', () => {
    expect([...benchLaws].sort()).toEqual([...laws].sort())
  })

  it('has words for what its numbers mean, and asks for no number twice', () => {
    for (const law of benchLaws) {
      const asked = askedFields(bench(law))
      expect(new Set(asked.map(({ label }) => label)).size).toBe(asked.length)
      expect(meaningOf(bench(law)).length).toBeGreaterThan(40)
    }
  })

  it('plans finite figures from whatever the form lets through', () => {
    const number = (low: number, high: number) => fc.double({ min: low, max: high, noNaN: true })
    const setups = fc.record({
      law: fc.constantFrom(...benchLaws), height: number(0.01, 1000), width: number(0.01, 1000), radius: number(0.01, 1000), length: number(0.01, 1000),
      headHeight: number(0.01, 1000), lean: number(0.01, 89), amplitude: number(0.1, 179), way: number(0.01, 1000), back: number(5, 95), bounces: fc.integer({ min: 1, max: 20 }),
      throwSpeed: number(0.1, 300), throwAngle: number(-85, 85), landing: number(0, 1000), brink: number(0.01, 1000), rate: number(0.01, 100), turns: number(0.05, 1000),
      lost: number(0.1, 50), swings: number(0.25, 50), body: fc.constantFrom('rod', 'block', 'cylinder', 'pole', 'bob', 'hung-rod', 'custom'), fps: number(1, 240), on: fc.constantFrom(1, 2, 3, 4),
    })
    fc.assert(
      fc.property(setups, ({ law, body, ...rest }) => {
        const setup = withBenchLaw({ ...freshSetup(), ...rest, body } as BenchSetup, law)
        if (problemIn(setup)) return
        const course = courseIn(setup)
        expect(Number.isFinite(course.frames)).toBe(true)
        for (const { frame, reading } of [...listIn(setup, course), { frame: 1, reading: course.end.reading }]) expect([frame, reading].every(Number.isFinite)).toBe(true)
        for (const { x, y } of pointListIn(setup, course) ?? []) expect(Number.isFinite(x) && Number.isFinite(y)).toBe(true)
        for (const { much, frame } of happeningsIn(setup, course)) expect(`${much} ${frame}`).not.toMatch(/NaN|undefined|Infinity/)
      }),
      { numRuns: 200 },
    )
  })
})
