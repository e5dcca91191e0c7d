/** What may be off without being noticed. */

/**
 * Allowance at every key, reading units: slop + tolerance × mean of the law's gaps on either side; at an end, the one gap.
 * `line` holds the law's readings at the keys.
 */
export function allowances(line: Float64Array, slop: number, tolerance: number): Float64Array {
  const n = line.length
  const out = new Float64Array(n)
  for (let i = 0; i < n; i++) out[i] = allowanceAt(line, i, n, slop, tolerance)
  return out
}

/** The same for one key. */
export function allowanceAt(line: ArrayLike<number>, i: number, n: number, slop: number, tolerance: number): number {
  const left = i > 0 ? Math.abs((line[i] as number) - (line[i - 1] as number)) : -1
  const right = i < n - 1 ? Math.abs((line[i + 1] as number) - (line[i] as number)) : -1
  const gap = left < 0 ? Math.max(0, right) : right < 0 ? left : (left + right) / 2
  return slop + tolerance * gap
}
