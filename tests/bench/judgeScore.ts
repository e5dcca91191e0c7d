/** Holds the judge's answers against the truth the lists of readings were made with. */
import type { CheckResult } from '../../utils/motion'
import type { MadeList } from './lists/make'
import { isAtKey, tally } from './tally'

/** Right kind and right frames; held and skipped may be told one key off. */
export function isRight(list: MadeList, result: CheckResult): boolean {
  const { truth, request } = list
  if (truth.kind === 'undecided') return result.verdict === 'undecided' && result.findings.length === 0
  if (truth.kind === 'clean') return result.verdict === 'holds' && result.findings.length === 0
  if (result.findings.length === 0 || result.findings.some(finding => finding.kind !== truth.kind)) return false
  const told = result.findings.flatMap(finding => finding.frames).sort((a, b) => a - b)
  if (truth.kind === 'misplaced' || truth.kind === 'backward' || truth.kind === 'not-at-rest') return told.join() === truth.frames.join()
  if (truth.kind === 'held' || truth.kind === 'skipped') return isAtKey(list, told)
  if (truth.kind === 'wrong-law') return !truth.reads || result.readsAs[0]?.law === truth.reads
  if (request.law === 'odd-rule' || request.law === 'bounce') return true
  return result.size !== null && truth.size !== undefined && Math.abs(result.size.value / truth.size - 1) < 0.2
}

export const scoreLists = (lists: readonly MadeList[]) => tally(lists, isRight)
