/**
 * The laws with their speed at the first key held at nothing: one free number fewer. Their numbers can be told as the free law's own
 * (`full`), so that a line that starts from rest is kept, sent and drawn like any other.
 */
import type { Series } from '../series'
import type { RestingLaw } from '../standstill'
import type { LawModel, Trace } from './model'
import { oddRule } from './oddRule'
import { overEdge, ownRelease } from './overEdge'
import { pendulum } from './pendulum'
import { confineSwing } from './swinging'
import { topple } from './topple'

/** Numbers: weights of 1 and x² − 1/3; x is 0 at the first key, so the apex lies there. */
const fallFromRest: LawModel = {
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

const SWINGS: Record<Exclude<RestingLaw, 'odd-rule'>, LawModel> = { topple, pendulum, 'over-edge': overEdge }

/** The law as it starts from rest at the first key. `near`: the free law's fit. */
export function fromRest(law: RestingLaw, near: Float64Array): LawModel {
  return law === 'odd-rule' ? fallFromRest : swingFromRest(SWINGS[law], near)
}

/** A body that goes over from rest, with a leaving angle of its own. */
export const ownReleaseFromRest = swingFromRest(ownRelease, null)

/** A fit's numbers as the free law counts them. */
export function fullNumbers(model: LawModel, numbers: Float64Array): Float64Array {
  return model.full ? model.full(numbers) : numbers
}
