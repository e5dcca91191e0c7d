/** Holds the judge's answers on lists of points against the truth they were made with. */
import type { CheckResult } from '../../utils/motion'
import type { MadePoints } from './lists/points'
import { isAtKey, tally } from './tally'

/** Right kind and right frames; held and skipped may be told one key off. */
export function isRightPoint(list: MadePoints, result: CheckResult): boolean {
  const { truth } = list
  if (truth.kind === 'undecided') return result.verdict === 'undecided' && result.findings.length === 0
  if (truth.kind === 'clean') return result.verdict === 'holds' && result.findings.length === 0
  if (result.findings.length === 0 || result.findings.some(finding => finding.kind !== truth.kind)) return false
  const told = result.findings.flatMap(finding => finding.frames).sort((a, b) => a - b)
  switch (truth.kind) {
    case 'misplaced': case 'off-path': return told.join() === truth.frames.join()
    case 'held': case 'skipped': return isAtKey(list, told)
    case 'wrong-law': return !truth.reads || result.readsAs[0]?.law === truth.reads
    case 'wrong-scale': return truth.size === undefined || (result.size !== null && Math.abs(result.size.value / truth.size - 1) < 0.2)
  }
}

export const scorePoints = (lists: readonly MadePoints[]) => tally(lists, isRightPoint)
