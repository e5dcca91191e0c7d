/** Small symmetric systems for the fits: at most seven unknowns. */

// Work space: the judge runs one sum at a time, and these are asked for thousands of times per list.
const scale = new Float64Array(7)
const l = new Float64Array(49)

/**
 * Solves A·s = b into `out`, A symmetric positive definite, `size` × `size` in row order, size at most 7. False where A is not (within
 * rounding): the caller then knows that the list doesn't settle all its unknowns. Cholesky's factorisation on the matrix scaled to a
 * unit diagonal.
 */
export function solveInto(a: ArrayLike<number>, b: ArrayLike<number>, size: number, out: Float64Array): boolean {
  for (let i = 0; i < size; i++) {
    const d = a[size * i + i] as number
    if (!(d > 0)) return false
    scale[i] = 1 / Math.sqrt(d)
  }
  for (let i = 0; i < size; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = (a[size * i + j] as number) * (scale[i] as number) * (scale[j] as number)
      for (let k = 0; k < j; k++) sum -= (l[size * i + k] as number) * (l[size * j + k] as number)
      if (i === j) {
        if (!(sum > 1e-13)) return false
        l[size * i + i] = Math.sqrt(sum)
      } else {
        l[size * i + j] = sum / (l[size * j + j] as number)
      }
    }
  }
  for (let i = 0; i < size; i++) {
    let sum = (b[i] as number) * (scale[i] as number)
    for (let k = 0; k < i; k++) sum -= (l[size * i + k] as number) * (out[k] as number)
    out[i] = sum / (l[size * i + i] as number)
  }
  for (let i = size - 1; i >= 0; i--) {
    let sum = out[i] as number
    for (let k = i + 1; k < size; k++) sum -= (l[size * k + i] as number) * (out[k] as number)
    out[i] = sum / (l[size * i + i] as number)
  }
  for (let i = 0; i < size; i++) out[i] = (out[i] as number) * (scale[i] as number)
  return true
}

/** The same with an answer of its own, or null. */
export function solve3(a: ArrayLike<number>, b: ArrayLike<number>, size: number): Float64Array | null {
  const out = new Float64Array(size)
  return solveInto(a, b, size, out) ? out : null
}

/** Row `row` of A⁻¹, or null. */
export function inverseRow(a: ArrayLike<number>, row: number, size: number): Float64Array | null {
  const unit = new Float64Array(size)
  unit[row] = 1
  return solve3(a, unit, size)
}
