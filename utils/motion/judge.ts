/** The judge: a list and its claim in, what holds and what breaks out. Same list, same answer. */
import { judgePoints } from './points'
import { judgeReadings } from './readings'
import type { Judgement } from './readings'
import { judgeSpans } from './spans/index'
import type { CheckRequest, CheckResult } from './types'

/**
 * Judges a list. Expects what the contract lets through (3–2,000 keys, finite readings or points); then never throws and never
 * answers NaN.
 */
export function judge(request: CheckRequest): CheckResult {
  return judgeInDepth(request).result
}

/** `judge`, with the line that the screens draw. */
export function judgeInDepth(request: CheckRequest): Judgement {
  if (request.spans) return judgeSpans(request)
  return request.measure === 'point' ? judgePoints(request) : judgeReadings(request)
}
