import { lawGroups, turns } from '~/utils/claiming/form'
import type { Law, Measure } from '~/utils/motion/types'

/** The laws as the bench offers them, and what each of them has: a body, a size, gravity, points on the drawing. */

export type BenchLaw = Law
export const benchLaws: readonly BenchLaw[] = lawGroups.flatMap(({ laws }) => laws)

/** A body that turns about a pivot under gravity: it has lengths, and a drawing of its own. */
export const hasBody = turns
export const hangs = (law: BenchLaw) => law === 'pendulum' || law === 'swing-decay'
/** What stands, leans and goes over, on the ground or on a brink. */
export const tips = (law: BenchLaw) => law === 'topple' || law === 'over-edge'
/** Nothing falls in these: no gravity makes them faster. */
export const weighs = (law: BenchLaw) => law !== 'steady' && law !== 'slow-in' && law !== 'spin'
/** A turning at a constant rate takes as long for a coin as for a wheel: it has no size. */
export const hasSize = (law: BenchLaw) => law !== 'spin'
/** Drawing units on the list, and so a scale. */
export const hasScale = (law: BenchLaw) => law === 'over-edge' || measureFor(law) !== 'angle'
/** The list also tells, or only tells, where the point lies on the drawing. */
export const hasPoints = (law: BenchLaw) => law === 'flight' || law === 'over-edge'

/** What the bench's own list counts. */
export function measureFor(law: BenchLaw): Exclude<Measure, 'arc'> {
  if (law === 'flight') return 'point'
  return hasBody(law) || law === 'spin' ? 'angle' : 'distance'
}
