/** When a motion that is already under way was let go. */
import { stillPhase, swingsTake } from './dyingSwing'
import { incompleteF, ladder } from './elliptic'
import type { Series } from './series'
import type { Law } from './types'

/**
 * Frames before the first key at which the law's line stands still: negative where that comes after it. Of several standstills the
 * nearest. Null where the motion has none: even spacing, or a body so fast that it goes over the top.
 * `numbers`: the free law's own.
 */
export function letGoFrames(law: Law, series: Series, numbers: Float64Array): number | null {
  const spans = standstill(law, numbers)
  if (spans === null) return null
  const frames = spans * series.spanFrames
  return Number.isFinite(frames) ? frames : null
}

function standstill(law: Law, numbers: Float64Array): number | null {
  switch (law) {
    case 'odd-rule': return apexBefore(numbers)
    case 'topple': case 'over-edge': case 'pendulum': return standstillBefore(numbers, law !== 'pendulum')
    case 'swing-decay': return dyingStandstill(numbers)
    case 'bounce': return apexOfHop(numbers)
    default: return null
  }
}

/** The apex of the hop that ends in the first contact, or the one after it. */
function apexOfHop([contact = 0, , , hop = 0, e = 1]: Float64Array): number {
  const before = hop / (2 * e) - contact
  const after = -(contact + hop / 2)
  return Math.abs(after) < Math.abs(before) ? after : before
}

/** Swings back to the nearest standstill, in the time that swings of the amplitude at the first key take. */
function dyingStandstill([log = 0, amplitude = 0.1, phase = 0, decrement = 0]: Float64Array): number {
  const past = phase - stillPhase(Math.abs(amplitude), decrement)
  return -swingsTake(Math.round(2 * past) / 2 - past, Math.abs(amplitude), decrement) / Math.exp(log)
}

/** Speed over acceleration at the first key, z = −1: (2c₁ − 4c₂)/8c₂ spans. */
function apexBefore([, c1 = 0, c2 = 0]: Float64Array): number | null {
  return c2 === 0 ? null : (c1 / c2 - 2) / 4
}

/** A swing stands still wherever its phase is an odd number of quarters: cn = 0. */
function standstillBefore([log = 0, start = 0, turn = 0]: Float64Array, fromTop: boolean): number | null {
  const kappa = Math.exp(log)
  const v = (fromTop ? -turn : turn) / kappa / 2
  let s = fromTop ? Math.cos(start / 2) : Math.sin(start / 2)
  let c = fromTop ? Math.sin(start / 2) : Math.cos(start / 2)
  if (c < 0) {
    s = -s
    c = -c
  }
  if (Math.abs(v) >= c) return null
  const m1 = (c - Math.abs(v)) * (c + Math.abs(v))
  const { quarter } = ladder(m1)
  const phase = incompleteF(s, v, m1)
  const before = phase > 0 ? phase - quarter : phase + quarter
  return before / kappa
}
