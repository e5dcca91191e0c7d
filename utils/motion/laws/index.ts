/** The laws by name, and which of them a measure can take. */
import type { Measure, ReadingLaw } from '../types'
import type { LawModel } from './model'
import { oddRule } from './oddRule'
import { pendulum } from './pendulum'
import { steady } from './steady'
import { topple } from './topple'

export { LAW_WORDS, MEASURES } from './words'

export const LAWS: Record<ReadingLaw, LawModel> = {
  'odd-rule': oddRule, topple, pendulum, steady,
  // To come: until then these are told as their nearest kin.
  'slow-in': oddRule, 'swing-decay': pendulum, 'spin': steady, 'bounce': oddRule, 'over-edge': topple,
}

/** The laws that a list of such readings is always held against. */
export function lawsFor(measure: Measure): ReadingLaw[] {
  return measure === 'distance' ? ['odd-rule', 'steady'] : ['odd-rule', 'topple', 'pendulum', 'steady']
}
