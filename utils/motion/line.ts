/** The law's fitted line, in a form that can be kept, sent and drawn at any frame. */
import { LAWS } from './laws/index'
import type { Trace } from './laws/model'
import { seriesOf } from './series'
import type { Series } from './series'
import { inPostedTurns, turnsToAdd } from './turns'
import type { ReadingCheck, Key, ReadingLaw } from './types'

export interface Line {
  law: ReadingLaw
  /** The law's free numbers over the list's span (see the law's own file). */
  numbers: number[]
  /** Spans by which the line runs behind the numbers' own clock: not 0 where most of a list is one exposure late or early. */
  lag: number
  /** On the numbers' own clock, spans: before this the motion waits, where the line would else run back to a start that is yet to come. */
  waits?: number
}

/** Readings and speeds of a line at times x, run `rate` times as fast from the same start. */
export function traceLine(series: Series, line: Line, x: Float64Array, rate = 1): Trace {
  const { waits = -Infinity } = line
  const times = x.map(at => Math.max(waits, at * rate - line.lag))
  const trace = LAWS[line.law].trace(series, Float64Array.from(line.numbers), times, false)
  times.forEach((at, i) => {
    if (at === waits) trace.rate[i] = 0
  })
  return trace
}

/**
 * The law's reading at each of `frames` (whole or not, inside the list or beyond it), reading units.
 * `rate` > 1 runs the same motion faster; the claim's own size runs at `paceOfClaim`. Empty for fewer than two keys.
 */
export function lawCurve(line: Line, request: ReadingCheck, frames: readonly number[], rate = 1): number[] {
  const series = seriesOf(request)
  const first = request.keys[0]
  if (!first || series.spanFrames === 0) return []
  const x = Float64Array.from(frames, frame => (frame - first.frame) / series.spanFrames)
  const curve = Array.from(traceLine(series, line, x, rate).value)
  const turns = line.law === 'spin' ? turnsToAdd(request) : null
  return turns ? inPostedTurns(curve, request, turns, frames) : curve
}

/** The line's readings on the list's own frames. */
export function ruledList(series: Series, line: Line, request: ReadingCheck, rate = 1): Key[] {
  const { value } = traceLine(series, line, series.x, rate)
  return request.keys.map((key, i) => ({ frame: key.frame, reading: value[i] as number }))
}
