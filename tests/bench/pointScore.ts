/** Holds the judge's answers on lists of points against the truth they were made with. */
import { judge } from '../../utils/motion'
import type { CheckResult } from '../../utils/motion'
import type { MadePoints } from './lists/points'

export interface PointRow { family: string, lists: number, right: number, doubled: number }

export interface PointScore {
  rows: PointRow[]
  lists: number
  right: number
  /** Share of clean lists with any finding. */
  cleanFlagged: number
  /** Share of faulty lists told of under two kinds. */
  doubled: number
  /** Share of clean topples and swings whose 95 % interval holds the true size, and how many there were. */
  coverage: number
  covered: number
  medianSizeError: number
  wrong: { index: number, list: MadePoints, result: CheckResult }[]
}

/** Right kind and right frames; held and skipped may be told one key off. */
export function isRightPoint({ truth, request }: MadePoints, result: CheckResult): boolean {
  if (truth.kind === 'undecided') return result.verdict === 'undecided' && result.findings.length === 0
  if (truth.kind === 'clean') return result.verdict === 'holds' && result.findings.length === 0
  if (result.findings.length === 0 || result.findings.some(finding => finding.kind !== truth.kind)) return false
  const told = result.findings.flatMap(finding => finding.frames).sort((a, b) => a - b)
  switch (truth.kind) {
    case 'misplaced': case 'off-path': return told.join() === truth.frames.join()
    case 'held': case 'skipped': {
      const place = (frame: number | undefined) => request.keys.findIndex(key => key.frame === frame)
      return told.length === 1 && Math.abs(place(told[0]) - place(truth.frames[0])) <= 1
    }
    case 'wrong-law': return !truth.reads || result.readsAs[0]?.law === truth.reads
    case 'wrong-scale': return truth.size === undefined || (result.size !== null && Math.abs(result.size.value / truth.size - 1) < 0.2)
  }
}

export function scorePoints(lists: readonly MadePoints[]): PointScore {
  const rows = new Map<string, PointRow>()
  const wrong: PointScore['wrong'] = []
  const errors: number[] = []
  let [right, clean, flagged, faulty, doubled, sized, held] = [0, 0, 0, 0, 0, 0, 0]
  lists.forEach((list, index) => {
    const result = judge(list.request)
    const row = rows.get(list.family) ?? { family: list.family, lists: 0, right: 0, doubled: 0 }
    rows.set(list.family, row)
    row.lists++
    if (isRightPoint(list, result)) {
      row.right++
      right++
    } else {
      wrong.push({ index, list, result })
    }
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
      if (new Set(result.findings.map(finding => finding.kind)).size > 1) {
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

const percent = (part: number, whole: number) => `${(100 * part / Math.max(1, whole)).toFixed(1)} %`

/** As it is printed by the bench. */
export function pointTable(score: PointScore): string {
  return [
    'points                          lists   right   two kinds',
    ...score.rows.map(row => `${row.family.padEnd(30)}${String(row.lists).padStart(7)}${percent(row.right, row.lists).padStart(9)}${String(row.doubled).padStart(9)}`),
    '',
    `right kind and frames, overall     ${percent(score.right, score.lists)} of ${score.lists}`,
    `clean lists with any finding       ${percent(score.cleanFlagged, 1)}`,
    `one fault told under two kinds     ${percent(score.doubled, 1)}`,
    `true size inside the 95 % interval ${percent(score.coverage, 1)} of ${score.covered}`,
    `median size error                  ${percent(score.medianSizeError, 1)}`,
  ].join('\n')
}
