/** What the claim's own size would do on these frames, where the posted list is no help: under another law altogether. */
import { isBody, pathAcceleration } from './bodies'
import { edgeEnergy, leavingCosine, overBrink, releaseAt } from './edge'
import { RADIAN } from './series'
import type { Series } from './series'
import { freeSwing } from './swing'
import { paceOf } from './times'
import type { ReadingCheck, Key, Law } from './types'

/**
 * The claimed body from rest at the first posted reading, on the list's own frames, in reading units. Null where the claim
 * names no size, or where nothing would start by itself (balance, hanging rest, a steady move).
 */
export function claimFromRest(request: ReadingCheck, series: Series): Key[] | null {
  const readings = claimedReadings(request, series)
  return readings && request.keys.map((key, i) => ({ frame: key.frame, reading: readings[i] as number }))
}

/** The laws by which a body let go starts to move by itself. */
const FALLS = { 'odd-rule': true, 'topple': true, 'over-edge': true, 'pendulum': true } satisfies Partial<Record<Law, true>>

function claimedReadings({ law, subject }: ReadingCheck, series: Series): Float64Array | null {
  if (!subject || !(law in FALLS)) return null
  const { y, n } = series
  const first = y[0] as number
  const times = series.x.map(x => x * series.span)
  if (law === 'odd-rule') {
    if (isBody(subject) || subject.unitsPerMetre === undefined) return null
    const pull = Math.sign((y[n - 1] as number) - first) * subject.unitsPerMetre * pathAcceleration(subject)
    return times.map(t => first + pull * t * t / 2)
  }
  if (!isBody(subject)) return null
  const start = series.zero + first / series.perRadian
  // Less than a hundredth of a degree off balance is balance: no drawing shows it, and the fall would never come.
  if (Math.abs(Math.sin(start)) < 0.01 * RADIAN) return null
  const k = paceOf(subject)
  const angle = new Float64Array(n)
  const rate = new Float64Array(n)
  const taus = times.map(t => k * t)
  if (law === 'over-edge') overBrink(start, 0, releaseAt(start, 0, leavingCosine(series.edgeRatio, edgeEnergy(start, 0))), taus, n, angle, rate)
  else freeSwing(start, 0, law === 'topple', taus, n, angle, rate)
  return angle.map(a => (a - series.zero) * series.perRadian)
}
