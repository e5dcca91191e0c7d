/** Counts answers of the judge against the truth that lists were made with, family by family. */
import { judge } from '../../utils/motion'
import type { CheckRequest, CheckResult } from '../../utils/motion'

/** What every made list has. `covers`: share of the motion that it shows. */
export interface Made {
  family: string
  request: CheckRequest
  truth: { kind: string, frames: number[], size?: number, covers?: number }
}

export interface Row { family: string, lists: number, right: number, doubled: number }

export interface Score<List> {
  rows: Row[]
  lists: number
  right: number
  /** Share of clean lists with any finding. */
  cleanFlagged: number
  /** Share of faulty lists told of under two kinds. */
  doubled: number
  /** Share of clean lists of known size whose 95 % interval holds it, and how many there were. */
  coverage: number
  covered: number
  /** Median |size read/true − 1| over clean lists covering more than half the motion. */
  medianSizeError: number
  wrong: { index: number, list: List, result: CheckResult }[]
}

/** `also` sees every list with its answer, for what only some lists can tell. */
export function tally<List extends Made>(
  lists: readonly List[], isRight: (list: List, result: CheckResult) => boolean, also: (list: List, result: CheckResult) => void = () => {},
): Score<List> {
  const rows = new Map<string, Row>()
  const wrong: Score<List>['wrong'] = []
  const errors: number[] = []
  const count = { right: 0, clean: 0, flagged: 0, faulty: 0, doubled: 0, sized: 0, held: 0 }
  lists.forEach((list, index) => {
    const { family, truth } = list
    const result = judge(list.request)
    const row = rows.get(family) ?? { family, lists: 0, right: 0, doubled: 0 }
    rows.set(family, row)
    row.lists++
    if (isRight(list, result)) {
      row.right++
      count.right++
    } else {
      wrong.push({ index, list, result })
    }
    if (truth.kind === 'clean') {
      count.clean++
      if (result.findings.length > 0) count.flagged++
      if (truth.size !== undefined && result.size) {
        count.sized++
        if (result.size.low <= truth.size && truth.size <= result.size.high) count.held++
        if ((truth.covers ?? 0) > 0.5) errors.push(Math.abs(result.size.value / truth.size - 1))
      }
    } else if (truth.kind !== 'undecided') {
      count.faulty++
      if (new Set(result.findings.map(finding => finding.kind)).size > 1) {
        count.doubled++
        row.doubled++
      }
    }
    also(list, result)
  })
  return {
    rows: [...rows.values()], lists: lists.length, right: count.right, wrong,
    cleanFlagged: share(count.flagged, count.clean), doubled: share(count.doubled, count.faulty),
    coverage: share(count.held, count.sized), covered: count.sized, medianSizeError: median(errors),
  }
}

/** Held and skipped may be told one key off. */
export function isAtKey({ request, truth }: Made, told: readonly number[]): boolean {
  const place = (frame: number | undefined) => request.keys.findIndex(key => key.frame === frame)
  return told.length === 1 && Math.abs(place(told[0]) - place(truth.frames[0])) <= 1
}

export const share = (part: number, whole: number) => part / Math.max(1, whole)
export const median = (values: readonly number[]) => [...values].sort((a, b) => a - b)[values.length >> 1] ?? NaN
export const percent = (part: number, whole = 1) => `${(100 * share(part, whole)).toFixed(1)} %`

/** Rows and sums as the bench prints them. */
export function scoreTable(title: string, score: Omit<Score<unknown>, 'wrong' | 'coverage' | 'covered' | 'medianSizeError'>): string {
  return [
    `${title.padEnd(36)}lists   right   two kinds`,
    ...score.rows.map(row => `${row.family.padEnd(34)}${String(row.lists).padStart(7)}${percent(row.right, row.lists).padStart(9)}${String(row.doubled).padStart(9)}`),
    '',
    `right kind and frames, overall     ${percent(score.right, score.lists)} of ${score.lists}`,
    `clean lists with any finding       ${percent(score.cleanFlagged)}`,
    `one fault told under two kinds     ${percent(score.doubled)}`,
  ].join('\n')
}

/** A share counted over so many lists is itself known to two of its own spreads. */
export function sizeLines({ coverage, covered, medianSizeError }: Pick<Score<unknown>, 'coverage' | 'covered' | 'medianSizeError'>): string {
  const doubt = 2 * Math.sqrt(share(coverage * (1 - coverage), covered))
  const held = `true size inside the 95 % interval ${percent(coverage)} of ${covered} (± ${percent(doubt)})`
  // Lists that don't say how much of their motion they show have no such error.
  return Number.isNaN(medianSizeError) ? held : `${held}\nmedian size error                  ${(100 * medianSizeError).toFixed(2)} %`
}
