/**
 * The motions that the lists are drawn from, by an integrator and by school algebra; shares nothing with the judge.
 * odex is Hairer's extrapolation code (E. Hairer, S. Nørsett, G. Wanner, Solving Ordinary Differential Equations I, II.9).
 */
import { Solver } from './odex'

export const GRAVITY = 9.80665

/**
 * Angle in radians at every whole frame from 0, until `frames` or until the angle passes `until`;
 * `pull` is +1 from upright balance, −1 from hanging rest.
 */
export function swung(
  pull: 1 | -1, kSquared: number, start: number, turn: number, fps: number, frames: number, until = Infinity,
): number[] {
  const solver = new Solver(2)
  solver.absoluteTolerance = 1e-10
  solver.relativeTolerance = 1e-10
  solver.initialStepSize = 1 / fps
  const field = (_t: number, y: number[]) => [y[1] as number, pull * kSquared * Math.sin(y[0] as number)]
  const out = [start]
  let y = [start, turn]
  for (let frame = 1; frame <= frames; frame++) {
    // One frame at a time: the code's own dense output costs more than it saves at this accuracy.
    y = solver.solve(field, 0, y, 1 / fps).y
    if ((y[0] as number) > until) break
    out.push(y[0] as number)
  }
  return out
}
