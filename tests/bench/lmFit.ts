/**
 * The plain way to fit a swing or a topple, for comparison: Levenberg and Marquardt from a general library, over the motion integrated
 * by Hairer's extrapolation code. Three numbers: ln k, angle and turn rate at the first drawing. Shares no code with the judge.
 */
import { levenbergMarquardt } from 'ml-levenberg-marquardt'
import { GRAVITY } from './lists/motion'
import type { MadeList } from './lists/made'
import { Solver } from './lists/odex'

const DEGREE = 180 / Math.PI

/** Size in metres as read by the library from the list's readings, begun 10 % off the true k. */
export function sizeByLibrary({ request, truth }: MadeList): number {
  const [first] = request.keys
  if (!first || truth.size === undefined) return NaN
  const upright = request.law === 'topple'
  const share = upright ? 2 / 3 : 1
  const perRadian = request.measure === 'arc' ? request.radius ?? 1 : DEGREE
  const x = request.keys.map(({ frame }) => (frame - first.frame) / request.fps)
  const y = request.keys.map(({ reading }) => reading / perRadian + (request.zeroAt ?? 0) / DEGREE)
  const k = Math.sqrt(GRAVITY / (share * truth.size))
  // Speeds of the posted drawings, from the first three.
  const turn = ((y[2] as number) - (y[0] as number)) / ((x[2] as number) - (x[0] as number))
  const curve = ([log = 0, start = 0, rate = 0]: number[]) => {
    const pull = (upright ? 1 : -1) * Math.exp(2 * log)
    const field = (_t: number, [angle = 0, speed = 0]: number[]) => [speed, pull * Math.sin(angle)]
    const solver = new Solver(2)
    solver.absoluteTolerance = solver.relativeTolerance = 1e-8
    const shown = new Map<number, number>()
    let [at, state] = [0, [start, rate]]
    for (const time of x) {
      if (time > at) state = solver.solve(field, at, state, time).y
      at = time
      shown.set(time, state[0] as number)
    }
    return (time: number) => shown.get(time) ?? NaN
  }
  const { parameterValues } = levenbergMarquardt({ x, y }, curve, {
    initialValues: [Math.log(1.1 * k), y[0] as number, turn], damping: 1e-2, gradientDifference: 1e-5, maxIterations: 60, errorTolerance: 1e-12,
  })
  return GRAVITY / (share * Math.exp(2 * (parameterValues[0] as number)))
}
