/** Which story is told, and whether the claimed law is the one to tell it under. */
import { allowances } from './allowance'
import { PASSING } from './fit'
import { MISPLACED_CHARGE, MOST_TOGETHER, badDrawings, charge, longestRun, mostMisplaced, pencil, plainFit, strain } from './hypotheses'
import type { Care, Story } from './hypotheses'
import { LAWS } from './laws/index'
import { shiftedTimes } from './scan'
import type { Series } from './series'
import type { Scale } from './size'
import type { Law, ReadingLaw } from './types'

/** What one drawing can cost a law at most, nats: beyond this it counts as a lone bad drawing, not as evidence against the law. */
const MOST_PER_DRAWING = 7
/** How much better another law must do, nats, before the claimed one is doubted (e⁸ is about three thousand to one). */
export const DOUBT = 8
export const DOUBT_WITH_FAULTS = 3
/** A pace known to within a factor of two is known well enough to agree with a claim. */
const SURE = Math.LN2
/** Misfit under which nobody would doubt the claimed law, whatever else fits. */
export const UNNOTICED = 0.25
/** Misfit under which even spacing may stand for a law that curves. */
const EVEN_ENOUGH = 0.5

export interface Reading {
  law: Law
  /** Nats, free numbers charged. */
  charge: number
  /** Root mean square of offset over allowance on the drawings and times that the told story leaves. */
  misfit: number
  /** Share of the drawings that break. */
  breaking: number
  story: Story
}

/** True where a shift is worth telling: some drawing on its shorter side really breaks the line of the longer one. */
export function shows(series: Series, story: Story, care: Care): boolean {
  const { shift, fit } = story
  if (!shift) return true
  const early = fit.model.trace(series, fit.numbers, series.x, false).value
  const late = fit.model.trace(series, fit.numbers, series.x.map(at => at - shift.by), false).value
  const lateIsShort = series.n - shift.at <= shift.at
  const allowed = allowances(lateIsShort ? early : late, care.slop, care.tolerance)
  for (let i = lateIsShort ? shift.at : 0; i < (lateIsShort ? series.n : shift.at); i++) {
    if (Math.abs((early[i] as number) - (late[i] as number)) > (allowed[i] as number)) return true
  }
  return false
}

/** What blaming one thing more costs where a simpler story already leaves nothing that anyone would notice, nats. */
const NEEDLESS = 6

const blamed = (story: Story) => story.out.length + (story.shift ? 1 : 0)

/** What a story costs with its law's free numbers and the drawings that it leaves broken, nats: for comparing stories of two laws. */
export function storyCost(story: Story, sigma: number, n: number): number {
  return charge(story, sigma, n) + MISPLACED_CHARGE * story.breaking + 0.5 * story.fit.model.size * Math.log(n)
}

/** The cheapest story that shows. */
export function cheapest(series: Series, told: readonly Story[], care: Care, sigma: number): Story {
  const simplest = told.reduce((least, story) => (story.breaking === 0 ? Math.min(least, blamed(story)) : least), Infinity)
  // A drawing that still breaks will have to be told of too, so it is charged for like the others.
  const cost = (story: Story) =>
    charge(story, sigma, series.n) + MISPLACED_CHARGE * story.breaking + (blamed(story) > simplest ? NEEDLESS : 0)
  const ranked = [...told].sort((a, b) => cost(a) - cost(b))
  return ranked.find(story => shows(series, story, care)) ?? (told[0] as Story)
}

function rootMean(strained: Float64Array, out: readonly number[]): number {
  let sum = 0
  let count = 0
  for (let i = 0; i < strained.length; i++) {
    if (out.includes(i)) continue
    // Without slop a single bad drawing could be infinitely many allowances off; a thousand is bad enough for anyone.
    sum += Math.min(1e3, strained[i] as number) ** 2
    count++
  }
  return Math.sqrt(sum / Math.max(1, count))
}

function readingOf(series: Series, law: Law, story: Story, care: Care, cost: number): Reading {
  const strained = strain(series, story.fit, care, story.shift)
  let breaking = 0
  for (let i = 0; i < series.n; i++) if ((strained[i] as number) > 1 && !story.out.includes(i)) breaking++
  return {
    law, story, charge: cost + 0.5 * story.fit.model.size * Math.log(series.n),
    misfit: rootMean(strained, story.out), breaking: breaking / series.n,
  }
}

export interface Choice {
  claimed: Reading
  others: Reading[]
  /** The claimed law with nothing assumed. */
  plain: Story
  sigma: number
}

/** True where a law explains a list: the misfit is below notice, and of ten drawings at most one breaks. */
const fits = (reading: Reading) => reading.misfit <= 1 && reading.breaking <= 0.1

/** True where a law can be kept by a story: few drawings are bad, and no run of them is a motion of its own. */
function acceptable(series: Series, story: Story, care: Care): boolean {
  const off = badDrawings(series, story, care)
  return off.length <= mostMisplaced(series.n) && longestRun(off) <= MOST_TOGETHER && !leavesAtEnd(series, off, care.slop)
}

/**
 * True where the claimed law or a plain rival explains the list. Laws with more freedom cost more to fit and could explain much: they are
 * asked only where this is false. A swing saved by several faults may be one that dies, a topple one that left its foot.
 */
export function explained(series: Series, { claimed, others }: Choice, care: Care): boolean {
  if (others.some(fits)) return true
  if (claimed.law === 'pendulum' && (claimed.story.shift || claimed.story.out.length > 1)) return false
  if (claimed.law === 'topple' && blamed(claimed.story) > 1) return false
  return acceptable(series, claimed.story, care)
}

/** A law that the list is compared with, and its plain best. */
export interface Rival { law: ReadingLaw, story: Story }

/** The plain best of every law but the claimed one. */
export function plainRivals(series: Series, law: ReadingLaw, laws: readonly ReadingLaw[], care: Care): Rival[] {
  return laws.filter(other => other !== law).map((other) => {
    const { fit } = plainFit(series, LAWS[other], care, PASSING)
    return { law: other, story: { out: [], shift: null, fit, breaking: 0 } }
  })
}

/** Picks the claimed law's story, and sets the other laws beside it. */
export function weigh(series: Series, law: ReadingLaw, others: readonly Rival[], told: readonly Story[], care: Care): Choice {
  const sigma = pencil([...told, ...others.map(other => other.story)], series.n, care)
  const story = cheapest(series, told, care, sigma)
  return {
    sigma,
    plain: told[0] as Story,
    claimed: readingOf(series, law, story, care, charge(story, sigma, series.n)),
    others: others.map(other => readingOf(series, other.law, other.story, care, capped(series, other.story, sigma))),
  }
}

function capped(series: Series, story: Story, sigma: number): number {
  const times = shiftedTimes(series.x, story.shift)
  let sum = 0
  for (let i = 0; i < times.length; i++) {
    const r = (series.y[i] as number) - (story.fit.trace.value[i] as number)
    sum += Math.min(MOST_PER_DRAWING, r * r / (2 * sigma * sigma))
  }
  return sum
}

/** Lists shorter than this can't spare two drawings at one end. */
const FEW = 16

/**
 * In a short list, two drawings in a row off at an end, with none beyond them to hold, are the motion going its own way; unless they stand
 * still, as they do where a start is late.
 */
function leavesAtEnd({ y, n }: Series, off: readonly number[], slop: number): boolean {
  const leaves = (end: number, next: number) =>
    off.includes(end) && off.includes(next) && Math.abs((y[end] as number) - (y[next] as number)) > slop
  return n < FEW && (leaves(0, 1) || leaves(n - 1, n - 2))
}

export type Opinion =
  | { kind: 'law-holds' }
  | { kind: 'too-short' }
  | { kind: 'wrong-law', reads: Law | null }

/** Keeps to the claimed law, doubts it, or says that the list can't tell. */
export function opine(series: Series, choice: Choice, care: Care, range: number, scale: Scale): Opinion {
  const { claimed, others, sigma } = choice
  const off = badDrawings(series, claimed.story, care)
  const kept = acceptable(series, claimed.story, care)
  const rivals = others.filter(fits).sort((a, b) => a.charge - b.charge)
  const steady = others.find(other => other.law === 'steady')

  // The claimed law only fits by not curving: what is there is even spacing, if the list is long enough to have shown anything else.
  if (kept && steady && steady.misfit <= EVEN_ENOUGH && steady.breaking === 0 && steady.charge <= claimed.charge + DOUBT) {
    // At some claimed sizes nothing else could be seen in so short a time: the list agrees with its claim, or can't tell.
    if (scale.pace !== null && Math.abs(scale.pace * scale.pace - 1) <= scale.reach) {
      return { kind: scale.spread < SURE ? 'law-holds' : 'too-short' }
    }
    return range / 4 > Math.max(6 * sigma, care.slop) ? { kind: 'wrong-law', reads: 'steady' } : { kind: 'too-short' }
  }
  // A bounce that never touches the ground is a fall, whatever its free numbers say.
  const fall = claimed.law === 'bounce' ? others.find(other => other.law === 'odd-rule') : undefined
  if (kept && fall && fall.misfit <= EVEN_ENOUGH && fall.breaking === 0 && fall.charge <= claimed.charge + DOUBT) {
    return { kind: 'wrong-law', reads: 'odd-rule' }
  }
  const [rival] = rivals
  if (!kept) return { kind: 'wrong-law', reads: rival ? simplest(rivals, rival).law : null }
  const faulted = off.length > 0 || claimed.story.shift !== null
  // A fault under the claimed law has been charged for already; without one, only what could be noticed is held against it.
  const margin = faulted ? DOUBT_WITH_FAULTS : DOUBT
  if ((faulted || claimed.misfit > UNNOTICED) && rival && rival.charge + margin < claimed.charge) return { kind: 'wrong-law', reads: simplest(rivals, rival).law }
  return { kind: 'law-holds' }
}

/** Even spacing is also a fall without acceleration and a swing without curve: where it does as well, it has the name. */
function simplest(rivals: readonly Reading[], best: Reading): Reading {
  const steady = rivals.find(rival => rival.law === 'steady')
  return steady && steady.misfit <= EVEN_ENOUGH && steady.charge <= best.charge + DOUBT ? steady : best
}

/** All laws, best first; even spacing first where a freer law does no better than a hair. */
export function ranked(choice: Choice): Reading[] {
  const all = [choice.claimed, ...choice.others].sort((a, b) => a.charge - b.charge)
  const best = all[0]
  if (!best) return []
  const first = simplest(all, best)
  return [first, ...all.filter(reading => reading !== first)]
}
