/** Whether a list that is claimed to start from rest does. */
import { DOUBT, DOUBT_WITH_FAULTS, UNNOTICED, storyCost } from './choose'
import type { Choice, Opinion } from './choose'
import type { Fit } from './fit'
import { badDrawings, strain } from './hypotheses'
import type { Care } from './hypotheses'
import type { Scale } from './size'
import type { Series } from './series'

/** A law held against a list: the choice of story, the size it reads as, and what is to be said of the law. */
export interface Considered { choice: Choice, scale: Scale, opinion: Opinion }

const faults = (series: Series, { choice: { claimed: { story } } }: Considered, care: Care) =>
  badDrawings(series, story, care).length + (story.shift ? 1 : 0)

/**
 * True where the line from rest leaves nothing for one already moving to do better, so that stories of that need not be heard: it fits
 * within what anyone could notice, and has no fault that the other (`moving` is its plain best) could do without.
 */
export function beyondDoubt(series: Series, atRest: Considered, moving: Fit, care: Care): boolean {
  if (atRest.choice.claimed.misfit > UNNOTICED) return false
  const found = faults(series, atRest, care)
  return found === 0 || (found === 1 && strain(series, moving, care).some(value => value > 1))
}

/**
 * True where the claimed law explains the list clearly better if it may already be moving at the first key. Both are charged by the
 * same pencil; where the line from rest needs no fault that the other does without, only what could be noticed counts.
 */
export function alreadyMoving(series: Series, atRest: Considered, free: Considered, care: Care): boolean {
  // If the law doesn't explain the list even then, the speed at the first key is not what is wrong with it.
  if (free.opinion.kind !== 'law-holds') return false
  const sigma = Math.min(atRest.choice.sigma, free.choice.sigma)
  const rest = atRest.choice.claimed
  const any = free.choice.claimed
  const needsMore = faults(series, atRest, care) > faults(series, free, care)
  if (!needsMore && rest.misfit <= UNNOTICED) return false
  return storyCost(any.story, sigma, series.n) + (needsMore ? DOUBT_WITH_FAULTS : DOUBT) < storyCost(rest.story, sigma, series.n)
}
