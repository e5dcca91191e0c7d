/** Every drawing held against the law's line. */
import { allowanceAt, allowances } from './allowance'
import type { Trace } from './laws/model'
import type { Series } from './series'
import type { ReadingCheck, JudgedKey } from './types'

/** Where the law's gap is below this share of the slop it stands still for the eye, and an offset is worth no number of frames. */
const STILL = 0.25

/** Keys as posted, nothing judged: for lists that no law can be held against. */
export function unjudged(request: ReadingCheck): JudgedKey[] {
  return request.keys.map((key, i) => ({
    frame: key.frame, reading: key.reading, law: null, offset: null, offsetFrames: null,
    gap: gapAfter(request, i), lawGap: null, allowance: null, breaks: false,
  }))
}

function gapAfter(request: ReadingCheck, i: number): number | null {
  const here = request.keys[i]
  const next = request.keys[i + 1]
  return here && next ? next.reading - here.reading : null
}

/** `trace` holds the line at the list's own keys. */
export function judgeKeys(request: ReadingCheck, series: Series, trace: Trace): JudgedKey[] {
  const allowed = allowances(trace.value, request.slop, request.tolerance)
  return request.keys.map((key, i) => {
    const law = trace.value[i] as number
    const offset = key.reading - law
    const next = trace.value[i + 1]
    const frames = offset / ((trace.rate[i] as number) / series.spanFrames)
    const allowance = allowed[i] as number
    // The allowance without its slop is the law's own gap here, times the tolerance; taken from the line itself, as that may be 0.
    const pace = allowanceAt(trace.value, i, series.n, 0, 1)
    const still = pace <= STILL * request.slop || Math.abs(frames) > series.spanFrames
    return {
      frame: key.frame,
      reading: key.reading,
      law,
      offset,
      offsetFrames: Number.isFinite(frames) && !still ? frames : null,
      gap: gapAfter(request, i),
      lawGap: next === undefined ? null : next - law,
      allowance,
      breaks: Math.abs(offset) > allowance,
    }
  })
}
