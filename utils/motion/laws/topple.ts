/** A body going over about its foot: θ″ = k² sin θ, θ from upright balance, k² = g/L. */
import type { LawModel } from './model'
import { beginSwing, confineSwing, traceSwing } from './swinging'

export const topple: LawModel = {
  law: 'topple',
  size: 3,
  linear: false,
  trace: (series, numbers, x, withColumns) => traceSwing(series, numbers, x, withColumns, true),
  confine: confineSwing,
  begin: (series, y) => beginSwing(series, y, true),
}
