/** What the laws are called, and how each can be read. */
import type { Law, Measure } from '../types'

/** In the trade's words, as they read after "as". */
export const LAW_WORDS: Record<Law, string> = {
  'odd-rule': 'the odd rule', 'topple': 'a topple', 'pendulum': 'a pendulum', 'steady': 'even spacing',
  'slow-in': 'a slow in', 'swing-decay': 'a dying swing', 'spin': 'a spin', 'bounce': 'a bounce', 'flight': 'a flight',
  'over-edge': 'a fall over the edge',
}

/** What each law can be read by. A turn about a pivot needs an angle; a flight needs both ways at once. */
export const MEASURES: Record<Law, readonly Measure[]> = {
  'odd-rule': ['distance', 'arc', 'angle', 'point'],
  'slow-in': ['distance', 'arc', 'angle', 'point'],
  'steady': ['distance', 'arc', 'angle', 'point'],
  'bounce': ['distance', 'point'],
  'flight': ['point'],
  'topple': ['angle', 'arc', 'point'],
  'over-edge': ['angle', 'point'],
  'pendulum': ['angle', 'arc', 'point'],
  'swing-decay': ['angle', 'arc', 'point'],
  'spin': ['angle', 'arc', 'point'],
}
