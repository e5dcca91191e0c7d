/**
 * What topple and pendulum share: the exact swing carried into reading units, how it bends with its free numbers, and where a search
 * should begin.
 */
import type { Series } from '../series'
import { solve3 } from '../solve'
import { freeSwing } from '../swing'
import type { Trace } from './model'

/** ln κ is kept in here, κ = k·span: from barely curving over the whole list to a thousand radians of swing. */
const LEAST_LOG = Math.log(1e-3)
const MOST_LOG = Math.log(1e3)
const NUDGE = 1e-6

// Work space, grown when a longer list comes: a search traces the same few dozen drawings hundreds of times.
let taus = new Float64Array(64)
let shifted = new Float64Array(64)
let spare = new Float64Array(64)
let along = new Float64Array(64)

function makeRoom(n: number): void {
  if (taus.length >= n) return
  taus = new Float64Array(n)
  shifted = new Float64Array(n)
  spare = new Float64Array(n)
  along = new Float64Array(n)
}

/** Keeps ln κ in its range. */
export function confineSwing(_series: Series, numbers: Float64Array): void {
  numbers[0] = Math.min(MOST_LOG, Math.max(LEAST_LOG, numbers[0] as number))
}

/** A motion in its own measure: τ = kt, angles in radians, and the same from the same state at whatever time that is. */
export interface Turning {
  /** Fills `angle` and `rate` (dθ/dτ) for the first `n` of `taus`, from (start, push) at τ = 0. */
  fill(start: number, push: number, taus: ArrayLike<number>, n: number, angle: Float64Array, rate: Float64Array): void
  /** d²θ/dτ² in that state. */
  pull(start: number, push: number): number
}

export const FROM_TOP: Turning = { fill: (start, push, ...rest) => freeSwing(start, push, true, ...rest), pull: Math.sin }
export const HANGING: Turning = { fill: (start, push, ...rest) => freeSwing(start, push, false, ...rest), pull: start => -Math.sin(start) }

/** Numbers: ln κ; angle at the first key, radians; turn rate there, radians per span. */
export function traceSwing(
  series: Series, numbers: Float64Array, x: Float64Array, withColumns: boolean, fromTop: boolean,
): Trace {
  return traceTurning(series, numbers, x, withColumns, fromTop ? FROM_TOP : HANGING)
}

/** The same for any such motion. */
export function traceTurning(
  series: Series, numbers: Float64Array, x: Float64Array, withColumns: boolean, motion: Turning,
): Trace {
  const kappa = Math.exp(numbers[0] as number)
  const start = numbers[1] as number
  const push = (numbers[2] as number) / kappa
  const { perRadian, zero } = series
  const n = x.length
  makeRoom(n)
  for (let i = 0; i < n; i++) taus[i] = (x[i] as number) * kappa
  const value = new Float64Array(n)
  const rate = new Float64Array(n)
  motion.fill(start, push, taus, n, value, rate)
  const columns = withColumns ? columnsOf(kappa, start, push, n, value, rate, perRadian, motion) : []
  for (let i = 0; i < n; i++) {
    value[i] = ((value[i] as number) - zero) * perRadian
    rate[i] = (rate[i] as number) * kappa * perRadian
  }
  return { value, rate, columns }
}

/**
 * How the line bends with each number. Moving (start, push) along the motion itself is the same as moving time, so that direction is
 * known exactly; only the direction across it needs a second solution close by.
 */
function columnsOf(
  kappa: number, start: number, push: number, n: number, angle: Float64Array, rate: Float64Array, perRadian: number, motion: Turning,
): Float64Array[] {
  const turn = motion.pull(start, push)
  const size = Math.hypot(push, turn)
  const known = size > 1e-6
  const alongStart = known ? push / size : 1
  const alongPush = known ? turn / size : 0
  const step = NUDGE * Math.max(1, Math.abs(push))
  if (known) {
    for (let i = 0; i < n; i++) along[i] = (rate[i] as number) / size
  } else {
    motion.fill(start + alongStart * step, push + alongPush * step, taus, n, shifted, spare)
    for (let i = 0; i < n; i++) along[i] = ((shifted[i] as number) - (angle[i] as number)) / step
  }
  motion.fill(start - alongPush * step, push + alongStart * step, taus, n, shifted, spare)
  const byLog = new Float64Array(n)
  const byStart = new Float64Array(n)
  const byTurn = new Float64Array(n)
  for (let i = 0; i < n; i++) {
    const a = along[i] as number
    const b = ((shifted[i] as number) - (angle[i] as number)) / step
    const byPush = a * alongPush + b * alongStart
    byStart[i] = (a * alongStart - b * alongPush) * perRadian
    byTurn[i] = byPush / kappa * perRadian
    // At a fixed turn rate, a larger κ also means a smaller push.
    byLog[i] = ((taus[i] as number) * (rate[i] as number) - push * byPush) * perRadian
  }
  return [byLog, byStart, byTurn]
}

/**
/**
 * The pull along the posted readings and its integral taken twice, radians: ±∬sin θ over x. Cubic between keys: integrals of Hermite's
 * form over one gap. Further from 0 than `upTo` (radians) nothing pulls.
 */
export function pullTwice(series: Series, y: Float64Array, fromTop: boolean, upTo = Infinity): { angle: Float64Array, twice: Float64Array } {
  const { n, x, perRadian, zero } = series
  const angle = y.map(reading => reading / perRadian + zero)
  const pull = angle.map(a => (Math.abs(a) > upTo ? 0 : fromTop ? Math.sin(a) : -Math.sin(a)))
  const slope = new Float64Array(n)
  for (let i = 0; i < n; i++) {
    const left = Math.max(0, i - 1)
    const right = Math.min(n - 1, i + 1)
    slope[i] = ((pull[right] as number) - (pull[left] as number)) / ((x[right] as number) - (x[left] as number))
  }
  const twice = new Float64Array(n)
  let once = 0
  for (let i = 1; i < n; i++) {
    const h = (x[i] as number) - (x[i - 1] as number)
    const p0 = pull[i - 1] as number
    const p1 = pull[i] as number
    const s0 = slope[i - 1] as number
    const s1 = slope[i] as number
    twice[i] = (twice[i - 1] as number) + once * h + h * h * (0.35 * p0 + 0.15 * p1) + h * h * h * (s0 / 20 - s1 / 30)
    once += h / 2 * (p0 + p1) + h * h / 12 * (s0 - s1)
  }
  return { angle, twice }
}

/** Least squares of `angle` on columns (at most six); null where they don't settle it. */
export function weighted(columns: readonly Float64Array[], angle: Float64Array): Float64Array | null {
  const size = columns.length
  const a = new Float64Array(size * size)
  const b = new Float64Array(size)
  columns.forEach((cp, p) => {
    for (let i = 0; i < angle.length; i++) b[p] = (b[p] as number) + (cp[i] as number) * (angle[i] as number)
    columns.forEach((cq, q) => {
      for (let i = 0; i < angle.length; i++) a[size * p + q] = (a[size * p + q] as number) + (cp[i] as number) * (cq[i] as number)
    })
  })
  return solve3(a, b, size)
}

/**
 * Beginnings for the search. Integrating θ″ = ±κ² sin θ twice along the posted readings gives θ = θ₁ + ω₁x ± κ²∬sin θ, which is
 * linear in the three unknowns, and integration smooths the pencil instead of sharpening it. Further from 0 than `upTo` (radians) nothing
 * pulls.
 */
export function beginSwing(series: Series, y: Float64Array, fromTop: boolean, upTo = Infinity): Float64Array[] {
  const { n, x } = series
  const { angle, twice } = pullTwice(series, y, fromTop, upTo)
  const found = weighted([twice, new Float64Array(n).fill(1), x], angle)
  if (found && (found[0] as number) > 0.01) {
    const log = Math.min(MOST_LOG, Math.max(LEAST_LOG, 0.5 * Math.log(found[0] as number)))
    return [Float64Array.of(log, found[1] as number, found[2] as number)]
  }
  const firstAngle = angle[0] as number
  return [Float64Array.of(Math.log(0.3), firstAngle, (angle[n - 1] as number) - firstAngle)]
}
