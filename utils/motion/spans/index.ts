/** A list divided into spans, each under a law of its own. */
import type { Judgement } from '../readings'
import type { CheckRequest, Span } from '../types'
import { divide } from './divide'
import { settleContacts } from './contact'
import { joined } from './join'
import { judgeJoint } from './joint'
import { judgePart } from './judgePart'
import type { JudgedPart } from './judgePart'

/**
 * Judges every span as a list of its own, and how they meet. With `spans: 'find'` it looks for the division first. Never throws and
 * never answers NaN on what the contract lets through; a joint that is no key of the list is taken at the nearest one.
 */
export function judgeSpans(request: CheckRequest): Judgement {
  return judgeDivided(request, request.spans as Span[])
}

function judgeDivided(request: CheckRequest, spans: readonly Span[]): Judgement {
  const divided = divide(request, spans)
  const parts = settleContacts(request, divided.map(judgePart))
  const joints = divided.slice(0, -1).map(({ last }, i) =>
    judgeJoint(request, parts[i] as JudgedPart, parts[i + 1] as JudgedPart, request.keys[last]?.frame ?? 0))
  return joined(request, parts, joints)
}
