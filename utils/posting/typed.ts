import { jointsOf, keysSuit, requestFor } from '~/utils/contracts/check'
import type { Claim } from '~/utils/contracts/production'
import type { CheckRequest, Key, PointKey } from '~/utils/motion/types'

/**
 * What the judge is asked while a list grows: only the laws that the list has come to, each over the drawings that are there.
 * @param list keys in the order of their frames
 * @returns null where a joint lies inside of the list and has no drawing: nothing can be told across it
 */
export function typedRequest(claim: Claim, fps: number, list: readonly Key[] | readonly PointKey[]): CheckRequest | null {
  const [first, last] = [list[0], list.at(-1)]
  if (!first || !last || !keysSuit(claim, list)) return null
  if (!claim.spans) return requestFor(claim, fps, list)
  const spans = claim.spans.filter((span, i, all) => (i === 0 || span.from < last.frame) && (i === all.length - 1 || span.to > first.frame))
  const drawn = new Set(list.map(({ frame }) => frame))
  if (jointsOf(spans).some((joint) => !drawn.has(joint))) return null
  const [only] = spans
  if (!only) return null
  if (spans.length > 1) return requestFor({ ...claim, law: only.law, spans }, fps, list)
  const { spans: _joints, start: _start, ...whole } = claim
  const { law, start, subject = whole.subject } = only
  return requestFor({ ...whole, law, ...(start ? { start } : {}), ...(subject ? { subject } : {}) }, fps, list)
}
