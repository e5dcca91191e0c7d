import type { Claim } from '~/utils/contracts/production'
import type { CheckResult } from '~/utils/motion/types'

/** What a judged list's readings count: its claim's own measure, or for a list of points what the judge found along the path. */
export interface Reads {
  measure: 'angle' | 'distance' | 'arc'
  unit: string
}

export function readsOf(answer: Pick<CheckResult, 'reads'>, claim: Pick<Claim, 'measure' | 'unit'>): Reads {
  if (answer.reads) return answer.reads
  return { measure: claim.measure === 'point' ? 'distance' : claim.measure, unit: claim.unit }
}
