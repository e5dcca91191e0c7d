/** Where a list sets out from: the standstill at its first drawing, if that is what its first drawings show. */
import { THOROUGH, refine } from './fit'
import { strain, weightsWithout } from './hypotheses'
import type { Care, Story } from './hypotheses'
import { fromRest } from './laws/fromRest'
import { letGoFrames } from './letGo'
import type { Line } from './line'
import { shiftedTimes } from './scan'
import type { Series } from './series'
import { canRest } from './standstill'

/** What a start from rest may cost, nats, and still be as good: half of 3.84, the 95 % point of χ² with one degree of freedom. */
const AS_GOOD = 1.92

/**
 * Rounded readings may have a law run back by a hair before it sets out, and a list ruled by it would step backward where the motion
 * never turns. Where the retreat is within the slop and a start from rest explains the list as well, answers with the story so told;
 * else null.
 */
export function fromStandstill(series: Series, story: Story, sigma: number, care: Care): Story | null {
  const { fit, out, shift } = story
  const { law } = fit.model
  // A line that is from rest already has one number fewer; one that runs with its later side has no first drawing of its own.
  if (fit.model.full || !canRest(law) || (shift && series.n - shift.at > shift.at)) return null
  const before = letGoFrames(law, series, fit.numbers)
  if (before === null || before >= 0 || before < -series.spanFrames) return null
  const { value } = fit.model.trace(series, fit.numbers, Float64Array.of(0, -before / series.spanFrames), false)
  if (Math.abs((value[1] as number) - (value[0] as number)) > care.slop) return null
  const model = fromRest(law, fit.numbers)
  const weights = weightsWithout(series.n, out)
  const [near] = model.begin(series, series.y)
  const still = refine(model, series, shiftedTimes(series.x, shift), series.y, weights, near ?? new Float64Array(model.size), THOROUGH)
  if (still.cost - fit.cost > 2 * AS_GOOD * sigma * sigma) return null
  const told = { ...story, fit: still }
  const [free, rest] = [story, told].map(({ fit: one }) => strain(series, one, care, shift))
  return rest?.some((value, i) => value > 1 && (free?.[i] ?? 0) <= 1) ? null : told
}

/**
 * When a motion that is an exposure late sets out, on its own clock, spans; null where that isn't within an exposure of its first drawing.
 * A swing turns by its nature and waits for nothing.
 */
export function outset(series: Series, { law, numbers, lag }: Line): number | null {
  if (law !== 'topple' && law !== 'odd-rule') return null
  const before = letGoFrames(law, series, Float64Array.from(numbers))
  if (before === null) return null
  const at = -before / series.spanFrames
  return at > -lag && at <= lag ? at : null
}
