/** The line or circle that drawings lie along, so fitted that one or two bad ones don't bend it. */
import { solveInto } from '../solve'
import { student95 } from '../student'
import type { Place } from '../types'
import { bearingOf, circleAbout, curveThrough, lineThrough } from './curve'
import type { Curve } from './curve'
import { placeOf } from './sheet'
import type { Sheet } from './sheet'
import { leastLine, taubinCircle } from './taubin'

export interface CurveFit {
  curve: Curve
  /** Signed distance of every drawing from the curve, drawing units. */
  off: Float64Array
  /** Drawings that the fit counts: 1 or 0. */
  counts: Float64Array
  /** 95 % half-width of `bend`, 1/drawing units; 0 for a line. */
  bendSpread: number
}

const distances = (sheet: Sheet, curve: Curve) =>
  Float64Array.from({ length: sheet.n }, (_, i) => bearingOf(curve, placeOf(sheet, i)).off)

function weighed(off: Float64Array, counts: Float64Array): number {
  let sum = 0
  for (let i = 0; i < off.length; i++) sum += (counts[i] as number) * (off[i] as number) ** 2
  return sum
}

interface Equations { a: Float64Array, b: Float64Array }

/** Normal equations of the squared distances in A, φ and D, or in φ and D alone. With P = off + A·off², d off = (dP − off²·dA)/(1 + 2A·off). */
function equationsOf(sheet: Sheet, curve: Curve, off: Float64Array, counts: Float64Array, curved: boolean): Equations {
  const size = curved ? 3 : 2
  const { base, bend, normal, shift } = curve
  const [c, s] = [Math.cos(normal), Math.sin(normal)]
  const e = Math.sqrt(Math.max(1e-12, 1 + 4 * bend * shift))
  const a = new Float64Array(size * size)
  const b = new Float64Array(size)
  const row = new Float64Array(3)
  for (let i = 0; i < sheet.n; i++) {
    if (!counts[i]) continue
    const d = off[i] as number
    const [dx, dy] = [(sheet.x[i] as number) - base.x, (sheet.y[i] as number) - base.y]
    const out = c * dx + s * dy
    const steep = 1 + 2 * bend * d
    // At the very centre of a circle every direction is the nearest: such a drawing says nothing.
    if (!(Math.abs(steep) > 1e-9)) continue
    row[0] = e * (c * dy - s * dx) / steep
    row[1] = (1 + 2 * bend * out / e) / steep
    row[2] = (dx * dx + dy * dy + 2 * shift * out / e - d * d) / steep
    for (let p = 0; p < size; p++) {
      b[p] = (b[p] as number) - (row[p] as number) * d
      for (let q = 0; q < size; q++) a[size * p + q] = (a[size * p + q] as number) + (row[p] as number) * (row[q] as number)
    }
  }
  return { a, b }
}

/** Geometric least squares by Levenberg–Marquardt from a curve in hand (Chernov & Lesort as above; the usual damping). */
function settle(sheet: Sheet, from: Curve, counts: Float64Array, slop: number, curved: boolean): CurveFit {
  const size = curved ? 3 : 2
  let curve = from
  let off = distances(sheet, curve)
  let cost = weighed(off, counts)
  let damping = 1e-6
  const move = new Float64Array(3)
  for (let step = 0; step < 40; step++) {
    const { a, b } = equationsOf(sheet, curve, off, counts, curved)
    let saved = 0
    for (let attempt = 0; attempt < 8; attempt++) {
      const damped = a.slice()
      for (let p = 0; p < size; p++) damped[size * p + p] = (damped[size * p + p] as number) * (1 + damping)
      if (solveInto(damped, b, size, move)) {
        const next: Curve = {
          base: curve.base, normal: curve.normal + (move[0] as number), shift: curve.shift + (move[1] as number),
          bend: curved ? curve.bend + (move[2] as number) : 0,
        }
        const nextOff = distances(sheet, next)
        const nextCost = weighed(nextOff, counts)
        if (nextCost < cost) {
          saved = cost - nextCost
          curve = next
          off = nextOff
          cost = nextCost
          damping /= 10
          break
        }
      }
      damping = Math.max(1e-6, damping * 10)
    }
    if (!(saved > 1e-12 * cost)) break
  }
  return { curve, off, counts, bendSpread: curved ? bendSpread(sheet, curve, off, counts, slop) : 0 }
}

/** The pencil's variance across the path: a third of the slop counts as four drawings seen before the first one is (as for readings). */
function pencilSquared(off: Float64Array, counts: Float64Array, kept: number, slop: number): number {
  return (4 * (slop / 3) ** 2 + weighed(off, counts)) / (4 + kept - 3)
}

/** One spread's steps in φ, D and A that together make up the fit's covariance (its Cholesky factor's columns); null where it is not settled. */
function stepsOf(sheet: Sheet, curve: Curve, off: Float64Array, counts: Float64Array, slop: number): Float64Array[] | null {
  const kept = counts.reduce((sum, count) => sum + count, 0)
  const { a } = equationsOf(sheet, curve, off, counts, true)
  if (kept < 4) return null
  const covariance: Float64Array[] = []
  for (let p = 0; p < 3; p++) {
    const column = new Float64Array(3)
    if (!solveInto(a, [p === 0 ? 1 : 0, p === 1 ? 1 : 0, p === 2 ? 1 : 0], 3, column)) return null
    covariance.push(column.map(value => value * pencilSquared(off, counts, kept, slop)))
  }
  const steps = [new Float64Array(3), new Float64Array(3), new Float64Array(3)]
  for (let q = 0; q < 3; q++) {
    for (let p = q; p < 3; p++) {
      let sum = (covariance[p] as Float64Array)[q] as number
      for (let k = 0; k < q; k++) sum -= ((steps[k] as Float64Array)[p] as number) * ((steps[k] as Float64Array)[q] as number)
      const column = steps[q] as Float64Array
      column[p] = p === q ? Math.sqrt(Math.max(0, sum)) : (column[q] as number) > 0 ? sum / (column[q] as number) : 0
    }
  }
  return steps
}

function bendSpread(sheet: Sheet, curve: Curve, off: Float64Array, counts: Float64Array, slop: number): number {
  const steps = stepsOf(sheet, curve, off, counts, slop)
  return steps ? student95(counts.reduce((sum, count) => sum + count, 0) - 3) * Math.hypot(...steps.map(step => step[2] as number)) : Infinity
}

/** Curves that lie one spread off a fitted one, three ways that don't lean on one another; none where the fit is not settled. */
export function neighbours(sheet: Sheet, { curve, off, counts }: CurveFit, slop: number): Curve[] {
  return (stepsOf(sheet, curve, off, counts, slop) ?? []).map(([turn = 0, shift = 0, bend = 0]) => (
    { base: curve.base, normal: curve.normal + turn, shift: curve.shift + shift, bend: curve.bend + bend }
  ))
}

/** How badly a curve does when a drawing can count as no worse than clearly off. */
export function doubt(off: Float64Array, allowed: Float64Array): number {
  let sum = 0
  for (let i = 0; i < off.length; i++) {
    const [d, a] = [off[i] as number, allowed[i] as number]
    sum += a > 0 ? Math.min(1, (d / a) ** 2) : d === 0 ? 0 : 1
  }
  return sum
}

/** Index triples spread over the list, wide ones first: among them are many that no bad drawing has touched. */
export function triples(n: number): [number, number, number][] {
  const out: [number, number, number][] = []
  const seen = new Set<string>()
  for (let round = 0; round < 10; round++) {
    for (const [p, q, r] of [[0, 0.5, 1], [0.1, 0.55, 0.95], [0, 0.35, 0.8], [0.2, 0.65, 1], [0.05, 0.4, 0.7], [0.3, 0.6, 0.9]] as const) {
      const at = [p, q, r].map((share, k) => Math.min(n - 1, Math.max(0, Math.round(share * (n - 1)) + (round >> 1) * (round % 2 ? 1 : -1) * (k === 1 ? -1 : 1))))
      const [i, j, k] = at as [number, number, number]
      const name = at.join()
      if (i >= j || j >= k || seen.has(name)) continue
      seen.add(name)
      out.push([i, j, k])
    }
  }
  return out
}

/** What a drawing may be off and still count for the fit: what pencil explains, never more than the allowance. */
export function countedWithin(off: Float64Array, allowed: Float64Array, slop: number): Float64Array {
  const middle = Float64Array.from(off, Math.abs).sort()[off.length >> 1] as number
  // 1.4826 × the median of the distances is the spread of a bell; four spreads are no pencil's.
  const pencil = Math.max(1.5 * slop, 6 * middle)
  return Float64Array.from(off, (d, i) => (Math.abs(d) <= Math.min(pencil, Math.max(allowed[i] as number, slop)) ? 1 : 0))
}

/** Settles on the drawings that lie close, again and again until they stay the same. */
function tighten(sheet: Sheet, from: Curve, allowed: Float64Array, slop: number, curved: boolean, refit: Refit): CurveFit {
  let fit: CurveFit = { curve: from, off: distances(sheet, from), counts: new Float64Array(sheet.n).fill(1), bendSpread: 0 }
  let before = ''
  for (let round = 0; round < 12; round++) {
    const counts = countedWithin(fit.off, allowed, slop)
    const name = counts.join('')
    // Too few to hold a curve: it is fitted to nothing in particular.
    if (name === before || counts.reduce((sum, count) => sum + count, 0) < Math.max(curved ? 4 : 3, sheet.n / 2)) break
    before = name
    fit = refit(fit.curve, counts)
  }
  return fit
}

type Refit = (from: Curve, counts: Float64Array) => CurveFit

/** The plain best where it leaves nothing to doubt; else the best of those that settle on what most drawings say. */
function robust(sheet: Sheet, first: Curve, others: () => Curve[], allowed: Float64Array, slop: number, curved: boolean, refit: Refit): CurveFit {
  const ones = new Float64Array(sheet.n).fill(1)
  const plain = refit(first, ones)
  if (countedWithin(plain.off, allowed, slop).every(counts => counts === 1)) return plain
  const ranked = [plain.curve, ...others()]
    .map(curve => ({ curve, cost: doubt(distances(sheet, curve), allowed) }))
    .sort((a, b) => a.cost - b.cost)
    .slice(0, 3)
  const fits = [plain, ...ranked.map(({ curve }) => tighten(sheet, curve, allowed, slop, curved, refit))]
  const costs = fits.map(({ off }) => doubt(off, allowed))
  return fits[costs.indexOf(Math.min(...costs))] as CurveFit
}

/** The line, or the circle that may flatten into one. `allowed`: what each drawing may be off; at least two different places are needed. */
export function fitCurve(sheet: Sheet, allowed: Float64Array, slop: number, curved: boolean): CurveFit {
  const ones = new Float64Array(sheet.n).fill(1)
  const first = (curved ? taubinCircle(sheet, ones) : null) ?? leastLine(sheet, ones)
  const others = () => triples(sheet.n).flatMap(([i, j, k]) => {
    const [p, q, r] = [placeOf(sheet, i), placeOf(sheet, j), placeOf(sheet, k)]
    return (curved ? curveThrough(p, q, r) : lineThrough(p, r)) ?? []
  })
  return robust(sheet, first, others, allowed, slop, curved, (from, counts) => settle(sheet, from, counts, slop, curved))
}

/** The circle about a given centre: only its radius is looked for. Null where every drawing sits on the centre. */
export function fitAbout(sheet: Sheet, centre: Place, allowed: Float64Array, slop: number): CurveFit | null {
  const radii = Float64Array.from({ length: sheet.n }, (_, i) => Math.hypot((sheet.x[i] as number) - centre.x, (sheet.y[i] as number) - centre.y))
  const middle = radii.slice().sort()[sheet.n >> 1] as number
  if (!(middle > 0)) return null
  const towards = placeOf(sheet, sheet.n >> 1)
  const refit: Refit = (_from, counts) => {
    let [sum, kept] = [0, 0]
    for (let i = 0; i < sheet.n; i++) {
      sum += (counts[i] as number) * (radii[i] as number)
      kept += counts[i] as number
    }
    const curve = circleAbout(centre, sum / kept, towards)
    return { curve, off: distances(sheet, curve), counts, bendSpread: 0 }
  }
  return robust(sheet, circleAbout(centre, middle, towards), () => [circleAbout(centre, middle, towards)], allowed, slop, true, refit)
}
