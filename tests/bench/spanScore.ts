/** Holds the judge's answers on divided lists against the truth they were made with. */
import { judge } from '../../utils/motion'
import type { CheckResult } from '../../utils/motion'
import type { MadeSpans } from './lists/makeSpans'

export interface SpanRow { family: string, lists: number, right: number }

export interface SpanScore {
  rows: SpanRow[]
  lists: number
  right: number
  /** Share of clean lists with any finding, or told undecided. */
  cleanFlagged: number
  wrong: { list: MadeSpans, result: CheckResult }[]
}

/** Right kind at the right frames, and nothing else told. */
export function isRightSpans({ truth }: MadeSpans, result: CheckResult): boolean {
  if (truth.kind === 'clean') return result.verdict === 'holds' && result.findings.length === 0
  const [finding, ...more] = result.findings
  return finding !== undefined && more.length === 0 && finding.kind === truth.kind && finding.frames.join() === truth.frames.join()
}

/** Every list judged with the division that it was made by. */
export function scoreSpans(lists: readonly MadeSpans[]): SpanScore {
  const rows = new Map<string, SpanRow>()
  const wrong: SpanScore['wrong'] = []
  let clean = 0
  let flagged = 0
  for (const list of lists) {
    const result = judge({ ...list.request, spans: list.spans })
    const row = rows.get(list.family) ?? { family: list.family, lists: 0, right: 0 }
    rows.set(list.family, row)
    row.lists++
    if (isRightSpans(list, result)) row.right++
    else wrong.push({ list, result })
    if (list.truth.kind === 'clean') {
      clean++
      if (result.findings.length > 0 || result.verdict !== 'holds') flagged++
    }
  }
  return {
    rows: [...rows.values()], lists: lists.length, right: lists.length - wrong.length, wrong, cleanFlagged: flagged / Math.max(1, clean),
  }
}

const percent = (part: number, whole: number) => `${(100 * part / Math.max(1, whole)).toFixed(1)} %`

/** The score of divided lists in words. */
export function spanTable({ rows, right, lists, cleanFlagged }: SpanScore): string {
  return [
    'divided lists                   lists   right',
    ...rows.map(row => `${row.family.padEnd(30)}${String(row.lists).padStart(7)}${percent(row.right, row.lists).padStart(9)}`),
    '',
    `right kind and frames, overall     ${percent(right, lists)} of ${lists}`,
    `clean lists with any finding       ${percent(cleanFlagged, 1)}`,
  ].join('\n')
}
