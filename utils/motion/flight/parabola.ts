/** A flight's parabola: the path without its timing. */
import { asPosted } from '../path/sheet'
import type { Sheet } from '../path/sheet'
import type { FoundPath, Place } from '../types'
import { valueAt } from './planar'
import type { PlanarFit } from './planar'

/** A flight that gets sideways by less than this share of its way over the list goes up and down one line. */
const UPRIGHT = 1e-9

/** height = apex.y + bend · (x − apex.x)² on the sheet, and the time of the apex; bend is infinite for a throw straight up. */
export function bendOf({ cx, cy }: PlanarFit): { bend: number, time: number } {
  const [, side = 0] = cx
  const [, c1 = 0, c2 = 0] = cy
  return { bend: c2 / (side * side), time: (1 - c1 / (2 * c2)) / 2 }
}

/** The path in the contract's words: a line where there is no parabola to speak of. */
export function flightPath(sheet: Sheet, fit: PlanarFit, misfit: number): FoundPath {
  const { bend, time } = bendOf(fit)
  const at = (x: number): Place => ({ x: valueAt(fit.cx, x).value, y: valueAt(fit.cy, x).value })
  const upright = Math.abs(fit.cx[1] as number) <= UPRIGHT * sheet.extent
  const apex = at(time)
  // An apex a million lists away is none.
  if (upright || !Number.isFinite(bend) || !(Math.abs(time) < 1e6)) {
    return { kind: 'line', from: asPosted(sheet, at(0)), to: asPosted(sheet, at(1)), misfit }
  }
  return { kind: 'parabola', apex: asPosted(sheet, apex), bend: sheet.up * bend, misfit }
}

/**
 * Signed distance of a place on the sheet from the parabola, positive to the left of the way it flies: from where the flight comes nearest,
 * found by Newton's steps in time from the flight's own moment. `time`: of the numbers' own clock.
 */
export function offParabola(fit: PlanarFit, place: Place, time: number): number {
  let at = time
  let best = Infinity
  let signed = 0
  const bendY = 8 * (fit.cy[2] as number)
  for (let step = 0; step < 12; step++) {
    const x = valueAt(fit.cx, at)
    const y = valueAt(fit.cy, at)
    const [dx, dy] = [place.x - x.value, place.y - y.value]
    const distance = Math.hypot(dx, dy)
    if (distance >= best) break
    best = distance
    signed = (dy * x.rate - dx * y.rate >= 0 ? 1 : -1) * distance
    const speed = x.rate * x.rate + y.rate * y.rate
    const steep = speed - dy * bendY
    const move = (dx * x.rate + dy * y.rate) / (steep > 0.2 * speed ? steep : speed)
    if (!Number.isFinite(move) || move === 0) break
    at += move
  }
  return signed
}
