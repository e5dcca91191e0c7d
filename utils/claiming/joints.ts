import { CHECK_LIMITS, requestFor } from '~/utils/contracts/check'
import type { Take } from '~/utils/contracts/take'
import { findSpans } from '~/utils/motion'
import { MEASURES } from '~/utils/motion/laws/words'
import type { CheckRequest, Key, PointKey } from '~/utils/motion/types'
import { readForm } from './form'
import type { ClaimForm } from './form'
import { rowsOfSpans } from './spans'
import type { SpanRow } from './spans'

/** The list of a take as it was posted: the judge's answer keeps every reading, and every point. */
export function postedKeys({ answer, claim }: Pick<Take, 'answer' | 'claim'>): Key[] | PointKey[] {
  return claim.measure === 'point'
    ? answer.keys.map(({ frame, point }) => ({ frame, x: point?.x ?? 0, y: point?.y ?? 0 }))
    : answer.keys.map(({ frame, reading }) => ({ frame, reading }))
}

/** Whether the judge can look for joints in a take's list under this form: it has to be of the form's own kind. */
export const suitsTake = (form: Pick<ClaimForm, 'measure'>, take: Take | null): take is Take =>
  take !== null && take.claim.measure === form.measure && take.answer.keys.length >= CHECK_LIMITS.minKeys

/** The best division of a list, or why there is none. */
export type FoundJoints = { rows: SpanRow[]; firstFrame: number } | { rows: null; why: string }

/** Lets the judge look for the joints of a take's list, by the slop and tolerance of the form. Deterministic; takes longer for a long list. */
export function findJoints(form: ClaimForm, take: Take): FoundJoints {
  // The laws are what is looked for: any that the measure takes stands in for them.
  const law = MEASURES.steady.includes(form.measure) ? 'steady' : form.law
  const { claim, complaints } = readForm({ ...form, divided: false, law, fromRest: false })
  if (!claim) return { rows: null, why: Object.values(complaints)[0] ?? 'The claim is not whole yet.' }
  const request = { ...requestFor(claim, take.fps, postedKeys(take)), spans: 'find' } as CheckRequest
  const spans = findSpans(request)
  if (spans.length < 2) return { rows: null, why: `One law is enough for take ${take.number}: no joint was found.` }
  return { rows: rowsOfSpans(spans), firstFrame: spans[0]!.from }
}
