/** A list divided into spans, each under a law of its own. */
import { judgePoints } from '../points'
import type { Judgement } from '../readings'
import type { CheckRequest, Law, PointCheck, ReadingCheck, Span } from '../types'
import { divide } from './divide'
import type { Part } from './divide'
import { bestAnswer } from './find/index'
import type { Answer } from './find/index'
import { settleContacts } from './contact'
import { joined, spanOf } from './join'
import { judgeJoint } from './joint'
import { judgeAsWhole, judgePart } from './judgePart'
import type { JudgedPart } from './judgePart'
import { judgePointJoint } from './pointJoint'

/**
 * Judges every span as a list of its own, and how they meet. With `spans: 'find'` it looks for the division first, and a single law that
 * explains the list is judged as ever, with the list as its one span; points are searched where they keep to one path, else the claimed law
 * is judged. Never throws and never answers NaN on what the contract lets
 * through; a joint that is no key of the list is taken at the nearest one.
 */
export function judgeSpans(request: CheckRequest): Judgement {
  if (Array.isArray(request.spans)) return judgeDivided(request, request.spans)
  const answer = searched(request)
  return 'divisions' in answer ? soundest(request, answer.divisions).judgement : judgeWhole(request, answer.laws)
}

/** The spans that `spans: 'find'` would judge the list by; one where a single law explains it. */
export function findSpans(request: CheckRequest): Span[] {
  const answer = searched(request)
  if ('divisions' in answer) return soundest(request, answer.divisions).spans
  const { law } = wholeUnder(request, answer.laws).span
  return [{ from: request.keys[0]?.frame ?? 0, to: request.keys[request.keys.length - 1]?.frame ?? 0, law }]
}

function searched(request: CheckRequest): Answer {
  if (request.measure !== 'point') return bestAnswer(request)
  const along = alongOnePath(request)
  return along ? bestAnswer(along) : { laws: [] }
}

/** Laws that have no one path to search along: they go over from one to another, or both ways of the drawing on their own. */
const OF_THE_PLANE: readonly Law[] = ['flight', 'bounce', 'over-edge']

/** The list's readings along its path, where all of it lies on one but for lone drawings; null where it doesn't. */
function alongOnePath(request: PointCheck): ReadingCheck | null {
  if (OF_THE_PLANE.includes(request.law)) return null
  const { along, result: { findings } } = judgePoints(request)
  return along && !findings.some(({ kind, frames }) => kind === 'off-path' && frames.length !== 1) ? along : null
}

/** Of divisions that explain the list about as well, the first in which the fewest spans turn out to be of another law or none. */
function soundest(request: CheckRequest, divisions: readonly Span[][]): { spans: Span[], judgement: Judgement } {
  const judged = divisions.map(spans => ({ spans, judgement: judgeDivided(request, spans) }))
  return judged.reduce((best, one) => (wrongs(one.judgement) < wrongs(best.judgement) ? one : best))
}

const wrongs = ({ result: { findings, spans } }: Judgement) =>
  findings.filter(({ kind }) => kind === 'wrong-law').length + (spans ?? []).filter(({ verdict }) => verdict === 'undecided').length

function judgeWhole(request: CheckRequest, laws: readonly Law[]): Judgement {
  const part = wholeUnder(request, laws)
  const { judgement } = part
  return { ...judgement, result: { ...judgement.result, spans: [spanOf(part, new Set())], joints: [] } }
}

/** The list under the claimed law if that is among the likeliest, else under the likeliest one; one that holds before one that doesn't. */
function wholeUnder(request: CheckRequest, laws: readonly Law[]): JudgedPart {
  const order = laws.includes(request.law) ? [request.law, ...laws.filter(law => law !== request.law)] : [...laws]
  const judged = (order.length > 0 ? order : [request.law]).map((law) => {
    const [part] = divide(request, [{ from: 0, to: 0, law }])
    return judgeAsWhole(part as Part)
  })
  return judged.find(({ judgement }) => judgement.result.verdict === 'holds') ?? judged[0] as JudgedPart
}

function judgeDivided(request: CheckRequest, spans: readonly Span[]): Judgement {
  const divided = divide(request, spans)
  const parts = settleContacts(request, divided.map(judgePart))
  const judge = request.measure === 'point' ? judgePointJoint : judgeJoint
  const joints = divided.slice(0, -1).map(({ last }, i) =>
    judge(request, parts[i] as JudgedPart, parts[i + 1] as JudgedPart, request.keys[last]?.frame ?? 0))
  return joined(request, parts, joints)
}
