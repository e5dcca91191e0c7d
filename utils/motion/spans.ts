/** A list divided into spans, each under a law of its own. */
import type { Judgement } from './readings'
import type { CheckRequest } from './types'

export function judgeSpans(_request: CheckRequest): Judgement {
  throw new Error('not yet')
}
