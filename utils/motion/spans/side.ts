/** One side of a joint: where the span's line is there and how fast, with how well the list settles both. */
import { refine, BRIEF } from '../fit'
import { LAWS } from '../laws/index'
import type { Line } from '../line'
import { roundingSpread, seriesOf } from '../series'
import type { Series } from '../series'
import { solve3 } from '../solve'
import type { CheckResult, ReadingCheck, ReadingLaw } from '../types'
import type { JudgedPart } from './judgePart'

export interface Side {
  /** Reading of the line at the joint, and readings per frame. */
  value: number
  speed: number
  /** Variances of the two. */
  valueVariance: number
  speedVariance: number
  /** Frames from the joint to the span's next drawing. */
  exposure: number
}

/** Share of the span over which a slope is taken: small beside any exposure, large beside the last digit. */
const NUDGE = 1e-4

/**
 * The side that `part` shows to the joint at its end or its start; null where no line of its own law can be had there.
 * `frame`: of the joint; the part may have been judged without the joint's own drawing. `bare`: leave that drawing out of the line.
 */
export function sideOf(part: JudgedPart, end: 'first' | 'last', frame: number, bare: boolean): Side | null {
  const { request, judgement: { line, result } } = part
  if (request.measure === 'point' || !line || !speaksForItself(result)) return null
  const series = seriesOf(request)
  const first = request.keys[0]?.frame ?? frame
  if (!(series.spanFrames > 0)) return null
  const at = (frame - first) / series.spanFrames
  const lags = lagsOf(result, series)
  const times = series.x.map((x, i) => x - (i >= lags.from ? lags.by : 0))
  const time = end === 'first' && lags.from > 0 ? at : at - lags.by
  const own = Float64Array.from(line.numbers)
  const drawn = LAWS[line.law].trace(series, own, times, false).value
  const kept = result.keys.map((key, i) =>
    !(bare && key.frame === frame) && Math.abs(key.reading - (drawn[i] as number)) <= (key.allowance ?? Infinity))
  const numbers = bare ? refitted(series, line, times, kept) : own
  return numbers && measuredSide(series, request, line.law, numbers, times, kept, time, exposureAt(result, frame, end))
}

/** A line that stands for another law, or for a start that was not there, says nothing of how the motion was drawn. */
function speaksForItself({ findings }: CheckResult): boolean {
  return !findings.some(({ kind }) => kind === 'wrong-law' || kind === 'not-at-rest')
}

/** A drawing held or skipped inside the span: from which key on time is shifted, and by how much of the span. */
function lagsOf({ findings, keys }: CheckResult, series: Series): { from: number, by: number } {
  const shift = findings.find(({ kind }) => kind === 'held' || kind === 'skipped')
  const from = keys.findIndex(({ frame }) => frame === shift?.frames[0])
  if (!shift || from < 0) return { from: 0, by: 0 }
  return { from, by: (shift.kind === 'held' ? 1 : -1) * shift.amount / series.spanFrames }
}

function refitted(series: Series, line: Line, times: Float64Array, kept: boolean[]): Float64Array | null {
  const model = LAWS[line.law]
  const weights = Float64Array.from(kept, keep => (keep ? 1 : 0))
  if (kept.filter(Boolean).length <= model.size) return null
  return refine(model, series, times, series.y, weights, Float64Array.from(line.numbers), BRIEF).numbers
}

function measuredSide(
  series: Series, request: ReadingCheck, law: ReadingLaw, numbers: Float64Array, times: Float64Array, kept: boolean[], time: number, exposure: number,
): Side | null {
  const model = LAWS[law]
  const { size } = model
  const { value, columns } = model.trace(series, numbers, times, true)
  const normal = new Float64Array(size * size)
  let cost = 0
  let count = 0
  for (let i = 0; i < series.n; i++) {
    if (!kept[i]) continue
    count++
    cost += ((series.y[i] as number) - (value[i] as number)) ** 2
    for (let p = 0; p < size; p++) {
      for (let q = 0; q < size; q++) {
        normal[size * p + q] = (normal[size * p + q] as number) + (columns[p]?.[i] ?? 0) * (columns[q]?.[i] ?? 0)
      }
    }
  }
  const here = model.trace(series, numbers, Float64Array.of(time), false)
  const near = model.trace(series, numbers, Float64Array.of(time - NUDGE, time, time + NUDGE), true).columns
  const byValue = Float64Array.from(near, column => column[1] ?? 0)
  const byRate = Float64Array.from(near, column => ((column[2] ?? 0) - (column[0] ?? 0)) / (2 * NUDGE * series.spanFrames))
  // A third of the slop counts as four drawings seen beforehand, as everywhere in the judge.
  const sigma2 = Math.max(
    (4 * (request.slop / 3) ** 2 + cost) / (4 + Math.max(1, count - size)), roundingSpread(series.y) ** 2,
  )
  const reading = here.value[0] ?? NaN
  const speed = (here.rate[0] ?? NaN) / series.spanFrames
  const valueVariance = sigma2 * quadratic(normal, byValue, size)
  const speedVariance = sigma2 * quadratic(normal, byRate, size)
  if (![reading, speed, valueVariance, speedVariance].every(Number.isFinite)) return null
  return { value: reading, speed, valueVariance, speedVariance, exposure }
}

/** gᵀN⁻¹g: the variance of what moves by g with the free numbers, per unit of the drawings' own. NaN where the list doesn't settle them. */
function quadratic(normal: Float64Array, gradient: Float64Array, size: number): number {
  const solved = solve3(normal, gradient, size)
  if (!solved) return NaN
  let sum = 0
  for (let p = 0; p < size; p++) sum += (gradient[p] as number) * (solved[p] as number)
  return Math.max(0, sum)
}

/** Frames between the joint and the nearest drawing of the span that is not the joint's own. */
function exposureAt({ keys }: CheckResult, frame: number, end: 'first' | 'last'): number {
  const others = keys.filter(key => key.frame !== frame)
  const next = end === 'first' ? others[0] : others[others.length - 1]
  return next ? Math.abs(next.frame - frame) : 1
}
