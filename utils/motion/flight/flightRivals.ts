/** Whether a list of points is a flight at all, and what it is otherwise. */
import { DOUBT, DOUBT_WITH_FAULTS, UNNOTICED } from '../choose'
import { mostMisplaced } from '../hypotheses'
import { leastLine } from '../path/taubin'
import type { LawMisfit } from '../types'
import { flightCost, planarPencil, tooMany } from './flightStories'
import type { FlightStory, Flown } from './flightStories'
import { distanceTo, fitPlanar, freeOf, planarAllowances } from './planar'
import type { PlanarFit } from './planar'

/** Beyond this, nats, a drawing counts as a lone bad one, not as evidence against a law. */
const MOST_PER_DRAWING = 7
/** Misfit under which even spacing may stand for a flight that curves. */
const EVEN_ENOUGH = 0.5

/** What is wrong with the law itself, in the words of the flight's two rules. */
export type FlightFault = 'steady' | 'odd-rule' | 'sideways' | 'down' | 'upward' | 'neither'

export interface FlightOpinion {
  fault: FlightFault | 'too-short' | null
  readsAs: LawMisfit[]
  sigma: number
}

interface Rival { fit: PlanarFit, misfit: number, breaking: number, charge: number }

function weighed({ sheet, care }: Flown, fit: PlanarFit, free: number, sigma: number): Rival {
  const allowed = planarAllowances(fit, care.slop, care.tolerance)
  let [sum, breaking, charge] = [0, 0, 0]
  for (let i = 0; i < sheet.n; i++) {
    const off = distanceTo(sheet, fit, i)
    const strained = off === 0 ? 0 : (allowed[i] as number) > 0 ? Math.min(1e3, off / (allowed[i] as number)) : 1e3
    sum += strained * strained
    if (strained > 1) breaking++
    charge += Math.min(MOST_PER_DRAWING, off * off / (2 * sigma * sigma))
  }
  return { fit, misfit: Math.sqrt(sum / sheet.n), breaking: breaking / sheet.n, charge: charge + 0.5 * free * Math.log(2 * sheet.n) }
}

/** The fall along one straight line: the frame turned so that x runs across it. */
function alongLine({ sheet, series }: Flown, ones: Float64Array): PlanarFit {
  const { normal } = leastLine(sheet, ones)
  const [c, s] = [Math.cos(normal), Math.sin(normal)]
  const turned = {
    n: sheet.n,
    x: sheet.x.map((x, i) => c * x + s * (sheet.y[i] as number)),
    y: sheet.x.map((x, i) => c * (sheet.y[i] as number) - s * x),
  }
  const fit = fitPlanar(turned, series.x, ones, { x: 0, y: 2 })
  const back = (x: Float64Array, y: Float64Array) => ({ x: x.map((value, i) => c * value - s * (y[i] as number)), y: x.map((value, i) => s * value + c * (y[i] as number)) })
  const c01 = back(fit.cx, fit.cy)
  return { ...fit, ...back(fit.x, fit.y), cx: c01.x, cy: c01.y }
}

/** Which of the two rules breaks: the directions are fitted apart, so each is told by its own offsets. */
function brokenRule({ sheet, care }: Flown, { fit }: FlightStory): FlightFault {
  const allowed = planarAllowances(fit, care.slop, care.tolerance)
  const breaks = (drawn: Float64Array, line: Float64Array) =>
    allowed.filter((allowance, i) => Math.abs((drawn[i] as number) - (line[i] as number)) > allowance).length > mostMisplaced(sheet.n)
  const [sideways, down] = [breaks(sheet.x, fit.x), breaks(sheet.y, fit.y)]
  return sideways === down ? 'neither' : sideways ? 'sideways' : 'down'
}

/**
 * Keeps to the flight, doubts it, or says that the list can't tell. `agrees`: the claimed gravity itself would not be seen in so short a
 * list. `down`: gravity may well point down.
 */
export function flightOpinion(flown: Flown, story: FlightStory, told: readonly FlightStory[], agrees: boolean, down: boolean): FlightOpinion {
  const { sheet, series, care } = flown
  const { n } = sheet
  const ones = new Float64Array(n).fill(1)
  const even = fitPlanar(sheet, series.x, ones, { x: 1, y: 1 })
  const line = alongLine(flown, ones)
  const both = fitPlanar(sheet, series.x, ones, { x: 2, y: 2 })
  const sigma = planarPencil([...told, { fit: even, out: [] }, { fit: both, out: [] }], n, care)
  const steady = weighed(flown, even, 4, sigma)
  const falling = weighed(flown, line, 5, sigma)
  const curving = weighed(flown, both, 6, sigma)
  const kept = story.strained.filter((_, i) => !story.out.includes(i))
  const misfit = Math.sqrt(kept.reduce((sum, value) => sum + Math.min(1e3, value) ** 2, 0) / Math.max(1, kept.length))
  const charge = flightCost(story, sigma, n) + 0.5 * freeOf(story.fit) * Math.log(2 * n)

  const ranked = [
    { law: 'flight' as const, misfit, charge }, { law: 'odd-rule' as const, misfit: falling.misfit, charge: falling.charge },
    { law: 'steady' as const, misfit: steady.misfit, charge: steady.charge },
  ].sort((a, b) => a.charge - b.charge)
  const [best] = ranked
  // Even spacing is also a flight that doesn't curve and a fall that doesn't gather speed: where it does as well, it has the name.
  const evenDoes = steady.misfit <= EVEN_ENOUGH && steady.breaking === 0 && best !== undefined && steady.charge <= best.charge + DOUBT
  if (evenDoes) ranked.sort((a, b) => Number(b.law === 'steady') - Number(a.law === 'steady'))
  const answer = (fault: FlightOpinion['fault']): FlightOpinion => ({ fault, sigma, readsAs: ranked.map(({ law, misfit }) => ({ law, misfit })) })

  const fits = (rival: Rival) => rival.misfit <= 1 && rival.breaking <= 0.1
  const acceptable = !tooMany(story, n)
  if (acceptable && evenDoes && !agrees) return answer(sheet.extent / 4 > Math.max(6 * sigma, care.slop) ? 'steady' : 'too-short')
  const straight = [steady, falling].filter(fits).sort((a, b) => a.charge - b.charge)[0]
  const named = (rival: Rival | undefined) => (rival === steady ? 'steady' as const : 'odd-rule' as const)
  if (!acceptable) {
    if (evenDoes) return answer('steady')
    if (straight && straight.charge <= curving.charge + DOUBT) return answer(named(straight))
    return answer(brokenRule(flown, told[0] as FlightStory))
  }
  const faulted = story.bad.length > 0 || story.shift !== null
  const margin = faulted ? DOUBT_WITH_FAULTS : DOUBT
  const doubted = (rival: Rival) => fits(rival) && (faulted || misfit > UNNOTICED) && rival.charge + margin < charge
  if (straight && doubted(straight)) return answer(named(straight))
  if (doubted(curving)) return answer('sideways')
  return answer(down ? null : 'upward')
}
