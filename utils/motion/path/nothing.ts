/** The answer to a list of points that no law can be held against. */
import type { Judgement } from '../readings'
import type { FoundPath, PointCheck } from '../types'

export const STILL = 'Nothing moves further than the slop, so there is nothing to judge.'

/** Keys as posted, nothing judged; the path where there is one. */
export function without(request: PointCheck, path: FoundPath | null, reason: string): Judgement {
  return {
    line: null, pace: null,
    result: {
      verdict: 'undecided', reason, findings: [], readsAs: [], size: null, claim: null, path,
      keys: request.keys.map(({ frame, x, y }) => ({
        frame, reading: 0, law: null, offset: null, offsetFrames: null, gap: null, lawGap: null, allowance: null, breaks: false,
        point: { x, y }, lawPoint: null,
      })),
      ruled: { fit: [], claim: null },
      ruledPoints: { fit: [], claim: null },
    },
  }
}
