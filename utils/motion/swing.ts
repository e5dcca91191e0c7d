/**
 * θ″ = −sin θ, solved exactly: the one motion behind the pendulum and the topple. Time is τ = kt, so one solution serves every size.
 */
import { amplitude, incompleteF, jacobi, ladder } from './elliptic'

const TURN = 2 * Math.PI
const out = new Float64Array(3)

/**
 * Fills `angle` and `rate` (dθ/dτ), radians, for the first `n` of `taus`, starting from θ = start, dθ/dτ = push at τ = 0.
 * `fromTop`: angles count from upright balance (topple) instead of from hanging rest (pendulum).
 * m = sin²(θ₁/2) + (push/2)². Below one the body swings, above one it goes over the top. DLMF 22.19(i).
 * Always finite for finite arguments.
 */
export function freeSwing(
  start: number, push: number, fromTop: boolean, taus: ArrayLike<number>, n: number, angle: Float64Array, rate: Float64Array,
): void {
  // Half angles are taken from whichever end the caller counts, so that a lean of a thousandth of a degree is not 180° minus itself.
  const own = start / 2
  let s = fromTop ? Math.cos(own) : Math.sin(own)
  let c = fromTop ? Math.sin(own) : Math.cos(own)
  const hanging = fromTop ? Math.PI - start : start
  const v = (fromTop ? -push : push) / 2
  if (c < 0) {
    s = -s
    c = -c
  }
  // Whole turns are counted apart: a hanging angle is 2·atan2(s, c), within half a turn, plus these.
  const whole = Math.round((hanging - 2 * Math.atan2(s, c)) / TURN) * TURN
  const flip = fromTop ? -1 : 1
  const speed = Math.abs(v)

  if (speed < c) {
    const m = s * s + v * v
    const root = Math.sqrt(m)
    const m1 = (c - speed) * (c + speed)
    const l = ladder(m1)
    const u0 = m === 0 ? 0 : incompleteF(s, v, m1)
    for (let i = 0; i < n; i++) {
      jacobi(l, (taus[i] as number) + u0, out)
      const sinHalf = root * (out[0] as number)
      const cosHalf = out[2] as number
      angle[i] = fromTop
        ? 2 * Math.atan2(cosHalf, sinHalf) - whole
        : 2 * Math.atan2(sinHalf, cosHalf) + whole
      rate[i] = flip * 2 * root * (out[1] as number)
    }
    return
  }

  const m = s * s + v * v
  const root = Math.sqrt(m)
  const m1 = (speed - c) * (speed + c) / m
  const l = ladder(m1)
  const way = v < 0 ? -1 : 1
  const u0 = way * incompleteF(s, c, m1)
  for (let i = 0; i < n; i++) {
    const u = root * (taus[i] as number) + u0
    jacobi(l, u, out)
    const half = way * amplitude(l, u, out[0] as number, out[1] as number)
    angle[i] = fromTop ? Math.PI - 2 * half - whole : 2 * half + whole
    rate[i] = flip * way * 2 * root * (out[2] as number)
  }
}
