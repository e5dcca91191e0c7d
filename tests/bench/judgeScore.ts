/** Holds the judge's answers against the truth the lists were made with. */
import { judge } from '../../utils/motion'
import type { CheckResult } from '../../utils/motion'
import type { MadeList } from './lists/make'

export interface Row { family: string, lists: number, right: number, doubled: number }

export interface Score {
  rows: Row[]
  lists: number
  right: number
  /** Share of clean lists with any finding. */
  cleanFlagged: number
  /** Share of faulty lists told of under two kinds. */
  doubled: number
  /** Share of clean topples and swings whose 95 % interval holds the true size, and how many there were. */
  coverage: number
  covered: number
  /** Median |size read/true − 1| over clean lists covering more than half the motion. */
  medianSizeError: number
  wrong: { index: number, list: MadeList, result: CheckResult }[]
}

/** Right kind and right frames; held and skipped may be told one key off. */
export function isRight(list: MadeList, result: CheckResult): boolean {
  const { truth, request } = list
  if (truth.kind === 'undecided') return result.verdict === 'undecided' && result.findings.length === 0
  if (truth.kind === 'clean') return result.verdict === 'holds' && result.findings.length === 0
  if (result.findings.length === 0 || result.findings.some(finding => finding.kind !== truth.kind)) return false
  const told = result.findings.flatMap(finding => finding.frames).sort((a, b) => a - b)
  if (truth.kind === 'misplaced' || truth.kind === 'backward' || truth.kind === 'not-at-rest') return told.join() === truth.frames.join()
  if (truth.kind === 'held' || truth.kind === 'skipped') {
    const place = (frame: number | undefined) => request.keys.findIndex(key => key.frame === frame)
    return told.length === 1 && Math.abs(place(told[0]) - place(truth.frames[0])) <= 1
  }
  if (truth.kind === 'wrong-law') return !truth.reads || result.readsAs[0]?.law === truth.reads
  if (request.law === 'odd-rule' || request.law === 'bounce') return true
  return result.size !== null && truth.size !== undefined && Math.abs(result.size.value / truth.size - 1) < 0.2
}

export function scoreLists(lists: readonly MadeList[]): Score {
  const rows = new Map<string, Row>()
  const wrong: Score['wrong'] = []
  const errors: number[] = []
  let right = 0
  let clean = 0
  let flagged = 0
  let faulty = 0
  let doubled = 0
  let sized = 0
  let held = 0
  lists.forEach((list, index) => {
    const result = judge(list.request)
    const row = rows.get(list.family) ?? { family: list.family, lists: 0, right: 0, doubled: 0 }
    rows.set(list.family, row)
    row.lists++
    if (isRight(list, result)) {
      row.right++
      right++
    } else {
      wrong.push({ index, list, result })
    }
    const kinds = new Set(result.findings.map(finding => finding.kind))
    if (list.truth.kind === 'clean') {
      clean++
      if (result.findings.length > 0) flagged++
      if (list.truth.size !== undefined && result.size) {
        sized++
        if (result.size.low <= list.truth.size && list.truth.size <= result.size.high) held++
        if ((list.truth.covers ?? 0) > 0.5) errors.push(Math.abs(result.size.value / list.truth.size - 1))
      }
    } else if (list.truth.kind !== 'undecided') {
      faulty++
      if (kinds.size > 1) {
        doubled++
        row.doubled++
      }
    }
  })
  errors.sort((a, b) => a - b)
  return {
    rows: [...rows.values()], lists: lists.length, right, wrong,
    cleanFlagged: flagged / Math.max(1, clean), doubled: doubled / Math.max(1, faulty),
    coverage: held / Math.max(1, sized), covered: sized, medianSizeError: errors[errors.length >> 1] ?? NaN,
  }
}
