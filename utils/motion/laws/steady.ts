/** Even spacing: r = r₀ + vt. */
import type { Series } from '../series'
import type { LawModel, Trace } from './model'

/** Numbers: reading at mid-span, and half the travel over the span. */
export const steady: LawModel = {
  law: 'steady',
  size: 2,
  linear: true,
  trace(_series: Series, numbers: Float64Array, x: Float64Array, withColumns: boolean): Trace {
    const [middle = 0, half = 0] = numbers
    return {
      value: x.map(at => middle + half * (2 * at - 1)),
      rate: x.map(() => 2 * half),
      columns: withColumns ? [x.map(() => 1), x.map(at => 2 * at - 1)] : [],
    }
  },
  begin: () => [new Float64Array(2)],
}
