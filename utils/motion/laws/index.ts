/** The laws by name, which of them a measure can take, and which a claim is weighed against. */
import type { Series } from '../series'
import type { Measure, ReadingLaw } from '../types'
import type { LawModel } from './model'
import { bounce } from './bounce'
import { oddRule } from './oddRule'
import { overEdge } from './overEdge'
import { pendulum } from './pendulum'
import { mayStop, slowIn } from './slowIn'
import { spin } from './spin'
import { steady } from './steady'
import { swingDecay } from './swingDecay'
import { topple } from './topple'
import { MEASURES } from './words'

export { LAW_WORDS, MEASURES } from './words'

export const LAWS: Record<ReadingLaw, LawModel> = {
  'odd-rule': oddRule, topple, pendulum, steady, 'slow-in': slowIn, spin, bounce, 'swing-decay': swingDecay, 'over-edge': overEdge,
}

/** Every law that such readings can be held against. */
export function lawsFor(measure: Measure): ReadingLaw[] {
  return (Object.keys(LAWS) as ReadingLaw[]).filter(law => MEASURES[law].includes(measure))
}

/** The laws that any claim is weighed against. */
function baseLaws(measure: Measure): ReadingLaw[] {
  return measure === 'distance' ? ['odd-rule', 'steady'] : ['odd-rule', 'topple', 'pendulum', 'steady']
}

/**
 * What a claim is weighed against at once, itself included. Even spacing of an angle and a spin are one line and no rivals; a slow in
 * joins where the list could have stopped at all.
 */
export function rivalsOf(law: ReadingLaw, measure: Measure, series: Series): ReadingLaw[] {
  const laws = baseLaws(measure).filter(other => law !== 'spin' || other !== 'steady')
  if (law !== 'slow-in' && mayStop(series)) laws.push('slow-in')
  return laws.includes(law) ? laws : [law, ...laws]
}

/**
 * The laws with more freedom, which have their say where none of `laws`, the claimed one first, explains a list. A bounce and a dying swing
 * turn on the way, so a list that only ever goes one way, save for the slop, is spared them; a topple may have left its foot behind.
 */
export function freerThan(laws: readonly ReadingLaw[], measure: Measure, series: Series, slop: number): ReadingLaw[] {
  const freer: ReadingLaw[] = turnsBack(series.y, 2 * slop) ? ['bounce', 'swing-decay'] : []
  if (laws[0] === 'topple') freer.push('over-edge')
  return freer.filter(law => MEASURES[law].includes(measure) && !laws.includes(law))
}

function turnsBack(y: Float64Array, room: number): boolean {
  let [low, high, risen, fallen] = [Infinity, -Infinity, false, false]
  for (const reading of y) {
    low = Math.min(low, reading)
    high = Math.max(high, reading)
    risen ||= reading - low > room
    fallen ||= high - reading > room
  }
  return risen && fallen
}
