/** The judge's score tables and speed over freshly made lists. Bundle and run; no test runner needed. */
import { edgeTable, scoreEdge } from './edgeScore'
import { scoreLists } from './judgeScore'
import { againstLibrary, speedOf } from './judgeSpeed'
import type { Speed } from './judgeSpeed'
import { makeEdgeLists } from './lists/edge'
import { HARD, SIZED, makeLists } from './lists/make'
import { makePointSpans, POINT_SPAN_ROUND } from './lists/makePointSpans'
import { makeSpans, SPAN_ROUND } from './lists/makeSpans'
import { makeMoreLists } from './lists/moreLaws'
import { POINT_PLAN, makePointLists } from './lists/points'
import { restLists } from './lists/start'
import { moreTable } from './moreScore'
import { scorePoints } from './pointScore'
import { finderTable, isWhole, scoreFinder, scoreSpans, spanTable } from './spanScore'
import { scoreTable, sizeLines } from './tally'

const perSecond = ({ atMedian, overall, byProcessor }: Speed) =>
  `${atMedian.toFixed(0)} lists of 40 keys a second at the median, ${overall.toFixed(0)} over the mixture, ${byProcessor.toFixed(0)} by processor time`

/** The clock is only read here, never in the judge. */
export default async function run(): Promise<void> {
  const lists = makeLists(2000, 7)
  console.log(scoreTable('readings', scoreLists(lists)))
  console.log(`\n${scoreTable('hard to tell', scoreLists(makeLists(460, 7, HARD)))}`)
  console.log(`\n${scoreTable('claimed to start from rest', scoreLists(restLists(320, 7)))}`)
  console.log(`\n${sizeLines(scoreLists(makeLists(2000, 11, SIZED)))}`)
  const speed = speedOf(lists)
  console.log(`\nspeed                              ${perSecond(speed)}; 2,000 keys in ${speed.longListMs.toFixed(0)} ms`)
  console.log(`the same, claimed to start at rest ${perSecond(speedOf(lists, { start: 'rest' }))}`)
  const { ratio, apart, agree, lists: both } = againstLibrary(lists)
  console.log(`odex and ml-levenberg-marquardt    ${ratio.toFixed(0)} times as slow on ${both} clean topples and swings; sizes within 1 % on ${agree}, ${(100 * apart).toFixed(3)} % apart at the median`)
  console.log(`\n${moreTable(makeMoreLists(1280, 7))}`)
  const divided = makeSpans(24 * SPAN_ROUND, 7)
  console.log(`\n${spanTable(scoreSpans(divided))}`)
  console.log(`\n${spanTable(scoreSpans(makePointSpans(24 * POINT_SPAN_ROUND, 7)))}`)
  console.log(`\n${finderTable(scoreFinder(divided, makeLists(480, 7).filter(isWhole)))}`)
  const points = scorePoints(makePointLists(40 * POINT_PLAN.length, 7))
  console.log(`\n${scoreTable('points', points)}\n${sizeLines(points)}`)
  console.log(`\n${edgeTable(scoreEdge(makeEdgeLists(950, 7)))}`)
}
