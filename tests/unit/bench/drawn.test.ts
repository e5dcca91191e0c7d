import { describe, expect, it } from 'vitest'
import { chartLine, stretches } from '~/utils/bench/chart'
import { comparedIn, listIn, motionIn } from '~/utils/bench/planning'
import { freshSetup } from '~/utils/bench/setup'
import type { BenchSetup } from '~/utils/bench/setup'
import { drawStage } from '~/utils/bench/stage'
import { overlaps } from '~/utils/drawing/labels'

const bench = (part: Partial<BenchSetup>): BenchSetup => ({ ...freshSetup(), ...part })
/** Where the lines of a path begin and bend, across. */
const acrossIn = (path: string) => [...path.matchAll(/[ML](-?\d+(?:\.\d+)?) /g)].map(([, x]) => Number(x))
const numbersIn = (path: string) => path.match(/-?\d+(\.\d+)?/g)!.map(Number)

describe('the timing chart', () => {
  it.each([280, 720, 1400])('numbers lie inside %s px and never touch each other', (width) => {
    for (const on of [1, 2, 4]) {
      const line = chartLine(listIn(bench({ height: 38, on })), width)
      expect(line.numbers.length).toBeGreaterThan(2)
      line.numbers.forEach(({ box }, i) => {
        expect(box.x).toBeGreaterThanOrEqual(0)
        expect(box.x + box.width).toBeLessThanOrEqual(width)
        for (const other of line.numbers.slice(i + 1)) expect(overlaps(box, other.box, 0)).toBe(false)
      })
      expect(line.keys.map(({ x, rx }) => [x - rx >= 0, x + rx <= width])).toEqual([[true, true], [true, true]])
    }
  })

  it('has a tick for every drawing, spaced as the list is', () => {
    const keys = listIn(bench({ height: 1, lean: 1 }))
    const line = chartLine(keys, 720)
    expect(line.ticks.match(/M/g)).toHaveLength(keys.length)
    expect(line.keys.map(({ frame }) => frame)).toEqual([1, 33])
  })

  it('divides a swing where it turns', () => {
    const keys = listIn(bench({ law: 'pendulum', body: 'bob', length: 1, amplitude: 30, swings: 1, on: 1 }))
    const runs = stretches(keys)
    expect(runs).toHaveLength(2)
    expect(runs[0]!.at(-1)).toEqual(runs[1]![0])
    expect(runs[0]!.at(-1)!.reading).toBeLessThan(-29.5)
  })

  it('a list that stands still is no reason to fail', () => {
    const still = [1, 2, 3].map((frame) => ({ frame, reading: 5 }))
    expect(stretches(still)).toEqual([still])
    expect(numbersIn(chartLine(still, 300).ticks).every(Number.isFinite)).toBe(true)
  })
})

describe('the stage', () => {
  const setups: [string, BenchSetup][] = [
    ['rods', bench({ height: 1 })],
    ['blocks', bench({ body: 'block', width: 0.4, height: 1 })],
    ['poles', bench({ body: 'pole' })],
    ['bobs', bench({ law: 'pendulum', body: 'bob', length: 1, amplitude: 150 })],
    ['falls', bench({ law: 'odd-rule', way: 1 })],
    ['ramps', bench({ law: 'odd-rule', way: 1, slope: 15, roll: 'ball' })],
    ['ways', bench({ law: 'steady', way: 1 })],
    ['stops', bench({ law: 'slow-in', way: 1 })],
    ['bounces', bench({ law: 'bounce', way: 1 })],
    ['throws', bench({ law: 'flight' })],
    ['throws down a cliff', bench({ law: 'flight', throwAngle: -60, landing: 30 })],
    ['dying swings', bench({ law: 'swing-decay', body: 'hung-rod', length: 1, amplitude: 40, swings: 3 })],
    ['rods over the edge', bench({ law: 'over-edge', height: 1 })],
    ['blocks over the edge', bench({ law: 'over-edge', body: 'block', width: 0.6, height: 1, brink: 12 })],
    ['spins', bench({ law: 'spin' })],
  ]
  describe.each(setups)('%s', (_, setup) => {
    it.each([260, 700, 1100])('stand inside %s px, with words that do not touch', (width) => {
      const several = { ...setup, beside: [4, 16, 64] }
      const stage = drawStage(several, width)
      const boxes = stage.bodies.map(({ label, labelX, labelY }) => ({ x: labelX - label.length * 3.8, y: labelY - 10, width: label.length * 7.6, height: 13 }))
      boxes.forEach((box, i) => {
        expect(box.x).toBeGreaterThanOrEqual(-1)
        expect(box.x + box.width).toBeLessThanOrEqual(width + 1)
        for (const other of boxes.slice(i + 1)) expect(overlaps(box, other, 0)).toBe(false)
      })
      for (const [i, body] of stage.bodies.entries()) {
        const { moments, end } = motionIn(comparedIn(several)[i]!.setup)
        for (const moment of [...moments, end]) {
          expect(body.pose(moment)).not.toContain('NaN')
          for (const x of acrossIn(body.pose(moment))) expect(x >= -1 && x <= width + 1).toBe(true)
        }
        expect(body.path + body.scene).not.toContain('NaN')
      }
    })
  })

  it('is to one scale: the second fall is four times as long on paper', () => {
    const paths = drawStage(bench({ law: 'odd-rule', way: 1, beside: [4] }), 700).bodies.map(({ path }) => numbersIn(path))
    const long = ([, from, , to]: number[]) => to! - from!
    expect(long(paths[1]!) / long(paths[0]!)).toBeCloseTo(4, 1)
  })
})
