/**
 * The first fit of a law to a whole list. Short lists are fitted at once. Over a long one a swing counts many turns, and a size that is
 * off by a hundredth is a whole drawing out of step by the end; there the fit starts with a few keys and takes in more as it gets surer.
 */
import { BRIEF, PASSING, THOROUGH, refine } from './fit'
import type { Effort, Fit } from './fit'
import type { LawModel } from './laws/model'
import type { Series } from './series'

/** Up to this many keys are fitted at once. */
const AT_ONCE = 72
const FIRST_KEYS = 48
const GROWTH = 1.6
/** Laws that are only compared with are fitted on at most about this many keys first. */
const ENOUGH_TO_COMPARE = 150

/** Part of a series: time and readings of keys from..to (exclusive). Times keep the whole list's measure. */
function part(series: Series, y: Float64Array, from: number, to: number): Series {
  return { ...series, n: to - from, x: series.x.subarray(from, to), y: y.subarray(from, to) }
}

function every(series: Series, y: Float64Array, stride: number): Series {
  const x = series.x.filter((_, i) => i % stride === 0)
  return { ...series, n: x.length, x, y: y.filter((_, i) => i % stride === 0) }
}

/** Fit to keys from..to (exclusive) alone, traced over the whole list: where one half is sound, it shows up what is wrong with the other. */
export function partFit(series: Series, model: LawModel, y: Float64Array, from: number, to: number): Fit {
  const found = fitPiece(model, part(series, y, from, to), null, THOROUGH).numbers
  const numbers = model.fromStart ? model.fromStart(found) : found
  return refine(model, series, series.x, series.y, new Float64Array(series.n), numbers, { steps: 0, enough: 1 })
}

/** Best fit over one piece from the law's own beginnings, or from numbers in hand. */
function fitPiece(model: LawModel, piece: Series, from: Float64Array | null, effort: Effort): Fit {
  const ones = new Float64Array(piece.n).fill(1)
  let best: Fit | null = null
  for (const start of from ? [from] : model.begin(piece, piece.y)) {
    const found = refine(model, piece, piece.x, piece.y, ones, start, effort)
    if (!best || found.cost < best.cost) best = found
  }
  return best as Fit
}

/**
 * Fits to the readings `y` (with lone bad drawings smoothed over). `noticeable`: an offset, reading units, that tells that the law has
 * lost the list; growth stops there and the last sound numbers are handed back, fitted no further.
 */
export function firstFit(series: Series, model: LawModel, y: Float64Array, noticeable: number, effort: Effort): Fit {
  const whole = part(series, y, 0, series.n)
  if (model.linear || model.kinked || series.n <= AT_ONCE) return fitPiece(model, whole, null, effort)
  if (effort === PASSING && series.n > 2 * ENOUGH_TO_COMPARE) {
    const thin = every(series, y, Math.ceil(series.n / ENOUGH_TO_COMPARE))
    return fitPiece(model, whole, fitPiece(model, thin, null, effort).numbers, { steps: 1, enough: 1 })
  }
  const forward = grown(series, model, y, noticeable, false)
  if (forward.reached === series.n) return fitPiece(model, whole, forward.numbers, effort)
  const back = grown(series, model, y, noticeable, true)
  const atOnce = fitPiece(model, whole, null, BRIEF)
  const longest = forward.reached >= back.reached ? forward : back
  if (longest.reached < series.n / 4 || Math.sqrt(atOnce.cost / series.n) < noticeable) return atOnce
  return refine(model, whole, whole.x, whole.y, new Float64Array(series.n), longest.numbers, { steps: 0, enough: 1 })
}

function grown(series: Series, model: LawModel, y: Float64Array, noticeable: number, fromEnd: boolean): { reached: number, numbers: Float64Array } {
  let numbers: Float64Array | null = null
  let reached = 0
  for (let keys = FIRST_KEYS; ; keys = Math.min(series.n, Math.ceil(keys * GROWTH))) {
    const piece = fromEnd ? part(series, y, series.n - keys, series.n) : part(series, y, 0, keys)
    const fit: Fit = fitPiece(model, piece, numbers, numbers ? BRIEF : THOROUGH)
    if (numbers && Math.sqrt(fit.cost / keys) > noticeable) break
    numbers = fit.numbers
    reached = keys
    if (keys === series.n) break
  }
  return { reached, numbers: numbers ?? new Float64Array(model.size) }
}
