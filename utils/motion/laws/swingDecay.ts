/** A pendulum that loses the same share of its amplitude over every full swing. */
import { WIDEST_SWING, dyingSwing, fullSwing } from '../dyingSwing'
import type { Moment } from '../dyingSwing'
import { incompleteF } from '../elliptic'
import type { Series } from '../series'
import type { LawModel, Trace } from './model'
import { confineSwing, pullTwice, weighted } from './swinging'

/** The decrement δ = −ln(1 − share) is kept in here: from no loss that any list could show to half the amplitude per swing. */
export const LEAST_DECREMENT = 1e-5
const MOST_DECREMENT = Math.LN2
/** Radians. */
const LEAST_AMPLITUDE = 1e-3
const moment: Moment = { angle: 0, rate: 0, byAmplitude: 0, byPhase: 0, byDecrement: 0, swings: 0, swing: 1 }

/**
 * Numbers: ln κ (κ = k·span); amplitude at the first key, radians, negative where the phase counts from the other side; phase there,
 * full swings past hanging; δ.
 */
export const swingDecay: LawModel = {
  law: 'swing-decay',
  size: 4,
  linear: false,
  trace(series: Series, numbers: Float64Array, x: Float64Array, withColumns: boolean): Trace {
    const [log = 0, signed = 0.1, phase = 0, decrement = 0.01] = numbers
    const { perRadian, zero } = series
    const n = x.length
    const kappa = Math.exp(log)
    const side = signed < 0 ? -1 : 1
    const amplitude = Math.abs(signed)
    const per = side * perRadian
    const value = new Float64Array(n)
    const rate = new Float64Array(n)
    const byLog = new Float64Array(n)
    const byAmplitude = new Float64Array(n)
    const byPhase = new Float64Array(n)
    const byDecrement = new Float64Array(n)
    let swing = fullSwing(amplitude)
    let [tauBefore, swingsBefore] = [0, 0]
    for (let i = 0; i < n; i++) {
      const tau = (x[i] as number) * kappa
      dyingSwing(tau, amplitude, phase, decrement, swingsBefore + (tau - tauBefore) / swing, moment)
      tauBefore = tau
      swingsBefore = moment.swings
      swing = moment.swing
      value[i] = per * moment.angle - zero * perRadian
      rate[i] = per * kappa * moment.rate
      byLog[i] = per * tau * moment.rate
      byAmplitude[i] = perRadian * moment.byAmplitude
      byPhase[i] = per * moment.byPhase
      byDecrement[i] = per * moment.byDecrement
    }
    return { value, rate, columns: withColumns ? [byLog, byAmplitude, byPhase, byDecrement] : [] }
  },
  confine: confineDecay,
  begin: beginDecay,
}

export function confineDecay(series: Series, numbers: Float64Array): void {
  confineSwing(series, numbers)
  const signed = numbers[1] as number
  numbers[1] = (signed < 0 ? -1 : 1) * Math.min(WIDEST_SWING, Math.max(LEAST_AMPLITUDE, Math.abs(signed)))
  numbers[3] = Math.min(MOST_DECREMENT, Math.max(LEAST_DECREMENT, numbers[3] as number))
}

/** Paces to try beside the one found, as the drawings of a fast swing are too few to integrate well. */
const PACES = [1, 0.96, 1.04]

/**
 * As for a pendulum, with one unknown more: a drag of 2γθ′ integrated twice is 2γ∫θ, so θ = θ₁ + (ω₁ + 2γθ₁)x − κ²∬sin θ − 2γ∫θ is
 * linear in four unknowns.
 */
export function beginDecay(series: Series, y: Float64Array): Float64Array[] {
  const { n, x } = series
  const { angle, twice } = pullTwice(series, y, false)
  const once = new Float64Array(n)
  for (let i = 1; i < n; i++) {
    const width = (x[i] as number) - (x[i - 1] as number)
    once[i] = (once[i - 1] as number) - width / 2 * ((angle[i] as number) + (angle[i - 1] as number))
  }
  const found = weighted([twice, new Float64Array(n).fill(1), x, once], angle)
  const square = found?.[0] ?? 0
  const kappa = square > 0.01 ? Math.sqrt(square) : 2 * Math.PI
  const start = found?.[1] ?? (angle[0] as number)
  const drag = found?.[3] ?? 0
  const push = ((found?.[2] ?? 0) - drag * start) / kappa / 2
  const half = Math.sin(start / 2)
  const energy = Math.min(0.98, half * half + push * push)
  const amplitude = Math.max(LEAST_AMPLITUDE, 2 * Math.asin(Math.sqrt(energy)))
  const swing = fullSwing(amplitude)
  // Counted from whichever side it starts on, so that a swing and its mirror image are searched for alike to the last bit.
  const side = half < 0 || (half === 0 && push < 0) ? -1 : 1
  const phase = incompleteF(side * half, side * push, 1 - energy) / swing
  // γ per span, over a full swing of 4K/κ spans.
  const decrement = drag > 0 ? drag / 2 * swing / kappa : 0.02
  return PACES.map(pace => Float64Array.of(Math.log(kappa * pace), side * amplitude, phase, decrement))
}
