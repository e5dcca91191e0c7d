/** How long a body takes: exact times of a topple and of a swing, and where a body on a brink leaves it. Angles in degrees, times in seconds. */
import { equalLength, gravityOf } from './bodies'
import { edgeEnergy, leavingCosine } from './edge'
import { completeF, incompleteF } from './elliptic'
import { RADIAN } from './series'
import type { BodySubject } from './types'

/** k = √(g/L), radians per second. */
export function paceOf(subject: BodySubject): number {
  return Math.sqrt(gravityOf(subject) / equalLength(subject))
}

/**
 * k·t from rest at `lean` to `to` degrees from upright: K(m) − F(asin(cos(θ/2)/cos(θ₀/2)) | m), m = cos²(θ₀/2). DLMF 19.2.4, 22.19(i).
 * Infinity from perfect balance; 0 where `to` is not beyond `lean`.
 */
export function toppleMeasure(lean: number, to = 90): number {
  const from = Math.abs(lean) * RADIAN / 2
  const end = Math.abs(to) * RADIAN / 2
  if (from === 0) return Infinity
  if (end <= from) return 0
  // cos φ of the amplitude, written so that nothing cancels: cos²θ₀/2 − cos²θ/2 = sin(θ/2 − θ₀/2)·sin(θ/2 + θ₀/2).
  const across = Math.sqrt(Math.sin(end - from) * Math.sin(end + from))
  const m1 = Math.sin(from) ** 2
  return completeF(m1) - incompleteF(Math.cos(end), across, m1)
}

/** Seconds from rest at `lean` to `to` degrees from upright. */
export function toppleTime(subject: BodySubject, lean: number, to = 90): number {
  return toppleMeasure(lean, to) / paceOf(subject)
}

/** Seconds for a full swing of `amplitude` degrees (below 180) to either side: 4K(sin²(A/2))/k. DLMF 22.19.2 and the text around it. */
export function swingPeriod(subject: BodySubject, amplitude: number): number {
  return 4 * completeF(Math.cos(amplitude * RADIAN / 2) ** 2) / paceOf(subject)
}

/**
 * Degrees from upright at which a body going over on a brink leaves it: cos θ = q·(cos θ₀ + p²/2)/(1 + q), where the force along its
 * length has gone (see `edge.ts`). `lean` and p = θ′₀/k are where it started; 0 where it is too fast to stay on at all.
 */
export function leavesEdgeAt(ratio: number, lean = 0, push = 0): number {
  return Math.acos(Math.min(1, leavingCosine(ratio, edgeEnergy(lean * RADIAN, push)))) / RADIAN
}
