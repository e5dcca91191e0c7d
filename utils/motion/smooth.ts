/** Smooths over lone bad drawings before any law is known, so that a search begins on the motion and not on its faults. */

/** Value at xs[at] of the cubic through its two neighbours on either side. */
function between(x: Float64Array, y: Float64Array, at: number): number {
  let sum = 0
  const around = [at - 2, at - 1, at + 1, at + 2]
  for (const i of around) {
    let weight = 1
    for (const j of around) {
      if (j !== i) weight *= ((x[at] as number) - (x[j] as number)) / ((x[i] as number) - (x[j] as number))
    }
    sum += weight * (y[i] as number)
  }
  return sum
}

/**
 * Returns a copy of y where drawings that jump out of their neighbours' curve are put onto it, worst first. At most a sixth of the
 * keys (two at least, forty at most) are touched, none within two keys of an end, and none where the jump is below `floor`.
 */
export function smoothed(x: Float64Array, y: Float64Array, floor: number): Float64Array {
  const n = y.length
  const out = y.slice()
  if (n < 7) return out
  const jump = new Float64Array(n)
  for (let i = 2; i < n - 2; i++) jump[i] = (y[i] as number) - between(x, out, i)
  // What most keys jump by anyway, from pencil and curvature: one bad drawing among them hardly moves a median.
  const typical = Float64Array.from(jump.subarray(2, n - 2), Math.abs).sort()[(n - 4) >> 1] as number
  const most = Math.min(40, Math.max(2, Math.floor(n / 6)))
  for (let round = 0; round < most; round++) {
    let worst = -1
    for (let i = 2; i < n - 2; i++) if (worst < 0 || Math.abs(jump[i] as number) > Math.abs(jump[worst] as number)) worst = i
    if (worst < 0 || Math.abs(jump[worst] as number) <= Math.max(floor, 5 * typical)) break
    out[worst] = between(x, out, worst)
    for (let i = Math.max(2, worst - 2); i <= Math.min(n - 3, worst + 2); i++) jump[i] = (out[i] as number) - between(x, out, i)
  }
  return out
}
