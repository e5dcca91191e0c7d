/** A first circle or line for all drawings at once, without a search. */
import type { Place } from '../types'
import { circleAbout } from './curve'
import type { Curve } from './curve'
import { placeOf } from './sheet'
import type { Sheet } from './sheet'

/** Weighted middle and second moments of the drawings. */
function momentsOf({ x, y, n }: Sheet, weights: Float64Array) {
  let [w, mx, my] = [0, 0, 0]
  for (let i = 0; i < n; i++) {
    w += weights[i] as number
    mx += (weights[i] as number) * (x[i] as number)
    my += (weights[i] as number) * (y[i] as number)
  }
  mx /= w
  my /= w
  let [xx, xy, yy, xz, yz, zz] = [0, 0, 0, 0, 0, 0]
  for (let i = 0; i < n; i++) {
    const share = (weights[i] as number) / w
    const [dx, dy] = [(x[i] as number) - mx, (y[i] as number) - my]
    const z = dx * dx + dy * dy
    xx += share * dx * dx
    xy += share * dx * dy
    yy += share * dy * dy
    xz += share * dx * z
    yz += share * dy * z
    zz += share * z * z
  }
  return { middle: { x: mx, y: my } satisfies Place, xx, xy, yy, xz, yz, zz }
}

/** The line of least squared distances (total least squares: the major axis of the second moments). */
export function leastLine(sheet: Sheet, weights: Float64Array): Curve {
  const { middle, xx, xy, yy } = momentsOf(sheet, weights)
  return { base: middle, bend: 0, normal: Math.atan2(2 * xy, xx - yy) / 2 + Math.PI / 2, shift: 0 }
}

/**
 * The circle of least algebraic distances after G. Taubin, Estimation of planar curves, IEEE Transactions on Pattern Analysis and Machine
 * Intelligence 13 (1991) 1115–1138, in Newton's form. Null where the drawings lie on a line as far as the sums can tell.
 */
export function taubinCircle(sheet: Sheet, weights: Float64Array): Curve | null {
  const { middle, xx, xy, yy, xz, yz, zz } = momentsOf(sheet, weights)
  const z = xx + yy
  const covariance = xx * yy - xy * xy
  const spread = zz - z * z
  const a2 = -3 * z * z - zz
  const a1 = spread * z + 4 * covariance * z - xz * xz - yz * yz
  const a0 = xz * (xz * yy - yz * xy) + yz * (yz * xx - xz * xy) - spread * covariance
  let root = 0
  let value = a0
  for (let step = 0; step < 30; step++) {
    const next = root - value / (a1 + root * (2 * a2 + 12 * z * root))
    if (!Number.isFinite(next) || next === root) break
    const nextValue = a0 + next * (a1 + next * (a2 + 4 * z * next))
    if (Math.abs(nextValue) >= Math.abs(value)) break
    root = next
    value = nextValue
  }
  const size = 2 * (root * root - root * z + covariance)
  const away = { x: (xz * (yy - root) - yz * xy) / size, y: (yz * (xx - root) - xz * xy) / size }
  const radius = Math.sqrt(away.x * away.x + away.y * away.y + z)
  if (!Number.isFinite(radius) || !(radius > 0)) return null
  const centre = { x: middle.x + away.x, y: middle.y + away.y }
  return circleAbout(centre, radius, placeOf(sheet, sheet.n >> 1))
}
