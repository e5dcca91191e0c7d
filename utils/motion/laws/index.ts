/** The laws by name, which of them a measure can take, and which a claim is weighed against. */
import type { Series } from '../series'
import type { Measure, ReadingLaw } from '../types'
import type { LawModel } from './model'
import { oddRule } from './oddRule'
import { overEdge } from './overEdge'
import { pendulum } from './pendulum'
import { mayStop, slowIn } from './slowIn'
import { spin } from './spin'
import { steady } from './steady'
import { topple } from './topple'
import { MEASURES } from './words'

export { LAW_WORDS, MEASURES } from './words'

export const LAWS: Record<ReadingLaw, LawModel> = {
  'odd-rule': oddRule, topple, pendulum, steady, 'slow-in': slowIn, spin,
  'over-edge': overEdge,
  // To come: until then these are told as their nearest kin.
  'swing-decay': pendulum, 'bounce': oddRule,
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
