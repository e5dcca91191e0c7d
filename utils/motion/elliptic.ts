/**
 * Jacobi's functions and the integral of the first kind, written in the parameter m together with its complement m₁ = 1 − m.
 *
 * Why not the library's: a body let go close to upright has m within 1e-7 of one, and everything about it hangs on 1 − m, which
 * is already lost once m has been rounded. These take m₁ itself. They also set up once per motion and then cost one sine and one
 * cosine per drawing, which is what lets a list be judged on every keystroke. The tests hold them against the library.
 */

/** Below this the complement is taken as this: K stays finite (about 346), and no drawn motion lasts that long. */
const LEAST_COMPLEMENT = 1e-300

/** From 1e-300 the mean takes twelve steps. */
const MOST_STEPS = 16

/** The arithmetic-geometric steps for one m₁, kept for reuse over many arguments. */
export interface Ladder {
  /** Complete integral K(m). */
  readonly quarter: number
  readonly steps: number
  /** The first `steps` entries of these count. */
  readonly a: Float64Array
  readonly g: Float64Array
  readonly mean: number
  readonly complement: number
}

/**
 * Climbs the arithmetic-geometric mean for complement m₁ in (0, 1]; smaller values are lifted to 1e-300.
 * K = π / (2·agm(1, √m₁)): NIST DLMF 19.8.5; A&S 17.6.3.
 */
export function ladder(complement: number): Ladder {
  const m1 = Math.min(1, Math.max(LEAST_COMPLEMENT, complement))
  const as = new Float64Array(MOST_STEPS)
  const gs = new Float64Array(MOST_STEPS)
  let a = 1
  let square = m1
  let mean = 1
  let steps = 0
  while (steps < MOST_STEPS) {
    const g = Math.sqrt(square)
    as[steps] = a
    gs[steps++] = g
    mean = 0.5 * (a + g)
    if (Math.abs(a - g) <= 1e-9 * a) break
    square = a * g
    a = mean
  }
  return { quarter: Math.PI / (2 * mean), steps, a: as, g: gs, mean, complement: m1 }
}

/**
 * Writes sn(u|m), cn(u|m), dn(u|m) into out[0..2].
 * Gauss's transformation run downwards in cot φ, so that cn keeps its relative accuracy where sn is near ±1:
 * R. Bulirsch, Numer. Math. 7 (1965) 78–90 (the recurrence as remembered; the tests check it against published values).
 */
export function jacobi(l: Ladder, u: number, out: Float64Array): void {
  const angle = u * l.mean
  let sn = Math.sin(angle)
  let cn = Math.cos(angle)
  let dn = 1
  if (Math.abs(sn) < 1e-150) {
    // The cotangent would overflow; sn u = u to every digit.
    sn = u
  } else {
    let p = cn / sn
    let c = l.mean * p
    for (let i = l.steps - 1; i >= 0; i--) {
      const b = l.a[i] as number
      p *= c
      c *= dn
      dn = ((l.g[i] as number) + p) / (b + p)
      p = c / b
    }
    const size = 1 / Math.sqrt(c * c + 1)
    sn = sn > 0 ? size : -size
    cn = c * sn
  }
  out[0] = sn
  out[1] = cn
  out[2] = dn
}

/** Jacobi's amplitude am(u|m), unwound: it grows by π for every 2K. DLMF 22.16(i). */
export function amplitude(l: Ladder, u: number, sn: number, cn: number): number {
  const half = Math.round(u / (2 * l.quarter))
  // atan of the ratio is the amplitude within its own half turn; `half` counts the half turns already done.
  return half * Math.PI + Math.atan2(half % 2 === 0 ? sn : -sn, half % 2 === 0 ? cn : -cn)
}

/** Carlson's symmetric integral R_F(x, y, z), at most one argument zero. DLMF 19.16.1; duplication and series, DLMF 19.36(i). */
export function carlsonRF(x: number, y: number, z: number): number {
  for (let i = 0; i < 200; i++) {
    const mean = (x + y + z) / 3
    const dx = 1 - x / mean
    const dy = 1 - y / mean
    const dz = 1 - z / mean
    if (Math.max(Math.abs(dx), Math.abs(dy), Math.abs(dz)) < 2e-3) {
      const e2 = dx * dy + dy * dz + dz * dx
      const e3 = dx * dy * dz
      // Signs follow from writing each argument as mean·(1 − d).
      return (1 + e2 * (-1 / 10 + e2 / 24 - 3 * e3 / 44) + e3 / 14) / Math.sqrt(mean)
    }
    const lambda = Math.sqrt(x * y) + Math.sqrt(y * z) + Math.sqrt(z * x)
    x = (x + lambda) / 4
    y = (y + lambda) / 4
    z = (z + lambda) / 4
  }
  return 1 / Math.sqrt((x + y + z) / 3)
}

/** K(m) from the complement 1 − m in (0, 1]. DLMF 19.8.5. */
export function completeF(complement: number): number {
  return ladder(complement).quarter
}

/**
 * F(φ|m) from sin φ, cos φ (any common positive factor) and m₁ = 1 − m, for φ in (−π, π]; beyond ±π/2 by F(π − φ) = 2K − F(φ).
 * F = sin φ · R_F(cos²φ, 1 − m sin²φ, 1), with 1 − m sin²φ written cos²φ + m₁ sin²φ so that nothing cancels. DLMF 19.25.5, 19.2.10.
 */
export function incompleteF(sin: number, cos: number, complement: number): number {
  const m1 = Math.min(1, Math.max(LEAST_COMPLEMENT, complement))
  const norm = Math.hypot(sin, cos)
  if (norm === 0) return 0
  const s = sin / norm
  const c = cos / norm
  if (s === 0) return c >= 0 ? 0 : 2 * completeF(m1)
  const first = s * carlsonRF(c * c, c * c + m1 * s * s, 1)
  if (c >= 0) return first
  return (s > 0 ? 2 : -2) * completeF(m1) - first
}
