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
    const z = x.map(at => 2 * at - 1)
    return {
      value: z.map(at => c0 + at * c1 + c2 * (at * at - 1 / 3)),
      rate: z.map(at => 2 * c1 + 4 * c2 * at),
      columns: withColumns ? [z.map(() => 1), z, z.map(at => at * at - 1 / 3)] : [],
    }
  },
  begin: () => [new Float64Array(3)],
}

/** Acceleration in readings per second², from the numbers above and the span in seconds. */
export function accelerationOf(numbers: Float64Array, span: number): number {
  // z = 2t/span − 1, so d²/dt² of c₂z² is c₂·2·(2/span)².
  return 8 * (numbers[2] ?? 0) / (span * span)
}
