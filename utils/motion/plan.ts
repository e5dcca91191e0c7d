/** The bench: a spacing list worked out before anything is drawn. */
import { pathAcceleration } from './bodies'
import { dyingSwing, fullSwing, stillPhase, swingsTake } from './dyingSwing'
import type { Moment } from './dyingSwing'
import { contactAfter, hopsBy } from './laws/hops'
import { LEAST_DECREMENT } from './laws/swingDecay'
import { RADIAN } from './series'
import { freeSwing } from './swing'
import { paceOf, swingPeriod, toppleTime } from './times'
import type { BodySubject, Key, PathSubject } from './types'

interface OnPaper {
  fps: number
  /** Frames per drawing: 1 on ones, 2 on twos. */
  exposure: number
  /** First frame's number; 1 when left out. */
  firstFrame?: number
  /** Readings are rounded to this; not at all when left out. */
  step?: number
}

export type Plan = OnPaper & (
  /** From rest at `lean` degrees until `to` degrees (90 when left out). */
  | { law: 'topple', subject: BodySubject, lean: number, to?: number }
  /** Let go at `amplitude` degrees, for `swings` full swings. */
  | { law: 'pendulum', subject: BodySubject, amplitude: number, swings: number }
  /** From rest over `travel` drawing units. */
  | { law: 'odd-rule', subject: PathSubject & { unitsPerMetre: number }, travel: number }
  /** Evenly over `travel` drawing units in `seconds`. */
  | { law: 'steady', travel: number, seconds: number }
  /** Slowing evenly to a stop over `travel` drawing units: in so many seconds, or by a deceleration in units per second². */
  | { law: 'slow-in', travel: number } & ({ seconds: number } | { deceleration: number })
  /** `turns` full turns at a constant rate; a negative rate turns the other way. Readings in degrees run on past 360. */
  | { law: 'spin', turns: number, turnsPerSecond: number }
  /** Let go at `amplitude` degrees (up to 165), for `swings` full swings, each losing `share` (0 to 0.5) of the amplitude. */
  | { law: 'swing-decay', subject: BodySubject, amplitude: number, swings: number, share: number }
  /** From rest over `drop` drawing units, then `bounces` hops; each contact gives back `restitution` (0 to 1) of the speed. Readings count from where it was let go. */
  | { law: 'bounce', subject: PathSubject & { unitsPerMetre: number }, drop: number, restitution: number, bounces: number }
)

export interface PlannedList {
  keys: Key[]
  /** Seconds that the whole motion takes; Infinity where it never ends. */
  seconds: number
  /** The same in frames, not rounded: where it ends between two drawings. */
  frames: number
}

const moment: Moment = { angle: 0, rate: 0, byAmplitude: 0, byPhase: 0, byDecrement: 0, swings: 0, swing: 1 }

/** No plan has more keys than a list may have. */
const MOST_KEYS = 2000

/** Seconds the planned motion takes. */
export function secondsFor(plan: Plan): number {
  switch (plan.law) {
    case 'topple': return toppleTime(plan.subject, plan.lean, plan.to ?? 90)
    case 'pendulum': return swingPeriod(plan.subject, plan.amplitude) * plan.swings
    case 'odd-rule': return fallTime(plan.travel, plan.subject)
    case 'steady': return plan.seconds
    // travel = ½at².
    case 'slow-in': return 'seconds' in plan ? plan.seconds : Math.sqrt(2 * Math.abs(plan.travel) / plan.deceleration)
    case 'spin': return plan.turns / Math.abs(plan.turnsPerSecond)
    case 'swing-decay': return swingsTake(plan.swings, plan.amplitude * RADIAN, decrementOf(plan.share)) / paceOf(plan.subject)
    case 'bounce': {
      // The hops last 2e, 2e², … times the first fall.
      const fall = fallTime(plan.drop, plan.subject)
      return fall + contactAfter(plan.bounces, 2 * plan.restitution * fall, plan.restitution)
    }
  }
}

/** t = √(2s/a). */
function fallTime(travel: number, subject: PathSubject & { unitsPerMetre: number }): number {
  return Math.sqrt(2 * Math.abs(travel) / (subject.unitsPerMetre * pathAcceleration(subject)))
}

/** δ = −ln(1 − share). */
function decrementOf(share: number): number {
  return Math.max(LEAST_DECREMENT, -Math.log1p(-share))
}

/** Frames the planned motion needs, rounded up to whole ones; Infinity where it never ends. Sizes scale as time squared. */
export function framesFor(plan: Plan): number {
  return Math.ceil(secondsFor(plan) * plan.fps - 1e-9)
}

/** Keys at every exposure up to the end of the motion; degrees for turning, drawing units for the rest. At most 2,000 keys. */
export function plannedList(plan: Plan): PlannedList {
  const seconds = secondsFor(plan)
  const frames = seconds * plan.fps
  const exposures = frames / plan.exposure
  // What stays where it stopped is drawn there once, even where the stop falls between two drawings.
  const count = Math.min(MOST_KEYS, (plan.law === 'slow-in' ? Math.ceil(exposures - 1e-9) : Math.floor(exposures + 1e-9)) + 1)
  const times = Float64Array.from({ length: count }, (_, i) => i * plan.exposure / plan.fps)
  const readings = readingsAt(plan, times)
  const first = plan.firstFrame ?? 1
  const { step } = plan
  return {
    seconds, frames,
    keys: Array.from(readings, (reading, i) => ({
      frame: first + i * plan.exposure,
      // toFixed drops the stray last bits of a multiple of 0.1.
      reading: step ? Number((Math.round(reading / step) * step).toFixed(9)) : reading,
    })),
  }
}

function readingsAt(plan: Plan, times: Float64Array): Float64Array {
  switch (plan.law) {
    case 'topple': return turned(plan.subject, plan.lean, true, times)
    case 'pendulum': return turned(plan.subject, plan.amplitude, false, times)
    case 'odd-rule': {
      const a = Math.sign(plan.travel) * plan.subject.unitsPerMetre * pathAcceleration(plan.subject)
      return times.map(t => a * t * t / 2)
    }
    case 'steady': return times.map(t => plan.travel * t / plan.seconds)
    case 'slow-in': {
      const seconds = secondsFor(plan)
      return times.map(t => plan.travel * (1 - Math.max(0, 1 - t / seconds) ** 2))
    }
    case 'spin': return times.map(t => 360 * plan.turnsPerSecond * t)
    case 'swing-decay': return dying(plan.subject, plan.amplitude * RADIAN, decrementOf(plan.share), times)
    case 'bounce': return dropped(plan.drop, fallTime(plan.drop, plan.subject), plan.restitution, times)
  }
}

function dying(subject: BodySubject, amplitude: number, decrement: number, times: Float64Array): Float64Array {
  const k = paceOf(subject)
  const perSwing = fullSwing(amplitude)
  const phase = stillPhase(amplitude, decrement)
  return times.map((t) => {
    dyingSwing(k * t, amplitude, phase, decrement, k * t / perSwing, moment)
    return moment.angle / RADIAN
  })
}

/** Distance from where it was let go: the drop itself less the height of the hop it is in. */
function dropped(drop: number, fall: number, restitution: number, times: Float64Array): Float64Array {
  const a = 2 * drop / (fall * fall)
  const hop = 2 * restitution * fall
  return times.map((t) => {
    if (t <= fall) return a * t * t / 2
    const k = hopsBy(t - fall, hop, restitution)
    if (k === Infinity) return drop
    const s = t - fall - contactAfter(k, hop, restitution)
    return drop - a / 2 * s * (hop * restitution ** k - s)
  })
}

function turned(subject: BodySubject, start: number, fromTop: boolean, times: Float64Array): Float64Array {
  const k = paceOf(subject)
  const angle = new Float64Array(times.length)
  freeSwing(start * RADIAN, 0, fromTop, times.map(t => k * t), times.length, angle, new Float64Array(times.length))
  return angle.map(a => a / RADIAN)
}
