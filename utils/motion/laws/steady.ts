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
    const n = x.length
    const value = new Float64Array(n)
    const first = new Float64Array(n)
    for (let i = 0; i < n; i++) {
      const z = 2 * (x[i] as number) - 1
      first[i] = z
      value[i] = middle + half * z
    }
    return { value, rate: new Float64Array(n).fill(2 * half), columns: withColumns ? [new Float64Array(n).fill(1), first] : [] }
  },
  begin: () => [new Float64Array(2)],
}
