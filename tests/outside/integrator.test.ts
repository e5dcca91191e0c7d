/**
 * The exact solution against an independent integrator: odex (E. Hairer, S. Nørsett, G. Wanner, Solving Ordinary Differential
 * Equations I, II.9) at tolerance 1e-12, over a grid of sizes, leans, pushes and amplitudes, both sides of the top.
 */
import { describe, expect, it } from 'vitest'
import { freeSwing } from '../../utils/motion/swing'
import { Solver } from '../bench/lists/odex'

function integrate(pull: 1 | -1, kSquared: number, start: number, turn: number, until: number): [number, number] {
  const solver = new Solver(2)
  solver.absoluteTolerance = 1e-12
  solver.relativeTolerance = 1e-12
  const { y } = solver.solve((_t, state) => [state[1] as number, pull * kSquared * Math.sin(state[0] as number)], 0, [start, turn], until)
  return [y[0] as number, y[1] as number]
}

/** Worst difference in angle (radians) and in rate over k, and how many points were compared. */
function worstOver(pull: 1 | -1, starts: number[], pushes: number[]): { angle: number, rate: number, mean: number, points: number } {
  let angle = 0
  let rate = 0
  let sum = 0
  let points = 0
  const a = new Float64Array(1)
  const r = new Float64Array(1)
  for (const k of [0.5, 2, 9]) {
    for (const start of starts) {
      for (const push of pushes) {
        for (const tau of [0.3, 1.7, 4.5]) {
          freeSwing(start, push, pull === 1, [tau], 1, a, r)
          const [theta, turn] = integrate(pull, k * k, start, push * k, tau / k)
          const off = Math.abs((a[0] as number) - theta)
          angle = Math.max(angle, off)
          rate = Math.max(rate, Math.abs((r[0] as number) - turn / k))
          sum += off
          points++
        }
      }
    }
  }
  return { angle, rate, mean: sum / points, points }
}

// The error an integrator makes grows like e^{kt} near the top: e^4.5 is 90, and tolerance is per step. 1e-8 rad is 6e-7 degrees,
// far below any pencil.
const WORST = 1e-8

describe('exact solution and integrator', () => {
  it('topples from leans of 0.1° to 80°, at rest, pushed on and pushed back', () => {
    const { angle, rate, mean, points } = worstOver(1, [0.1, 1, 10, 35, 80].map(d => d * Math.PI / 180), [-0.4, 0, 0.05, 0.8, 2.5])
    expect(points).toBe(225)
    expect(angle).toBeLessThan(WORST)
    expect(rate).toBeLessThan(WORST)
    expect(mean).toBeLessThan(WORST / 10)
  })

  it('swings from 1° to 179°, at rest and moving, and over the top', () => {
    const { angle, rate, mean, points } = worstOver(-1, [0, 1, 30, 90, 150, 179].map(d => d * Math.PI / 180), [-1.2, 0, 0.3, 1.9, 2, 2.4])
    expect(points).toBe(324)
    expect(angle).toBeLessThan(WORST)
    expect(rate).toBeLessThan(WORST)
    expect(mean).toBeLessThan(WORST / 10)
  })

  it('passes the separatrix smoothly: m just under and just over one', () => {
    const pushes = [-1e-4, -1e-9, 0, 1e-9, 1e-4].map(nudge => 2 * Math.cos(0.25) + nudge)
    const { angle } = worstOver(-1, [0.5], pushes)
    expect(angle).toBeLessThan(WORST)
  })
})
