/** Takes a list apart at its joints: every span a list of its own. */
import { isBody } from '../bodies'
import { canRest } from '../standstill'
import type { CheckRequest, Law, Span, Subject } from '../types'

/** A span with the keys that it covers, joints on both sides included. */
export interface Part {
  span: Span
  /** Places of its first and last key in the whole list. */
  first: number
  last: number
  request: CheckRequest
}

/** Place of the key nearest to a frame, the earlier of two. `frames` go upwards and are not empty. */
export function nearestKey(frames: readonly number[], frame: number): number {
  let nearest = 0
  for (let i = 1; i < frames.length; i++) {
    if (Math.abs((frames[i] as number) - frame) < Math.abs((frames[nearest] as number) - frame)) nearest = i
  }
  return nearest
}

/** The spans as parts. A joint between two drawings goes to the nearest one; the first span begins with the list and the last ends with it. */
export function divide(request: CheckRequest, spans: readonly Span[]): Part[] {
  const frames = request.keys.map(({ frame }) => frame)
  const ends = spans.map(({ to }, i) => (i === spans.length - 1 ? frames.length - 1 : nearestKey(frames, to)))
  return spans.map((span, i) => {
    const first = i === 0 ? 0 : ends[i - 1] as number
    const last = ends[i] as number
    return { span, first, last, request: partRequest(request, span, i === 0, first, last) }
  })
}

/** The part's keys from..to (places in the whole list) as a list with a claim of its own. */
export function narrowed(whole: CheckRequest, part: Part, first: number, last: number): Part {
  const request = { ...part.request, keys: whole.keys.slice(first, last + 1) } as CheckRequest
  return { ...part, first, last, request }
}

function partRequest(request: CheckRequest, span: Span, isFirst: boolean, first: number, last: number): CheckRequest {
  const { spans: _spans, start: ofList, subject: ofClaim, ...rest } = request
  const part = { ...rest, law: span.law, keys: request.keys.slice(first, last + 1) } as CheckRequest
  // The claim's own start speaks of the list's first key.
  const start = span.start ?? (isFirst ? ofList : undefined)
  if (start && canRest(span.law)) part.start = start
  const subject = span.subject ?? subjectFor(span.law, ofClaim)
  if (subject) part.subject = subject
  return part
}

const TURNING: readonly Law[] = ['topple', 'over-edge', 'pendulum', 'swing-decay', 'spin']

/** The claim's subject as far as a law can use it: a body for what turns, a path for what doesn't, gravity for either. */
function subjectFor(law: Law, subject: Subject | undefined): Subject | undefined {
  if (!subject || isBody(subject) === TURNING.includes(law)) return subject
  return subject.gravity === undefined ? undefined : { gravity: subject.gravity }
}
