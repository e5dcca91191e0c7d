/** The judge's score table and speed over freshly made lists. Bundle and run; no test runner needed. */
import { judge } from '../../utils/motion'
import type { ReadingCheck } from '../../utils/motion'
import { edgeTable, scoreEdge } from './edgeScore'
import { makeEdgeLists } from './lists/edge'
import { makeLists } from './lists/make'
import { makeSpans, SPAN_ROUND } from './lists/makeSpans'
import { makePointLists } from './lists/points'
import { scoreLists } from './judgeScore'
import type { Score } from './judgeScore'
import { pointTable, scorePoints } from './pointScore'
import { finderTable, isWhole, scoreFinder, scoreSpans, spanTable } from './spanScore'

export interface JudgeBench {
  score: Score
  /** Lists of forty keys per second, one thread, over the plan's usual mixture of faults. */
  listsPerSecond: number
  /** The same by processor time, which other work on the machine doesn't stretch. */
  listsPerProcessorSecond: number
  /** Milliseconds for one list of 2,000 keys: median of five. */
  longListMs: number
  table: string
}

const percent = (part: number, whole: number) => `${(100 * part / Math.max(1, whole)).toFixed(1)} %`

function longList(faulty: boolean): ReadingCheck {
  // A pendulum over many swings, from the small-swing sum: what counts here is its length.
  const keys = Array.from({ length: 2000 }, (_, i) => {
    const shown = faulty && i >= 900 ? i - 1 : i
    return { frame: i, reading: Math.round(50 * Math.cos(shown / 24 * 1.1)) / 10 }
  })
  return { law: 'pendulum', fps: 24, measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1, keys }
}

function timed(work: () => void): number {
  const from = performance.now()
  work()
  return performance.now() - from
}

/** Runs it: 2,000 lists unless told otherwise. The clock is only read here, never in the judge. */
export function runJudgeBench(count = 2000, seed = 7): JudgeBench {
  const lists = makeLists(count, seed)
  const score = scoreLists(lists)
  const forty = lists.filter(list => list.request.keys.length >= 36 && list.request.keys.length <= 44).slice(0, 200)
  for (const list of forty) judge(list.request)
  const before = process.cpuUsage()
  const spent = timed(() => {
    for (const list of forty) judge(list.request)
  })
  const used = process.cpuUsage(before)
  const longs = [true, false, true, false, true].map(faulty => timed(() => judge(longList(faulty)))).sort((a, b) => a - b)
  const listsPerSecond = 1000 * forty.length / spent
  const listsPerProcessorSecond = 1e6 * forty.length / (used.user + used.system)
  const longListMs = longs[2] ?? NaN
  const lines = [
    'family                          lists   right   two kinds',
    ...score.rows.map(row => `${row.family.padEnd(30)}${String(row.lists).padStart(7)}${percent(row.right, row.lists).padStart(9)}${String(row.doubled).padStart(9)}`),
    '',
    `right kind and frames, overall     ${percent(score.right, score.lists)} of ${score.lists}`,
    `clean lists with any finding       ${percent(score.cleanFlagged, 1)}`,
    `one fault told under two kinds     ${percent(score.doubled, 1)}`,
    `true size inside the 95 % interval ${percent(score.coverage, 1)} of ${score.covered}`,
    `median size error                  ${percent(score.medianSizeError, 1)}`,
    `speed                              ${listsPerSecond.toFixed(0)} lists of 40 keys per second (${listsPerProcessorSecond.toFixed(0)} by processor time); 2,000 keys in ${longListMs.toFixed(0)} ms`,
  ]
  return { score, listsPerSecond, listsPerProcessorSecond, longListMs, table: lines.join('\n') }
}

export default async function run(): Promise<void> {
  console.log(runJudgeBench().table)
  const divided = makeSpans(24 * SPAN_ROUND, 7)
  console.log(`\n${spanTable(scoreSpans(divided))}`)
  console.log(`\n${finderTable(scoreFinder(divided, makeLists(480, 7).filter(isWhole)))}`)
  console.log(`\n${pointTable(scorePoints(makePointLists(2024, 7)))}`)
  console.log(`\n${edgeTable(scoreEdge(makeEdgeLists(1000, 7, ['angle'])))}`)
}
