/** What the search for joints looks at: the list as rows over time, with what a swing would need. */
import { seriesOf } from '../../series'
import type { CheckRequest, ReadingCheck } from '../../types'

export interface Scene {
  readonly n: number
  readonly frames: Float64Array
  /** One row of readings, or two of coordinates; each about its own middle. */
  readonly rows: readonly Float64Array[]
  /** 1 for a drawing that counts, 0 for one that is set aside as misplaced. */
  readonly weights: Float64Array
  /** Where readings are angles: the sine of each, summed over frames once and twice. A swing or a topple is a weighted sum of 1, frames and `twice`. */
  readonly pull: Pull | null
}

interface Pull { sine: Float64Array, once: Float64Array, twice: Float64Array }

export function sceneOf(request: CheckRequest): Scene {
  const frames = Float64Array.from(request.keys.map(({ frame }) => frame - (request.keys[0]?.frame ?? 0)))
  const rows = request.measure === 'point'
    ? [centred(request.keys.map(({ x }) => x)), centred(request.keys.map(({ y }) => y))]
    : [centred(request.keys.map(({ reading }) => reading))]
  return { n: frames.length, frames, rows, weights: new Float64Array(frames.length).fill(1), pull: pullOf(request, frames) }
}

/** The same with drawing i set aside, from the sums as well. */
export function without(scene: Scene, i: number): Scene {
  const { frames, pull } = scene
  const weights = scene.weights.with(i, 0)
  if (!pull) return { ...scene, weights }
  const sine = pull.sine.slice()
  sine[i] = between(frames, sine, weights, i)
  return { ...scene, weights, pull: summed(frames, sine) }
}

/** Value at drawing i of the cubic through the two drawings that count on either side of it, or of what there is of them. */
function between(frames: Float64Array, values: Float64Array, weights: Float64Array, i: number): number {
  const around: number[] = []
  for (let at = i - 1, left = 2; at >= 0 && left > 0; at--) if (weights[at] !== 0 && left--) around.push(at)
  for (let at = i + 1, left = 2; at < frames.length && left > 0; at++) if (weights[at] !== 0 && left--) around.push(at)
  let sum = 0
  for (const at of around) {
    let weight = 1
    for (const other of around) {
      if (other !== at) weight *= ((frames[i] as number) - (frames[other] as number)) / ((frames[at] as number) - (frames[other] as number))
    }
    sum += weight * (values[at] as number)
  }
  return sum
}

function centred(values: readonly number[]): Float64Array {
  const middle = values.reduce((sum, value) => sum + value / values.length, 0)
  return Float64Array.from(values, value => value - middle)
}

/**
 * Integrating θ″ = ±k² sin θ twice gives θ = a + b·t ± k²∬sin θ. Between any two drawings the double sum differs from one begun elsewhere
 * by a + b·t only, so one sum over the whole list serves every span of it. Cubics between drawings (integrals of Hermite's form).
 */
function pullOf(request: CheckRequest, frames: Float64Array): Pull | null {
  return request.measure === 'angle' || request.measure === 'arc' ? summed(frames, sines(request)) : null
}

function summed(frames: Float64Array, sine: Float64Array): Pull {
  const n = frames.length
  const slope = sine.map((_, i) => {
    const [left, right] = [Math.max(0, i - 1), Math.min(n - 1, i + 1)]
    return ((sine[right] as number) - (sine[left] as number)) / ((frames[right] as number) - (frames[left] as number))
  })
  const once = new Float64Array(n)
  const twice = new Float64Array(n)
  for (let i = 1; i < n; i++) {
    const h = (frames[i] as number) - (frames[i - 1] as number)
    const [p0, p1, s0, s1] = [sine[i - 1] as number, sine[i] as number, slope[i - 1] as number, slope[i] as number]
    twice[i] = (twice[i - 1] as number) + (once[i - 1] as number) * h + h * h * (0.35 * p0 + 0.15 * p1) + h * h * h * (s0 / 20 - s1 / 30)
    once[i] = (once[i - 1] as number) + h / 2 * (p0 + p1) + h * h / 12 * (s0 - s1)
  }
  return { sine, once, twice }
}

function sines(request: ReadingCheck): Float64Array {
  const { y, perRadian, zero } = seriesOf(request)
  return y.map(reading => Math.sin(reading / perRadian + zero))
}
