/**
 * The laws with their speed at the first key held at nothing: one free number fewer. Their numbers can be told as the free law's own
 * (`full`), so that a line that starts from rest is kept, sent and drawn like any other.
 */
import type { Series } from '../series'
import type { RestingLaw } from '../standstill'
import { stillPhase } from '../dyingSwing'
import { bounce } from './bounce'
import type { LawModel, Trace } from './model'
import { oddRule } from './oddRule'
import { overEdge, ownRelease } from './overEdge'
import { pendulum } from './pendulum'
import { beginDecay, confineDecay, swingDecay } from './swingDecay'
import { confineSwing } from './swinging'
import { topple } from './topple'

/** Radians: how far a number is moved to see what moves with it. */
const NUDGE = 1e-6
/** Spans from a drop to its contact, at least. */
const LEAST_DROP = 1e-3

/** Numbers: weights of 1 and x² − 1/3; x is 0 at the first key, so the apex lies there. */
export const fallFromRest: LawModel = {
  law: 'odd-rule',
  size: 2,
  linear: true,
  // x = (z + 1)/2, so x² − 1/3 = z/2 + (z² − 1/3)/4.
  full: ([c = 0, a = 0]) => Float64Array.of(c, a / 2, a / 4),
  trace(series: Series, numbers: Float64Array, x: Float64Array, withColumns: boolean): Trace {
    const { value, rate } = oddRule.trace(series, fallFromRest.full?.(numbers) ?? numbers, x, false)
    return { value, rate, columns: withColumns ? [new Float64Array(x.length).fill(1), x.map(at => at * at - 1 / 3)] : [] }
  },
  begin: () => [new Float64Array(2)],
}

/** Place of the turn rate at the first key among a swing's numbers. */
const TURN = 2

/** Numbers: those of the free law but for its turn rate. `near`: numbers of the free law's fit, as one more place to begin. */
function swingFromRest(free: LawModel, near: Float64Array | null): LawModel {
  const full = ([log = 0, angle = 0, ...rest]: Float64Array) => Float64Array.of(log, angle, 0, ...rest)
  const held = (_: unknown, number: number) => number !== TURN
  return {
    law: free.law,
    size: free.size - 1,
    linear: false,
    full,
    trace(series, numbers, x, withColumns) {
      const trace = free.trace(series, full(numbers), x, withColumns)
      return { ...trace, columns: trace.columns.filter(held) }
    },
    confine: confineSwing,
    begin: (series, y) => [...(near ? [near] : []), ...free.begin(series, y)].map(numbers => numbers.filter(held)),
  }
}

/** Numbers: ln κ; amplitude at the first key, radians, signed; δ. The phase is the standstill's. */
function decayFromRest(near: Float64Array): LawModel {
  const full = ([log = 0, amplitude = 0.1, decrement = 0.01]: Float64Array) =>
    Float64Array.of(log, amplitude, stillPhase(Math.abs(amplitude), decrement), decrement)
  // A swing let go on either side, with the decay found without that restriction.
  const from = ([log = 0, amplitude = 0.1, phase = 0, decrement = 0.01]: Float64Array) =>
    Float64Array.of(log, Math.sin(2 * Math.PI * phase) < 0 ? -amplitude : amplitude, decrement)
  return {
    law: 'swing-decay',
    size: 3,
    linear: false,
    full,
    trace(series, numbers, x, withColumns) {
      const trace = swingDecay.trace(series, full(numbers), x, withColumns)
      const [byLog, byAmplitude, byPhase, byDecrement] = trace.columns
      if (!byLog || !byAmplitude || !byPhase || !byDecrement) return { ...trace, columns: [] }
      const [, amplitude = 0.1, decrement = 0.01] = numbers
      const size = Math.abs(amplitude)
      const phaseByDecrement = (stillPhase(size, decrement) - 0.25) / decrement
      const phaseByAmplitude = Math.sign(amplitude) * (stillPhase(size + NUDGE, decrement) - stillPhase(size, decrement)) / NUDGE
      return {
        ...trace,
        columns: [byLog, byAmplitude.map((at, i) => at + phaseByAmplitude * (byPhase[i] as number)), byDecrement.map((at, i) => at + phaseByDecrement * (byPhase[i] as number))],
      }
    },
    confine(series, numbers) {
      const wide = full(numbers)
      confineDecay(series, wide)
      numbers.set([wide[0] as number, wide[1] as number, wide[3] as number])
    },
    begin: (series, y) => [near, ...beginDecay(series, y)].map(from),
  }
}

/** Numbers: first contact, ground, a and e as the free law counts them; the apex lies at the first key, so the next hop lasts 2e·contact. */
function dropFromRest(near: Float64Array): LawModel {
  const full = ([contact = 0, ground = 0, a = 0, e = 0.5]: Float64Array) => Float64Array.of(contact, ground, a, 2 * e * contact, e)
  const from = ([contact = 0, ground = 0, a = 0, , e = 0.5]: Float64Array) => Float64Array.of(contact, ground, a, e)
  return {
    law: 'bounce',
    size: 4,
    linear: false,
    kinked: true,
    full,
    trace(series, numbers, x, withColumns) {
      const trace = bounce.trace(series, full(numbers), x, withColumns)
      const [byContact, byGround, byA, byHop, byE] = trace.columns
      if (!byContact || !byGround || !byA || !byHop || !byE) return { ...trace, columns: [] }
      const [contact = 0, , , e = 0.5] = numbers
      return {
        ...trace,
        columns: [byContact.map((at, i) => at + 2 * e * (byHop[i] as number)), byGround, byA, byE.map((at, i) => at + 2 * contact * (byHop[i] as number))],
      }
    },
    confine(series, numbers) {
      // A body let go on the ground itself would never bounce.
      numbers[0] = Math.max(LEAST_DROP, numbers[0] as number)
      const wide = full(numbers)
      bounce.confine?.(series, wide)
      numbers.set([wide[0] as number, wide[1] as number, wide[2] as number, wide[4] as number])
    },
    fromStart: numbers => from(bounce.fromStart?.(full(numbers)) ?? full(numbers)),
    begin: (series, y) => [near, ...bounce.begin(series, y)].map(from),
  }
}

const SWINGS = { topple, pendulum, 'over-edge': overEdge }

/** The law as it starts from rest at the first key. `near`: the free law's fit. */
export function fromRest(law: RestingLaw, near: Float64Array): LawModel {
  switch (law) {
    case 'odd-rule': return fallFromRest
    case 'bounce': return dropFromRest(near)
    case 'swing-decay': return decayFromRest(near)
    default: return swingFromRest(SWINGS[law], near)
  }
}

/** A body that goes over from rest, with a leaving angle of its own. */
export const ownReleaseFromRest = swingFromRest(ownRelease, null)

/** A fit's numbers as the free law counts them. */
export function fullNumbers(model: LawModel, numbers: Float64Array): Float64Array {
  return model.full ? model.full(numbers) : numbers
}
