/** The laws by name, and which of them a measure can take. */
import type { Law, Measure } from '../types'
import type { LawModel } from './model'
import { oddRule } from './oddRule'
import { pendulum } from './pendulum'
import { steady } from './steady'
import { topple } from './topple'

export const LAWS: Record<Law, LawModel> = { 'odd-rule': oddRule, topple, pendulum, steady }

/** In the trade's words, as they read after "as". */
export const LAW_WORDS: Record<Law, string> = {
  'odd-rule': 'the odd rule', 'topple': 'a topple', 'pendulum': 'a pendulum', 'steady': 'even spacing',
}

/** A turn about a pivot needs an angle to be read; a straight distance has none. */
export function lawsFor(measure: Measure): Law[] {
  return measure === 'distance' ? ['odd-rule', 'steady'] : ['odd-rule', 'topple', 'pendulum', 'steady']
}
