/** A posted list of points in the judge's own measures: x to the right, y up whatever the drawing counts, both from the list's own middle. */
import type { PointCheck, Place } from '../types'

export interface Sheet {
  readonly n: number
  /** Drawing units right of and above `origin`. */
  readonly x: Float64Array
  readonly y: Float64Array
  /** The list's middle as posted. */
  readonly origin: Place
  /** +1 where posted y counts up, −1 where it counts down. */
  readonly up: 1 | -1
  /** The longest way across all drawings, drawing units. */
  readonly extent: number
}

/** Takes the points of a request apart. Coordinates are counted from their own middle, so that a far corner of the drawing costs no digits. */
export function sheetOf({ keys, yAxis }: PointCheck): Sheet {
  const xs = keys.map(key => key.x)
  const ys = keys.map(key => key.y)
  const [left, right] = [Math.min(...xs), Math.max(...xs)]
  const [low, high] = [Math.min(...ys), Math.max(...ys)]
  const origin = { x: (left + right) / 2, y: (low + high) / 2 }
  const up = yAxis === 'up' ? 1 : -1
  return {
    n: keys.length,
    x: Float64Array.from(xs, x => x - origin.x),
    y: Float64Array.from(ys, y => up * (y - origin.y)),
    origin, up,
    extent: Math.hypot(right - left, high - low),
  }
}

/** A place of the sheet as the drawing counts it. */
export function asPosted({ origin, up }: Sheet, { x, y }: Place): Place {
  return { x: origin.x + x, y: origin.y + up * y }
}

/** A posted place on the sheet. */
export function onSheet({ origin, up }: Sheet, { x, y }: Place): Place {
  return { x: x - origin.x, y: up * (y - origin.y) }
}

/** Where drawing i sits on the sheet. */
export function placeOf({ x, y }: Sheet, i: number): Place {
  return { x: x[i] as number, y: y[i] as number }
}

/** slop + tolerance × mean distance to the drawings on either side: what may be off before any law is known, drawing units. */
export function roughAllowances(sheet: Sheet, slop: number, tolerance: number): Float64Array {
  const gap = (i: number) => Math.hypot(
    (sheet.x[i] as number) - (sheet.x[i - 1] as number), (sheet.y[i] as number) - (sheet.y[i - 1] as number),
  )
  return Float64Array.from({ length: sheet.n }, (_, i) => {
    const left = i > 0 ? gap(i) : gap(1)
    const right = i < sheet.n - 1 ? gap(i + 1) : left
    return slop + tolerance * (left + right) / 2
  })
}
