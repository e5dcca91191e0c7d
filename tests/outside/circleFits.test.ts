/**
 * Circles through drawings against a general-purpose least-squares library (ml-levenberg-marquardt) minimising the same squared distances
 * in centre and radius, and against the circle through three points by the textbook's determinant.
 */
import { levenbergMarquardt } from 'ml-levenberg-marquardt'
import { describe, expect, it } from 'vitest'
import { centreOf, curveThrough, radiusOf } from '../../utils/motion/path/curve'
import { fitCurve } from '../../utils/motion/path/curveFit'
import { sheetOf } from '../../utils/motion/path/sheet'
import type { PointCheck } from '../../utils/motion'
import { Chance } from '../bench/lists/random'

interface Arc { cx: number, cy: number, radius: number, from: number, to: number, n: number, noise: number }

function drawn({ cx, cy, radius, from, to, n, noise }: Arc, seed: number): PointCheck {
  const chance = new Chance(seed)
  const keys = Array.from({ length: n }, (_, i) => {
    const angle = from + (to - from) * i / (n - 1)
    return { frame: i, x: cx + radius * Math.cos(angle) + noise * chance.bell(), y: cy + radius * Math.sin(angle) + noise * chance.bell() }
  })
  return { law: 'spin', fps: 24, measure: 'point', unit: 'px', slop: 20, tolerance: 0.1, yAxis: 'up', keys }
}

/** Distances from the circle by the library: y is 0 everywhere, x only counts the drawings. */
function byLibrary({ keys }: PointCheck, start: [number, number, number]): { parameterValues: number[], cost: number } {
  const off = ([a = 0, b = 0, r = 0]: number[]) => (i: number) => Math.hypot((keys[i]?.x ?? 0) - a, (keys[i]?.y ?? 0) - b) - r
  const { parameterValues } = levenbergMarquardt(
    { x: keys.map((_, i) => i), y: keys.map(() => 0) }, off,
    { initialValues: start, damping: 1e-3, gradientDifference: 1e-4, maxIterations: 300, errorTolerance: 1e-12, centralDifference: true },
  )
  const cost = keys.reduce((sum, _, i) => sum + off(parameterValues)(i) ** 2, 0)
  return { parameterValues, cost }
}

const arcs: [string, Arc][] = [
  ['a full circle', { cx: 300, cy: -120, radius: 80, from: 0, to: 6, n: 30, noise: 0.5 }],
  ['a half circle', { cx: -40, cy: 900, radius: 400, from: 0.3, to: 3.3, n: 25, noise: 0.7 }],
  ['a quarter circle far from the corner', { cx: 90_000, cy: -70_000, radius: 250, from: 1, to: 2.5, n: 20, noise: 0.4 }],
  ['an arc of forty degrees', { cx: 10, cy: 20, radius: 600, from: -1, to: -0.3, n: 24, noise: 0.5 }],
  ['an arc of ten degrees', { cx: 0, cy: 0, radius: 2000, from: 0.6, to: 0.77, n: 30, noise: 0.3 }],
]

describe('circles through drawings', () => {
  it.each(arcs)('%s comes out as by the library', (_name, arc) => {
    for (let seed = 1; seed <= 8; seed++) {
      const request = drawn(arc, seed)
      const sheet = sheetOf(request)
      const { curve, off } = fitCurve(sheet, new Float64Array(sheet.n).fill(1e9), 1e9, true)
      const centre = centreOf(curve)!
      const ours = [centre.x + sheet.origin.x, centre.y + sheet.origin.y, radiusOf(curve)]
      const library = byLibrary(request, [arc.cx, arc.cy, arc.radius])
      const cost = off.reduce((sum, d) => sum + d * d, 0)
      // The search for least squares can't do better than the least: where the two differ, ours has to be the lower.
      expect(cost).toBeLessThanOrEqual(library.cost * (1 + 1e-6))
      expect(cost).toBeGreaterThan(library.cost * 0.99)
      ours.forEach((value, k) => expect(Math.abs(value - library.parameterValues[k]!)).toBeLessThan(2e-3 * arc.radius))
    }
  })

  it('goes through three points exactly', () => {
    // (0,0), (4,0), (0,3): a right angle, so the longest side is a diameter (Thales).
    const curve = curveThrough({ x: 4, y: 0 }, { x: 0, y: 0 }, { x: 0, y: 3 })!
    expect(radiusOf(curve)).toBeCloseTo(2.5, 12)
    expect(centreOf(curve)!.x).toBeCloseTo(2, 12)
    expect(centreOf(curve)!.y).toBeCloseTo(1.5, 12)
  })

  it('goes flat through three points of a line, without a centre', () => {
    const curve = curveThrough({ x: -1, y: -2 }, { x: 0, y: 0 }, { x: 3, y: 6 })!
    expect(curve.bend).toBe(0)
    expect(centreOf(curve)).toBeNull()
  })

  it('knows how well it knows: the curvature’s 95 % interval holds the true one in about 95 of 100 noisy arcs', () => {
    let held = 0
    const arc: Arc = { cx: 0, cy: 0, radius: 500, from: 0, to: 0.9, n: 18, noise: 0.5 }
    for (let seed = 1; seed <= 400; seed++) {
      const sheet = sheetOf(drawn(arc, seed))
      // A slop of three spreads of the pencil, as slop is meant.
      const { curve, bendSpread } = fitCurve(sheet, new Float64Array(sheet.n).fill(1e9), 1.5, true)
      if (Math.abs(Math.abs(curve.bend) - 1 / 1000) <= bendSpread) held++
    }
    // Binomial: 380 ± 4.4; three spreads either way.
    expect(held).toBeGreaterThanOrEqual(367)
    expect(held).toBeLessThanOrEqual(393)
  })

  it('is not bent by two bad drawings', () => {
    for (let seed = 1; seed <= 40; seed++) {
      const chance = new Chance(1000 + seed)
      const request = { ...drawn({ cx: 50, cy: 70, radius: 300, from: 0.2, to: 0.2 + chance.between(0.8, 4), n: 20, noise: 0.3 }, seed), slop: 1 }
      const bad = [chance.whole(0, 9), chance.whole(10, 19)]
      for (const i of bad) {
        const key = request.keys[i]!
        const by = chance.one([1, -1]) * chance.between(30, 250)
        const away = Math.hypot(key.x - 50, key.y - 70)
        key.x += by * (key.x - 50) / away
        key.y += by * (key.y - 70) / away
      }
      const sheet = sheetOf(request)
      const { curve, counts } = fitCurve(sheet, new Float64Array(sheet.n).fill(3), 1, true)
      expect(bad.map(i => counts[i])).toEqual([0, 0])
      // What pencil of 0.3 px may do to the radius of the shortest of these arcs, and then some.
      expect(Math.abs(radiusOf(curve) / 300 - 1)).toBeLessThan(0.03)
    }
  })
})
