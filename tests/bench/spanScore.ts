/** Holds the judge's answers on divided lists against the truth they were made with. */
import { judge } from '../../utils/motion'
import type { CheckResult } from '../../utils/motion'
import type { MadeList } from './lists/make'
import type { MadePointSpans } from './lists/makePointSpans'
import type { MadeSpans } from './lists/makeSpans'
import { percent } from './tally'

type Divided = MadeSpans | MadePointSpans

export interface SpanRow { family: string, lists: number, right: number }

export interface SpanScore {
  rows: SpanRow[]
  lists: number
  right: number
  /** Share of clean lists with any finding, or told undecided. */
  cleanFlagged: number
  wrong: { list: Divided, result: CheckResult }[]
}

/** Right kind at the right frames, and nothing else told. */
export function isRightSpans({ truth }: Divided, result: CheckResult): boolean {
  if (truth.kind === 'clean') return result.verdict === 'holds' && result.findings.length === 0
  const [finding, ...more] = result.findings
  return finding !== undefined && more.length === 0 && finding.kind === truth.kind && finding.frames.join() === truth.frames.join()
}

/** Every list judged with the division that it was made by. */
export function scoreSpans(lists: readonly Divided[]): SpanScore {
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

export interface FinderScore {
  rows: SpanRow[]
  /** Divided lists whose joints were all found within one key, as many as there are, with contact said where there is one. */
  divided: number
  found: number
  /** Lists of one law that were left whole. */
  single: number
  kept: number
  wrong: { name: string, request: MadeSpans['request'] | MadeList['request'], joints: number[], result: CheckResult }[]
}

/** Joints are looked for in lists whose division is sound, with or without a misplaced drawing in a span, and in lists of one law, faulty or not. */
export function scoreFinder(lists: readonly MadeSpans[], wholes: readonly MadeList[]): FinderScore {
  const rows = new Map<string, SpanRow>()
  const score: FinderScore = { rows: [], divided: 0, found: 0, single: 0, kept: 0, wrong: [] }
  const count = (family: string, right: boolean) => {
    const row = rows.get(family) ?? { family, lists: 0, right: 0 }
    rows.set(family, row)
    row.lists++
    if (right) row.right++
  }
  for (const list of lists) {
    if (list.truth.kind !== 'clean' && list.truth.kind !== 'misplaced') continue
    const result = judge({ ...list.request, spans: 'find' })
    const place = (frame: number) => list.request.keys.findIndex(key => key.frame === frame)
    const joints = list.spans.slice(0, -1).map(({ to }) => place(to))
    const told = (result.spans ?? []).slice(0, -1)
    const right = told.length === joints.length && told.every(({ to, contact }, j) =>
      Math.abs(place(to) - (joints[j] as number)) <= 1 && contact === (list.spans[j]?.contact ?? false))
    score.divided++
    if (right) score.found++
    else score.wrong.push({ name: list.family, request: list.request, joints, result })
    count(`find: ${list.family}`, right)
  }
  for (const { family, request } of wholes) {
    const result = judge({ ...request, spans: 'find' })
    const right = result.spans?.length === 1
    score.single++
    if (right) score.kept++
    else score.wrong.push({ name: family, request, joints: [], result })
    count(`find, one law: ${family}`, right)
  }
  return { ...score, rows: [...rows.values()] }
}

/** Lists that one law explains, faults of single drawings aside. */
export const isWhole = ({ truth: { kind } }: MadeList) => kind === 'clean' || kind === 'misplaced' || kind === 'held' || kind === 'skipped' || kind === 'wrong-scale'

/** The score of divided lists in words. */
export function spanTable({ rows, right, lists, cleanFlagged }: SpanScore): string {
  return [
    'divided lists                                 lists   right',
    ...rows.map(row => `${row.family.padEnd(44)}${String(row.lists).padStart(7)}${percent(row.right, row.lists).padStart(9)}`),
    '',
    `right kind and frames, overall     ${percent(right, lists)} of ${lists}`,
    `clean lists with any finding       ${percent(cleanFlagged, 1)}`,
  ].join('\n')
}

/** The finder's score in words. */
export function finderTable({ rows, divided, found, single, kept }: FinderScore): string {
  return [
    'joints looked for               lists   right',
    ...rows.map(row => `${row.family.padEnd(38)}${String(row.lists).padStart(5)}${percent(row.right, row.lists).padStart(9)}`),
    '',
    `joints found within one key        ${percent(found, divided)} of ${divided}`,
    `lists of one law left whole        ${percent(kept, single)} of ${single}`,
  ].join('\n')
}
