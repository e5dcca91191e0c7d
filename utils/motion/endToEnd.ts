/**
 * The claimed law from rest at the first drawing to where the last one is. A law bent onto a list that is not its own comes to lie
 * along whatever was drawn (a parabola of no curvature is even spacing), and shows nobody where the drawings should sit.
 */
import { completeF, incompleteF } from './elliptic'
import { fallFromRest } from './laws/fromRest'
import { LAWS } from './laws/index'
import type { Line } from './line'
import { RADIAN } from './series'
import type { Series } from './series'
import { canRest } from './standstill'
import { toppleMeasure } from './times'
import type { ReadingLaw } from './types'

/** Below this lean, degrees, nothing falls that anyone would draw. */
const LEAST_LEAN = 0.3

/**
 * `plain` where it curves as the law does, else the law's line from rest through both ends of the list. Also `plain` where the list turns
 * on its way, or no start from rest at its first drawing leads to its last.
 */
export function endToEnd(series: Series, plain: Line, slop: number): Line {
  if (!canRest(plain.law) || turnsOnItsWay(series, slop)) return plain
  const numbers = restingNumbers(plain.law, series)
  if (!numbers?.every(Number.isFinite)) return plain
  const line: Line = { law: plain.law, numbers: Array.from(numbers), lag: 0 }
  return bend(series, plain) < bend(series, line) / 2 ? line : plain
}

/** Even spacing and easing run from one end to the other; what goes beyond its ends shows a turn, and so a law of its own. */
function turnsOnItsWay({ y, n }: Series, slop: number): boolean {
  const [first, last] = [y[0] as number, y[n - 1] as number]
  const [low, high] = [Math.min(first, last) - slop, Math.max(first, last) + slop]
  return y.some(reading => reading < low || reading > high)
}

function restingNumbers(law: ReadingLaw, { y, n, perRadian, zero }: Series): Float64Array | null {
  const [first, last] = [y[0] as number, y[n - 1] as number]
  // first + travel·x², as weights of 1 and x² − 1/3.
  if (law === 'odd-rule') return fallFromRest.full?.(Float64Array.of(first + (last - first) / 3, last - first)) ?? null
  const [from, to] = [first / perRadian + zero, last / perRadian + zero]
  return law === 'topple' ? falling(from, to) : swinging(from, to)
}

/** ln κ, angle and turn rate at the first key, from rest at `from` (or the least lean that falls) to `to`, radians. */
function falling(from: number, to: number): Float64Array | null {
  const lean = Math.max(Math.abs(from), LEAST_LEAN * RADIAN)
  if (Math.abs(to) <= lean || Math.abs(to) >= Math.PI || (Math.abs(from) > LEAST_LEAN * RADIAN && from * to < 0)) return null
  return Float64Array.of(Math.log(toppleMeasure(lean / RADIAN, Math.abs(to) / RADIAN)), Math.sign(to) * lean, 0)
}

/**
 * The same of a swing: down from rest where the first drawing is further out, else up to rest at the last. The phase from bottom to θ in
 * a swing of amplitude A is F(asin(sin(θ/2)/sin(A/2)) | sin²(A/2)); rest comes at K. DLMF 22.19(i), as in `swing.ts`.
 */
function swinging(from: number, to: number): Float64Array | null {
  const out = Math.max(Math.abs(from), Math.abs(to))
  if (!(out > 0) || out >= Math.PI) return null
  const down = Math.abs(from) >= Math.abs(to)
  const [outer, inner] = down ? [from, to] : [to, from]
  const [a, b] = [Math.sin(out / 2), Math.sin(inner / 2) * Math.sign(outer)]
  const complement = Math.cos(out / 2) ** 2
  const phase = incompleteF(b, Math.sqrt(Math.max(0, (a - b) * (a + b))), complement)
  const kappa = completeF(complement) - phase
  // Energy: (θ′/2κ)² = sin²(A/2) − sin²(θ/2).
  const turn = down ? 0 : Math.sign(to - from) * 2 * kappa * Math.sqrt(Math.max(0, (a - b) * (a + b)))
  return kappa > 0 ? Float64Array.of(Math.log(kappa), from, turn) : null
}

/** Furthest that a line strays from even spacing between its own ends. */
function bend(series: Series, line: Line): number {
  const { value } = LAWS[line.law].trace(series, Float64Array.from(line.numbers), series.x, false)
  const [first, last] = [value[0] as number, value[series.n - 1] as number]
  return value.reduce((most, reading, i) => Math.max(most, Math.abs(reading - first - (last - first) * (series.x[i] as number))), 0)
}
