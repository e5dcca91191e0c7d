/** Constant acceleration: r = r₀ + v₀t + ½at², whose equal-time gaps run 1 : 3 : 5 : 7 from the apex. */
import type { Series } from '../series'
import type { LawModel, Trace } from './model'

/**
 * Numbers: weights of 1, z and z² − 1/3 with z = 2x − 1. These three hardly lean on one another over the span (the first Legendre
 * polynomials, DLMF 18.5), which keeps the least squares well posed for readings far from zero.
 */
export const oddRule: LawModel = {
  law: 'odd-rule',
  size: 3,
  linear: true,
  trace(_series: Series, numbers: Float64Array, x: Float64Array, withColumns: boolean): Trace {
    const [c0 = 0, c1 = 0, c2 = 0] = numbers
    const n = x.length
    const value = new Float64Array(n)
    const rate = new Float64Array(n)
    const first = new Float64Array(n)
    const second = new Float64Array(n)
    for (let i = 0; i < n; i++) {
      const z = 2 * (x[i] as number) - 1
      first[i] = z
      second[i] = z * z - 1 / 3
      value[i] = c0 + c1 * z + c2 * (z * z - 1 / 3)
      rate[i] = 2 * c1 + 4 * c2 * z
    }
    return { value, rate, columns: withColumns ? [new Float64Array(n).fill(1), first, second] : [] }
  },
  begin: () => [new Float64Array(3)],
}

/** Acceleration in readings per second², from the numbers above and the span in seconds. */
export function accelerationOf(numbers: Float64Array, span: number): number {
  // z = 2t/span − 1, so d²/dt² of c₂z² is c₂·2·(2/span)².
  return 8 * (numbers[2] ?? 0) / (span * span)
}
