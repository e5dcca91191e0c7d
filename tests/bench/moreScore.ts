/** The score table of slow ins, spins, dying swings and bounces, with what else their lists should tell. */
import { judge } from '../../utils/motion'
import type { ReadingCheck } from '../../utils/motion'
import { scoreLists } from './judgeScore'
import type { MoreList } from './lists/moreLaws'
import { percent, scoreTable, sizeLines } from './tally'

/** Clean lists by what they should tell: how many, and of how many the 95 % interval holds the truth. */
function figuresOf(lists: readonly MoreList[]): Map<string, { told: number, held: number }> {
  const rows = new Map<string, { told: number, held: number }>()
  for (const { request, truth } of lists) {
    if (truth.kind !== 'clean' || !truth.figure) continue
    const { kind, value } = truth.figure
    const figure = judge(request as ReadingCheck).figures?.find(each => each.kind === kind)
    const row = rows.get(kind) ?? { told: 0, held: 0 }
    rows.set(kind, row)
    row.told++
    if (figure && figure.low <= value && value <= figure.high) row.held++
  }
  return rows
}

export function moreTable(lists: readonly MoreList[]): string {
  const score = scoreLists(lists)
  return [
    scoreTable('further laws', score), sizeLines(score),
    ...[...figuresOf(lists)].map(([kind, { told, held }]) => `true ${kind} inside its interval`.padEnd(35) + `${percent(held, told)} of ${told}`),
  ].join('\n')
}
