/** Holds the judge's answers against the truth the lists of bodies over the edge were made with. */
import { judge } from '../../utils/motion'
import type { CheckResult } from '../../utils/motion'
import type { EdgeList } from './lists/edge'

export interface EdgeScore {
  rows: { family: string, lists: number, right: number, doubled: number }[]
  lists: number
  right: number
  /** Share of clean lists with any finding, and of faulty ones told of under two kinds. */
  cleanFlagged: number
  doubled: number
  /** Share of clean lists whose 95 % intervals hold the true size, leaving angle and leaving frame, and how many there were. */
  sizes: number
  angles: number
  frames: number
  covered: number
  /** Median |size read/true − 1| over the clean lists that show the leaving. */
  medianSizeError: number
  /** Median of how far a wrong release is told from its true angle, degrees. */
  medianAngleError: number
  wrong: { index: number, list: EdgeList, result: CheckResult }[]
}

/** Right kind and right frames; held and skipped one key off, a wrong release told the right way by an amount within a third. */
export function isRight({ truth, request }: EdgeList, result: CheckResult): boolean {
  if (truth.kind === 'clean') return result.verdict === 'holds' && result.findings.length === 0
  if (result.findings.length === 0 || result.findings.some(finding => finding.kind !== truth.kind)) return false
  const told = result.findings.flatMap(finding => finding.frames).sort((a, b) => a - b)
  if (truth.kind === 'misplaced' || truth.kind === 'off-path') return told.join() === truth.frames.join()
  if (truth.kind === 'held' || truth.kind === 'skipped') {
    const place = (frame: number | undefined) => request.keys.findIndex(key => key.frame === frame)
    return told.length === 1 && Math.abs(place(told[0]) - place(truth.frames[0])) <= 1
  }
  if (truth.kind === 'wrong-release') {
    const [finding] = result.findings
    if (result.findings.length !== 1 || !finding) return false
    const straight = finding.text.includes('straight down')
    if (truth.straight) return straight
    return !straight && Math.abs(finding.amount - (truth.late ?? 0)) <= Math.abs(truth.late ?? 0) / 3
  }
  return result.size !== null && Math.abs(result.size.value / truth.size - 1) < 0.2
}

export function scoreEdge(lists: readonly EdgeList[]): EdgeScore {
  const rows = new Map<string, EdgeScore['rows'][number]>()
  const wrong: EdgeScore['wrong'] = []
  const errors: number[] = []
  const off: number[] = []
  const count = { right: 0, clean: 0, flagged: 0, faulty: 0, doubled: 0, covered: 0, sizes: 0, angles: 0, frames: 0 }
  lists.forEach((list, index) => {
    const { truth } = list
    const result = judge(list.request)
    const row = rows.get(list.family) ?? { family: list.family, lists: 0, right: 0, doubled: 0 }
    rows.set(list.family, row)
    row.lists++
    if (isRight(list, result)) {
      row.right++
      count.right++
    } else {
      wrong.push({ index, list, result })
    }
    const within = (kind: string, value: number | undefined) => {
      const figure = result.figures?.find(one => one.kind === kind)
      return value !== undefined && figure !== undefined && figure.low <= value && value <= figure.high ? 1 : 0
    }
    if (truth.kind === 'clean') {
      count.clean++
      if (result.findings.length > 0) count.flagged++
      if (truth.release !== undefined && result.size) {
        count.covered++
        if (result.size.low <= truth.size && truth.size <= result.size.high) count.sizes++
        count.angles += within('release-angle', truth.releaseAngle)
        count.frames += within('release', truth.release)
        // Without a body the judge takes a rod.
        errors.push(Math.abs(result.size.value / truth.size - 1))
      }
    } else {
      count.faulty++
      const kinds = new Set(result.findings.map(finding => finding.kind))
      if (kinds.size > 1) {
        count.doubled++
        row.doubled++
      }
      const [finding] = result.findings
      if (finding?.kind === 'wrong-release' && typeof truth.late === 'number') off.push(Math.abs(finding.amount - truth.late))
    }
  })
  const median = (values: number[]) => values.sort((a, b) => a - b)[values.length >> 1] ?? NaN
  const share = (part: number, whole: number) => part / Math.max(1, whole)
  return {
    rows: [...rows.values()], lists: lists.length, right: count.right, wrong,
    cleanFlagged: share(count.flagged, count.clean), doubled: share(count.doubled, count.faulty),
    sizes: share(count.sizes, count.covered), angles: share(count.angles, count.covered), frames: share(count.frames, count.covered),
    covered: count.covered, medianSizeError: median(errors), medianAngleError: median(off),
  }
}

const percent = (share: number) => `${(100 * share).toFixed(1)} %`

export function edgeTable(score: EdgeScore): string {
  return [
    'over the edge                   lists   right   two kinds',
    ...score.rows.map(row => `${row.family.padEnd(30)}${String(row.lists).padStart(7)}${percent(row.right / row.lists).padStart(9)}${String(row.doubled).padStart(9)}`),
    '',
    `right kind and frames, overall     ${percent(score.right / score.lists)} of ${score.lists}`,
    `clean lists with any finding       ${percent(score.cleanFlagged)}`,
    `one fault told under two kinds     ${percent(score.doubled)}`,
    `inside the 95 % interval, of ${String(score.covered).padEnd(6)}size ${percent(score.sizes)}, leaving angle ${percent(score.angles)}, its frame ${percent(score.frames)}`,
    `median size error                  ${percent(score.medianSizeError)}; of a wrong leaving angle ${score.medianAngleError.toFixed(2)}°`,
  ].join('\n')
}
