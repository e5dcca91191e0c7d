/** Least squares of the dying swing by a library that knows nothing of it: ml-levenberg-marquardt. */
import { levenbergMarquardt } from 'ml-levenberg-marquardt'
import { dyingSwing, fullSwing } from '../../utils/motion/dyingSwing'

const DEGREE = 180 / Math.PI

/** The line at evenly spaced times over `swings` small swings, degrees; `amplitude` in radians. */
function lineOf([pace = 1, amplitude = 0.1, phase = 0.25, decrement = 0.01]: readonly number[], count: number, swings: number): number[] {
  const moment = { angle: 0, rate: 0, byAmplitude: 0, byPhase: 0, byDecrement: 0, swings: 0, swing: 1 }
  return Array.from({ length: count }, (_, i) => {
    const tau = pace * 2 * Math.PI * swings * i / (count - 1)
    dyingSwing(tau, amplitude, phase, Math.max(1e-5, decrement), tau / fullSwing(amplitude), moment)
    return moment.angle * DEGREE
  })
}

export function bestLine(readings: readonly number[], amplitude: number, decrement: number, swings: number): number[] {
  const count = readings.length
  const x = readings.map((_, i) => i)
  const { parameterValues } = levenbergMarquardt(
    { x, y: [...readings] },
    (numbers: number[]) => {
      const line = lineOf(numbers, count, swings)
      return (i: number) => line[i] as number
    },
    { initialValues: [1, amplitude, 0.25, decrement], gradientDifference: 1e-6, maxIterations: 60, errorTolerance: 1e-12, damping: 1e-3 },
  )
  return lineOf(parameterValues, count, swings)
}
