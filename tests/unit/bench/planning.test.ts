import { describe, expect, it } from 'vitest'
import { comparedIn, claimIn, listIn, motionIn, outcomeIn, pencilStep, planKeysIn, setupForFrames } from '~/utils/bench/planning'
import { flatAngle, problemIn } from '~/utils/bench/plans'
import { atSize, sizeIn } from '~/utils/bench/size'
import { freshSetup } from '~/utils/bench/setup'
import type { BenchSetup } from '~/utils/bench/setup'
import { requestFor } from '~/utils/contracts/check'
import { judge } from '~/utils/motion'

const bench = (part: Partial<BenchSetup>): BenchSetup => ({ ...freshSetup(), ...part })
const outcomeAt = (setup: BenchSetup, size: number) => outcomeIn(atSize(setup, size))

describe('size → frames', () => {
  // The table of the motion sheet: a rod of 1 m, standard gravity, from rest at a lean until it lies.
  it.each([[0.1, 1.96823349679], [0.5, 1.54860673821], [1, 1.3678933792], [2, 1.18720619194], [5, 0.948478638292], [10, 0.768109360781], [20, 0.587729114381]])(
    'a rod of 1 m from %s° takes %s s',
    (lean, seconds) => {
      const outcome = outcomeIn(bench({ height: 1, lean }))
      expect(outcome.seconds).toBeCloseTo(seconds, 10)
      expect(outcome.frames).toBeCloseTo(seconds * 24, 8)
    },
  )

  it('counts frames and drawings: 32.8 frames are 33 whole ones, 17 drawings on twos', () => {
    const outcome = outcomeIn(bench({ height: 1, lean: 1 }))
    expect(outcome.frames.toFixed(1)).toBe('32.8')
    expect(outcome.wholeFrames).toBe(33)
    expect(outcome.drawings).toBe(17)
    expect(listIn(bench({ height: 1, lean: 1 })).at(-1)?.frame).toBe(33)
    expect(outcomeIn(bench({ height: 1, lean: 1, on: 1 })).drawings).toBe(33)
    expect(outcomeIn(bench({ height: 1, lean: 1, on: 3 })).drawings).toBe(11)
  })

  // Whatever gravity moves scales by time squared (dimensions alone); so does what brakes as hard.
  it.each([
    bench({ height: 1 }),
    bench({ body: 'block', width: 0.4, height: 1.2 }),
    bench({ body: 'cylinder', radius: 0.2, height: 1.2 }),
    bench({ body: 'pole' }),
    bench({ law: 'pendulum', body: 'bob', amplitude: 70 }),
    bench({ law: 'swing-decay', body: 'hung-rod', amplitude: 40, swings: 2 }),
    bench({ law: 'over-edge', height: 1.2 }),
    bench({ law: 'over-edge', body: 'block', width: 0.4, height: 1.2 }),
    bench({ law: 'odd-rule', way: 1, slope: 20, roll: 'ball' }),
    bench({ law: 'bounce', way: 1 }),
    bench({ law: 'flight' }),
    bench({ law: 'slow-in', way: 1 }),
  ])('four times the size, twice the frames (%#)', (setup) => {
    const size = sizeIn(setup)!
    expect(outcomeAt(setup, 4 * size).frames / outcomeIn(setup).frames).toBeCloseTo(2, 9)
    expect(comparedIn({ ...setup, beside: [16 * size, 4 * size] }).map((each) => outcomeIn(each.setup).frames / outcomeIn(setup).frames)).toEqual([
      expect.closeTo(1, 9), expect.closeTo(2, 9), expect.closeTo(4, 9),
    ])
  })

  it.each([bench({ law: 'steady', way: 3 }), bench({ law: 'slow-in', way: 3, by: 'speed' })])('a given speed takes four times as long for four times the way (%#)', (setup) => {
    expect(outcomeAt(setup, 12).frames / outcomeIn(setup).frames).toBeCloseTo(4, 10)
  })

  it('a free fall of 4.903325 m takes one second; on the Moon longer by the root of the gravities', () => {
    const fall = bench({ law: 'odd-rule', way: 9.80665 / 2 })
    expect(outcomeIn(fall).seconds).toBeCloseTo(1, 12)
    expect(outcomeIn({ ...fall, gravity: 'moon' }).seconds).toBeCloseTo(Math.sqrt(9.80665 / 1.62), 12)
    expect(outcomeIn({ ...fall, gravity: 'mars' }).seconds).toBeCloseTo(Math.sqrt(9.80665 / 3.71), 12)
    expect(outcomeIn({ ...fall, gravity: 'own', ownGravity: 2.4516625 }).seconds).toBeCloseTo(2, 12)
  })

  it('a seconds pendulum of small amplitude swings in two seconds', () => {
    expect(outcomeIn(bench({ law: 'pendulum', body: 'bob', length: 0.99362, amplitude: 0.1 })).seconds).toBeCloseTo(2, 4)
  })

  it('what stands broad lies flat sooner, and can’t lean further than that', () => {
    const block = bench({ body: 'block', width: 1, height: 1, lean: 44 })
    expect(flatAngle(block)).toBeCloseTo(45, 12)
    expect(problemIn(block)).toBeNull()
    expect(problemIn({ ...block, lean: 45 })).toContain('45°')
    expect(motionIn(block).end.reading).toBeCloseTo(45, 12)
  })
})

describe('frames → size', () => {
  it.each([
    bench({ height: 1 }),
    bench({ body: 'block', width: 6, height: 38, lean: 1.5 }),
    bench({ law: 'over-edge', body: 'block', width: 6, height: 38, lean: 1.5, brink: 60 }),
    bench({ law: 'pendulum', body: 'hung-rod', amplitude: 120, swings: 1.5 }),
    bench({ law: 'swing-decay', body: 'bob', amplitude: 20, swings: 3 }),
    bench({ law: 'odd-rule', way: 3, slope: 12, roll: 'hoop', gravity: 'mars' }),
    bench({ law: 'bounce', way: 2, back: 60, bounces: 4 }),
    bench({ law: 'flight', throwAngle: -20, landing: 3, gravity: 'moon' }),
    bench({ law: 'slow-in', way: 3, stopAfter: 1.25 }),
    bench({ law: 'slow-in', way: 3, by: 'speed', startSpeed: 5 }),
    bench({ law: 'steady', way: 3, speed: 1.25 }),
  ])('the size that so many frames read as needs so many frames (%#)', (setup) => {
    for (const frames of [9, 48, 187.5]) {
      const there = setupForFrames(setup, frames)
      expect(outcomeIn(there).frames).toBeCloseTo(frames, 7)
      expect(sizeIn(atSize(setup, sizeIn(there)!))).toBeCloseTo(sizeIn(there)!, 8)
    }
    expect(sizeIn(setupForFrames(setup, outcomeIn(setup).frames))).toBeCloseTo(sizeIn(setup)!, 9)
  })

  it('a spin has no size: so many frames read as a rate', () => {
    const spin = bench({ law: 'spin', rate: 2, turns: 3 })
    expect(sizeIn(spin)).toBeNull()
    expect(comparedIn({ ...spin, beside: [1, 4] })).toEqual([{ setup: { ...spin, beside: [1, 4] }, planned: true }])
    expect(setupForFrames(spin, 72).rate).toBeCloseTo(1, 12)
  })
})

describe('the list', () => {
  it('holds before the judge, and reads as the planned size', () => {
    const setup = bench({ body: 'block', width: 6, height: 38, lean: 1.5 })
    const answer = judge(requestFor(claimIn(setup), setup.fps, listIn(setup)))
    expect(answer.verdict).toBe('holds')
    expect(answer.size!.low).toBeLessThan(38)
    expect(answer.size!.high).toBeGreaterThan(38)
  })

  it('is rounded to a tenth beside the exact law, finer where it spans little', () => {
    const keys = planKeysIn(bench({ height: 1, lean: 1 }))
    expect(keys[0]).toMatchObject({ frame: 1, reading: 1, law: 1 })
    for (const { reading, law } of keys) {
      expect(Math.abs(reading - law!)).toBeLessThanOrEqual(0.05 + 1e-6)
      expect(reading).toBeCloseTo(Math.round(reading * 10) / 10, 9)
    }
    expect(pencilStep(1)).toBe(0.001)
    expect(pencilStep(400)).toBe(0.1)
  })

  it('keeps a drop in its drawing scale: gaps 1 : 3 : 5', () => {
    const [first, second, third] = planKeysIn(bench({ law: 'odd-rule', way: 8, scale: 1000, on: 4 })).map(({ gap }) => gap!)
    expect(second! / first!).toBeCloseTo(3, 2)
    expect(third! / first!).toBeCloseTo(5, 2)
  })

  it('never has more than 2,000 drawings', () => {
    const long = bench({ height: 1000, lean: 0.01, gravity: 'own', ownGravity: 0.01, fps: 240, on: 1 })
    expect(planKeysIn(long)).toHaveLength(2000)
    expect(outcomeIn(long).drawings).toBeGreaterThan(2000)
  })

  it('knows where a swing comes to its end, however long it takes', () => {
    const swing = (swings: number, length = 1) => motionIn(bench({ law: 'pendulum', body: 'bob', amplitude: 30, swings, length })).end.reading
    expect(swing(0.5)).toBeCloseTo(-30, 6)
    expect(swing(0.25)).toBeCloseTo(0, 6)
    expect(swing(50, 900)).toBeCloseTo(30, 4)
  })
})
