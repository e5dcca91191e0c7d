/** Student's t at the two-sided 95 % point. */

const NORMAL = 1.959963984540054
const EXACT = [12.706204736, 4.302652730, 3.182446305, 2.776445105, 2.570581836]

/**
 * t₀.₉₇₅ for `free` degrees of freedom (1 and up). One to five from the published table (A&S table 26.10; digits from memory), beyond by
 * the expansion A&S 26.7.5, which is then right to 1e-3.
 */
export function student95(free: number): number {
  const exact = EXACT[Math.max(1, Math.floor(free)) - 1]
  if (exact !== undefined) return exact
  const x = NORMAL
  const x2 = x * x
  const g1 = x * (x2 + 1) / 4
  const g2 = x * ((5 * x2 + 16) * x2 + 3) / 96
  const g3 = x * (((3 * x2 + 19) * x2 + 17) * x2 - 15) / 384
  return x + (g1 + (g2 + g3 / free) / free) / free
}
