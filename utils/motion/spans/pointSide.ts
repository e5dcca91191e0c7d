/** One side of a joint between points: where the span's line puts the body there and its velocity, with how well the list settles both. */
import type { CheckResult, Law, Place } from '../types'
import type { JudgedPart } from './judgePart'

export interface PointSide {
  /** Drawing units, y as posted; per frame for the velocity. */
  place: Place
  velocity: Place
  speed: number
  /** Variances of the two, both ways of the drawing together. */
  placeVariance: number
  velocityVariance: number
  /** Frames from the joint to the span's next drawing. */
  exposure: number
}

/** Frames over which a velocity is taken: small beside any exposure, large beside the last digit of a place. */
const NUDGE = 1e-3

/** Bends of the timing along the path, as the degree of the polynomial that is as hard to settle at its ends. */
const DEGREES: Record<Law, number> = {
  'steady': 1, 'spin': 1, 'odd-rule': 2, 'slow-in': 2, 'flight': 2, 'topple': 3, 'pendulum': 3, 'swing-decay': 3, 'bounce': 3, 'over-edge': 3,
}

/** The side that `part` shows to the joint at its end or its start; null where no line of its own law can be had there. */
export function pointSideOf({ request, judgement: { placesAt, result } }: JudgedPart, end: 'first' | 'last', frame: number): PointSide | null {
  const first = request.keys[0]?.frame ?? frame
  const last = request.keys[request.keys.length - 1]?.frame ?? frame
  if (!placesAt || !(last > first) || !speaksForItself(result)) return null
  // Only the span's own side counts: beyond a start from rest or a contact the line is of another motion.
  const inward = end === 'first' ? NUDGE : -NUDGE
  const [here, near, next] = placesAt([frame, frame + inward, frame + 2 * inward])
  if (!here || !near || !next) return null
  const slope = (a: number, b: number, c: number) => (4 * b - 3 * a - c) / (2 * inward)
  const velocity = { x: slope(here.x, near.x, next.x), y: slope(here.y, near.y, next.y) }
  const speed = Math.hypot(velocity.x, velocity.y)
  const variances = spreadOf(request.law, request.slop, last - first, result)
  if (![here.x, here.y, speed, variances.place, variances.velocity].every(Number.isFinite)) return null
  return {
    place: here, velocity, speed, placeVariance: variances.place, velocityVariance: variances.velocity, exposure: exposureAt(result, frame, end),
  }
}

/** Nor does a line say how the joint was drawn that stands for another law or path, or runs with the other side of a held drawing. */
function speaksForItself({ findings, verdict }: CheckResult): boolean {
  return verdict !== 'undecided' && !findings.some(({ kind, frames }) =>
    kind === 'wrong-law' || kind === 'not-at-rest' || kind === 'held' || kind === 'skipped' || kind === 'wrong-release'
    || (kind === 'off-path' && frames.length !== 1))
}

/**
 * Variances at the end of a polynomial of degree d fitted to n even drawings over T frames, from Legendre's polynomials:
 * σ²/n · Σ(2k + 1) and (2/T)² σ²/n · Σ(2k + 1)(k(k + 1)/2)², k = 0 … d (P_k(1) = 1, P_k′(1) = k(k + 1)/2; DLMF 18.6, 18.9).
 * Once for the timing along the path, once for the path itself.
 */
function spreadOf(law: Law, slop: number, frames: number, { keys, path }: CheckResult): { place: number, velocity: number } {
  let cost = 0
  let count = 0
  for (const { point, lawPoint, breaks } of keys) {
    if (!point || !lawPoint || breaks) continue
    cost += (point.x - lawPoint.x) ** 2 + (point.y - lawPoint.y) ** 2
    count++
  }
  const degrees = [DEGREES[law], !path || path.kind === 'line' ? 1 : 2]
  // A third of the slop counts as four drawings seen beforehand, as everywhere in the judge.
  const sigma2 = (4 * (slop / 3) ** 2 + cost) / (4 + Math.max(1, count - Math.max(...degrees) - 1))
  const even = sigma2 / Math.max(1, count)
  let place = 0
  let velocity = 0
  for (const degree of degrees) {
    for (let k = 0; k <= degree; k++) {
      place += even * (2 * k + 1)
      velocity += even * (2 * k + 1) * (k * (k + 1) / frames) ** 2
    }
  }
  return { place, velocity }
}

function exposureAt({ keys }: CheckResult, frame: number, end: 'first' | 'last'): number {
  const others = keys.filter(key => key.frame !== frame)
  const next = end === 'first' ? others[0] : others[others.length - 1]
  return next ? Math.abs(next.frame - frame) : 1
}
