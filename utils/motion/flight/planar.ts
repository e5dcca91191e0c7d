/** Points over time by least squares: each of two directions a polynomial of its own, both with the same say for every drawing. */
import type { Sheet } from '../path/sheet'
import { solveInto } from '../solve'

/** How often each direction may bend: 0 stands still, 1 goes evenly, 2 gathers speed evenly. */
export interface Degrees { x: 0 | 1 | 2, y: 0 | 1 | 2 }

export interface PlanarFit {
  degrees: Degrees
  /** Weights of 1, z and z² − 1/3, z = 2x − 1 (Legendre's first polynomials, DLMF 18.5): what is not free is 0. */
  cx: Float64Array
  cy: Float64Array
  /** The line's places at the drawings. */
  x: Float64Array
  y: Float64Array
  /** Weighted sum of squared distances. */
  cost: number
  /** Normal matrix of y's numbers. */
  normalY: Float64Array
}

/** Free numbers of a fit. */
export const freeOf = ({ degrees }: PlanarFit) => degrees.x + degrees.y + 2

/** Value and speed per span of one direction's numbers at time x (0 to 1 over the list). */
export function valueAt(c: Float64Array, x: number): { value: number, rate: number } {
  const [c0 = 0, c1 = 0, c2 = 0] = c
  const z = 2 * x - 1
  return { value: c0 + c1 * z + c2 * (z * z - 1 / 3), rate: 2 * c1 + 4 * c2 * z }
}

function solved(values: Float64Array, times: Float64Array, weights: Float64Array, degree: number): { c: Float64Array, normal: Float64Array } {
  const size = degree + 1
  const a = new Float64Array(size * size)
  const b = new Float64Array(size)
  const row = new Float64Array(3)
  for (let i = 0; i < values.length; i++) {
    const w = weights[i] as number
    const z = 2 * (times[i] as number) - 1
    row[0] = 1
    row[1] = z
    row[2] = z * z - 1 / 3
    for (let p = 0; p < size; p++) {
      b[p] = (b[p] as number) + w * (row[p] as number) * (values[i] as number)
      for (let q = 0; q < size; q++) a[size * p + q] = (a[size * p + q] as number) + w * (row[p] as number) * (row[q] as number)
    }
  }
  const c = new Float64Array(3)
  if (!solveInto(a, b, size, c)) c.fill(0)
  return { c, normal: a }
}

/** Fits at `times`; drawings of no weight are traced but not heard. */
export function fitPlanar({ x, y, n }: Pick<Sheet, 'x' | 'y' | 'n'>, times: Float64Array, weights: Float64Array, degrees: Degrees): PlanarFit {
  const { c: cx } = solved(x, times, weights, degrees.x)
  const { c: cy, normal: normalY } = solved(y, times, weights, degrees.y)
  const lineX = times.map(at => valueAt(cx, at).value)
  const lineY = times.map(at => valueAt(cy, at).value)
  let cost = 0
  for (let i = 0; i < n; i++) {
    cost += (weights[i] as number) * (((x[i] as number) - (lineX[i] as number)) ** 2 + ((y[i] as number) - (lineY[i] as number)) ** 2)
  }
  return { degrees, cx, cy, x: lineX, y: lineY, cost, normalY }
}

/** Distance of drawing i from where a fit puts it, drawing units. */
export function distanceTo(sheet: Pick<Sheet, 'x' | 'y'>, fit: PlanarFit, i: number): number {
  return Math.hypot((sheet.x[i] as number) - (fit.x[i] as number), (sheet.y[i] as number) - (fit.y[i] as number))
}

/** slop + tolerance × mean of the fit's gaps on either side of each drawing from..to (exclusive); at an end, the one gap. */
export function planarAllowances({ x, y }: Pick<PlanarFit, 'x' | 'y'>, slop: number, tolerance: number, from = 0, to = x.length): Float64Array {
  const gap = (i: number) => Math.hypot((x[i] as number) - (x[i - 1] as number), (y[i] as number) - (y[i - 1] as number))
  return Float64Array.from({ length: to - from }, (_, k) => {
    const i = from + k
    const left = i > from ? gap(i) : -1
    const right = i < to - 1 ? gap(i + 1) : -1
    return slop + tolerance * (left < 0 ? Math.max(0, right) : right < 0 ? left : (left + right) / 2)
  })
}
