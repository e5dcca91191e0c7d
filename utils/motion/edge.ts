/**
 * A body going over a brink, exactly, in its own measure: time is τ = kt, k² = g/L, angles are radians from upright balance.
 * On the brink it is a topple. The force along its length is N = m(g·cos θ − d·θ′²); with q = 2d/L, dθ/dτ = p and the energy
 * E = cos θ + p²/2, which stays the same all along the arc, N has gone where cos θ = q·E/(1 + q) (energy, and Newton's second law along
 * the body). From there on nothing turns it any faster or slower.
 */
import { incompleteF } from './elliptic'
import { freeSwing } from './swing'

const TURN = 2 * Math.PI

export interface Release {
  /** k·t from the start; 0 where nothing holds it even there. */
  tau: number
  /** Radians from upright, counted like the start. */
  angle: number
  /** dθ/dτ, kept from here on. */
  turn: number
}

/** E = cos θ + p²/2. */
export function edgeEnergy(start: number, push: number): number {
  return Math.cos(start) + push * push / 2
}

/** cos of the angle at which a body of ratio q = 2d/L and energy E leaves the brink; above 1 where it is too fast to stay on at all. */
export function leavingCosine(ratio: number, energy: number): number {
  return ratio * energy / (1 + ratio)
}

/**
 * Where a body that starts at (start, push) leaves the arc if it does so at cos θ = `cosine` on its way out. From exact balance it is
 * told to go to the positive side, after a very long time. Always finite.
 */
export function releaseAt(start: number, push: number, cosine: number): Release {
  const whole = Math.round(start / TURN) * TURN
  const own = start - whole
  const lean = Math.sin(own / 2)
  const overTheTop = Math.abs(push / 2) >= Math.abs(lean) && push !== 0
  const way = (overTheTop ? push : own) < 0 ? -1 : 1
  // A body on its way up from beyond its leaving angle is not held either.
  if (Math.cos(own) <= cosine) return { tau: 0, angle: start, turn: push }
  const angle = Math.acos(Math.max(-1, cosine))
  // (p/2)² = (p₀/2)² + sin²(θ/2) − sin²(θ₀/2).
  const gained = Math.sin(angle / 2 - way * own / 2) * Math.sin(angle / 2 + way * own / 2)
  const half = Math.sqrt(Math.max(0, push * push / 4 + gained))
  const tau = overTheTop
    ? timeOverTheTop(way * own, way * push / 2, angle)
    : timeOneSide(way * own, way * push / 2, angle, half)
  return { tau, angle: whole + way * angle, turn: way * 2 * half }
}

/**
 * k·t to `angle` for a body that stays on its side of upright: both ends as phases of the same hanging swing, sin(ψ/2) = √m·sn u and
 * its rate 2√m·cn u with ψ = π − θ. DLMF 22.19(i).
 */
function timeOneSide(start: number, halfPush: number, angle: number, halfTurn: number): number {
  const lean = Math.sin(start / 2)
  const m1 = (lean - halfPush) * (lean + halfPush)
  return Math.max(0, incompleteF(Math.cos(angle / 2), -halfTurn, m1) - incompleteF(Math.cos(start / 2), -halfPush, m1))
}

/** The same for one that has the speed to pass upright: ψ/2 = am(√m·τ | 1/m). */
function timeOverTheTop(start: number, halfPush: number, angle: number): number {
  const c = Math.sin(start / 2)
  const s = Math.cos(start / 2)
  const m = s * s + halfPush * halfPush
  const m1 = (halfPush - c) * (halfPush + c) / m
  return Math.max(0, incompleteF(s, c, m1) - incompleteF(Math.cos(angle / 2), Math.sin(angle / 2), m1)) / Math.sqrt(m)
}

/**
 * Fills `angle` and `rate` (dθ/dτ) for the first `n` of `taus`: the arc up to `release`, an even turn after it. A body that nothing
 * holds from the start turned evenly before it too.
 */
export function overBrink(
  start: number, push: number, release: Release, taus: ArrayLike<number>, n: number, angle: Float64Array, rate: Float64Array,
): void {
  freeSwing(start, push, true, taus, n, angle, rate)
  for (let i = 0; i < n; i++) {
    const since = (taus[i] as number) - release.tau
    if (since <= 0 && release.tau > 0) continue
    angle[i] = release.angle + release.turn * since
    rate[i] = release.turn
  }
}
