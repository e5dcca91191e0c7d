/** A swing about a pivot: θ″ = −k² sin θ, θ from hanging rest, k² = g/L. */
import type { LawModel } from './model'
import { beginSwing, confineSwing, traceSwing } from './swinging'

export const pendulum: LawModel = {
  law: 'pendulum',
  size: 3,
  linear: false,
  trace: (series, numbers, x, withColumns) => traceSwing(series, numbers, x, withColumns, false),
  confine: confineSwing,
  begin: (series, y) => beginSwing(series, y, false),
}
