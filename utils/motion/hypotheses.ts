/**
 * What could have happened to a list under one law. Every story (nothing, some drawings misplaced, a drawing held or skipped) is fitted
 * and charged for what it leaves unexplained and for what it had to assume; the cheapest one is told. Charges are in nats: a story that
 * assumes one more thing must explain the list e^charge times better.
 */
import { allowances } from './allowance'
import { BRIEF, PASSING, THOROUGH, refine } from './fit'
import type { Effort, Fit } from './fit'
import { firstFit, partFit } from './grow'
import type { LawModel } from './laws/model'
import { bestShifts, shiftedTimes, worstDrawings } from './scan'
import type { Candidate, Shift } from './scan'
import type { Series } from './series'
import { smoothed } from './smooth'

/** Charge for saying that one particular drawing is off. */
export const MISPLACED_CHARGE = 5
/** Charge for a held or skipped drawing, to which the choice of place among 2n is added. */
const SHIFT_CHARGE = 1

/** A misplaced drawing is one whose neighbours hold. Three in a row may be three mistakes; more are another motion. */
export const MOST_TOGETHER = 3
/** Never more lone bad drawings than this, however long the list. */
const MOST_MISPLACED = 40

/** How many drawings may be called misplaced before the law itself is in doubt: a quarter of the list, two at least, four from twelve on. */
export function mostMisplaced(n: number): number {
  return Math.min(MOST_MISPLACED, Math.max(n < 12 ? 2 : 4, Math.floor(n / 4)))
}

export interface Story {
  /** Indexes of drawings set aside. */
  out: number[]
  shift: Shift | null
  fit: Fit
  /** Drawings, of those not set aside, that still break. */
  breaking: number
}

export interface Care {
  slop: number
  tolerance: number
  /** The spread that writing readings down to so many places leaves at least, reading units; above 0. */
  least: number
}

export function weightsWithout(n: number, out: readonly number[]): Float64Array {
  const weights = new Float64Array(n).fill(1)
  for (const i of out) weights[i] = 0
  return weights
}

/** Offsets over allowance under a story, with the law's own gaps. */
export function strain(series: Series, fit: Fit, care: Care, shift: Shift | null = null): Float64Array {
  const allowed = allowances(fit.trace.value, care.slop, care.tolerance)
  if (shift) {
    // The gap across a held or skipped drawing is not the law's: either side is measured by its own gaps.
    allowed.set(allowances(fit.trace.value.subarray(0, shift.at), care.slop, care.tolerance))
    allowed.set(allowances(fit.trace.value.subarray(shift.at), care.slop, care.tolerance), shift.at)
  }
  for (let i = 0; i < series.n; i++) {
    const off = Math.abs((series.y[i] as number) - (fit.trace.value[i] as number))
    const allowance = allowed[i] as number
    allowed[i] = off === 0 ? 0 : allowance > 0 ? off / allowance : Number.MAX_VALUE
  }
  return allowed
}

/** Tells a story; drawings that turn out not to break once the line is free of the others are put back. */
function tell(series: Series, model: LawModel, out: number[], shift: Shift | null, from: Float64Array, care: Care): Story {
  const story = tellExactly(series, model, out, shift, from, care)
  if (out.length === 0) return story
  const strained = strain(series, story.fit, care, shift)
  const kept = out.filter(i => (strained[i] as number) > 1)
  return kept.length === out.length ? story : tell(series, model, kept, shift, story.fit.numbers, care)
}

function tellExactly(
  series: Series, model: LawModel, out: number[], shift: Shift | null, from: Float64Array, care: Care,
): Story {
  const fit = refine(model, series, shiftedTimes(series.x, shift), series.y, weightsWithout(series.n, out), from, BRIEF)
  const strained = strain(series, fit, care, shift)
  let breaking = 0
  for (let i = 0; i < series.n; i++) if ((strained[i] as number) > 1 && !out.includes(i)) breaking++
  return { out, shift, fit, breaking }
}

/**
 * Sets drawings that still break aside until none is left or more than `most` are out: one at a time, the worst for its leverage first,
 * while they are few; by the handful in a long list.
 */
function extend(series: Series, story: Story, care: Care, most: number): Story {
  let now = story
  while (now.breaking > 0 && now.out.length < most) {
    // A list that breaks all over is not a list with a few bad drawings.
    if (now.breaking > 3 * (most - now.out.length) + 2) break
    const more = worstBreaking(series, now, care)
    if (more.length === 0) break
    const out = [...now.out, ...more].sort((a, b) => a - b)
    if (longestRun(out) > MOST_TOGETHER) break
    const next = tell(series, now.fit.model, out, now.shift, now.fit.numbers, care)
    // A drawing that was put back at once would be set aside again for ever.
    if (next.out.length <= now.out.length) break
    now = next
  }
  return now
}

/** Drawings that a story calls bad: those set aside and those that break all the same. Sorted indexes. */
export function badDrawings(series: Series, story: Story, care: Care): number[] {
  const strained = strain(series, story.fit, care, story.shift)
  return Array.from(strained.keys()).filter(i => (strained[i] as number) > 1)
}

/** Length of the longest run of neighbours among sorted indexes. */
export function longestRun(out: readonly number[]): number {
  let longest = 0
  let run = 0
  out.forEach((i, at) => {
    run = at > 0 && out[at - 1] === i - 1 ? run + 1 : 1
    longest = Math.max(longest, run)
  })
  return longest
}

/** Of the drawings that break, the one that bends the line most; of many, the worst quarter. */
function worstBreaking(series: Series, story: Story, care: Care): number[] {
  const strained = strain(series, story.fit, care, story.shift)
  const breaking = Array.from(strained.keys()).filter(i => (strained[i] as number) > 1 && !story.out.includes(i))
  if (breaking.length <= 8) {
    const weights = new Float64Array(series.n)
    for (const i of breaking) weights[i] = 1
    return worstDrawings(story.fit, series.y, weights)[0] ?? []
  }
  return breaking.sort((a, b) => (strained[b] as number) - (strained[a] as number) || a - b).slice(0, Math.ceil(breaking.length / 4))
}

/** The exposures a hold or a skip could be: gap lengths that occur in the list, commonest first, at most six. */
export function exposures(series: Series): number[] {
  const counts = new Map<number, number>()
  for (let i = 1; i < series.n; i++) {
    const frames = Math.round(((series.x[i] as number) - (series.x[i - 1] as number)) * series.spanFrames)
    counts.set(frames, (counts.get(frames) ?? 0) + 1)
  }
  return [...counts].sort((a, b) => b[1] - a[1] || a[0] - b[0]).slice(0, 6).map(([frames]) => frames / series.spanFrames)
}

/** `fit`: to the list as posted. `base`: to the list with its lone bad drawings smoothed over. */
export interface Plain { fit: Fit, base: Fit }

/** A plain fit of a law with lone bad drawings smoothed over at the start of the search. */
export function plainFit(series: Series, model: LawModel, care: Care, effort: Effort = THOROUGH): Plain {
  const calm = model.kinked ? series.y : smoothed(series.x, series.y, 2 * care.slop)
  const ones = new Float64Array(series.n).fill(1)
  const noticeable = care.slop + care.tolerance * typicalGap(series) + 3 * care.least
  const base = firstFit(series, model, calm, noticeable, effort)
  if (effort === PASSING && series.n > 300) return { base, fit: base }
  return { base, fit: refine(model, series, series.x, series.y, ones, base.numbers, effort) }
}

/** Mean gap between the posted readings, whichever way they go. */
function typicalGap(series: Series): number {
  let sum = 0
  for (let i = 1; i < series.n; i++) sum += Math.abs((series.y[i] as number) - (series.y[i - 1] as number))
  return sum / Math.max(1, series.n - 1)
}

/**
 * Drawings that break a line which gives way to none of them: a few rounds of least squares, each drawing weighing less the further it
 * was off in the round before (weights of Cauchy's distribution; common robust practice).
 */
function doubted(series: Series, from: Fit, care: Care): { fit: Fit, off: number[] } {
  let fit = from
  for (let round = 0; round < 6; round++) {
    const strained = strain(series, fit, care)
    const middle = strained.slice().sort()[series.n >> 1] as number
    const scale = Math.max(0.3, middle)
    const weights = strained.map(value => 1 / (1 + (value / scale) ** 2))
    fit = refine(fit.model, series, series.x, series.y, weights, fit.numbers, { steps: 3, enough: 1e-3 })
  }
  const strained = strain(series, fit, care)
  return { fit, off: Array.from(strained.keys()).filter(i => (strained[i] as number) > 1) }
}

/**
 * The most promising shifts from a line that is sound on some part of the list: its early drawings, or (a law with corners can't be bent
 * into it by one step) its late ones.
 */
function shiftsFrom(series: Series, fit: Fit, sizes: readonly number[]): Candidate[] {
  const { model, numbers } = fit
  const early = bestShifts(series, fit, series.y, sizes)
  if (!model.later) return early
  const late = sizes.flatMap(by => bestShifts(series, { ...fit, numbers: model.later?.(numbers, -by) ?? numbers }, series.y, [by]))
  return [...early, ...late]
}

/** Fits the cheapest `most` of the candidates that have not been heard yet and adds them to the stories told. */
function hear(series: Series, model: LawModel, care: Care, told: Story[], candidates: Candidate[], most: number): void {
  const known = new Set(told.map(({ shift }) => (shift ? `${shift.at} ${shift.by}` : '')))
  let heard = 0
  for (const { shift, numbers } of [...candidates].sort((a, b) => a.cost - b.cost)) {
    const name = `${shift.at} ${shift.by}`
    if (known.has(name)) continue
    if (heard++ >= most) break
    known.add(name)
    told.push(tell(series, model, [], shift, numbers, care))
  }
}

/** Every story worth hearing under one law, given its `plainFit`. The first is always "nothing happened". */
export function stories(series: Series, { fit, base }: Plain, care: Care): Story[] {
  const { model } = fit
  const { n, y } = series
  const strained = strain(series, fit, care)
  let breaking = 0
  let worst = 0
  for (const value of strained) {
    if (value > 1) breaking++
    worst = Math.max(worst, value)
  }
  const told: Story[] = [{ out: [], shift: null, fit, breaking }]
  // Nothing near the edge of notice, nothing to explain.
  if (worst < 0.8 && fit.cost <= 0.16 * care.slop * care.slop * n) return told

  const spare = n - model.size - 2
  if (spare < 1) return told
  const ones = new Float64Array(n).fill(1)
  for (const set of worstDrawings(fit, y, ones)) if (set.length <= spare) told.push(tell(series, model, set, null, fit.numbers, care))
  const off = strain(series, base, care)
  const offBase = Array.from(off.keys()).filter(i => (off[i] as number) > 1)
  if (offBase.length > 0 && offBase.length <= Math.min(spare, n / 4)) told.push(tell(series, model, offBase, null, base.numbers, care))

  const sizes = exposures(series).flatMap(by => [by, -by])
  const candidates = shiftsFrom(series, fit, sizes)
  if (!model.linear && offBase.length > 0) candidates.push(...bestShifts(series, base, y, sizes))
  hear(series, model, care, told, candidates, 4)
  // One step from a bent line may point a few keys too far. From the best of them, a second look is a straight one.
  const best = told.reduce<Story | null>((least, story) => (story.shift && (!least || story.fit.cost < least.fit.cost) ? story : least), null)
  if (best) hear(series, model, care, told, bestShifts(series, best.fit, y, sizes), sizes.length > 2 ? 5 : 3)

  if (!told.some(story => story.breaking === 0)) {
    const half = Math.ceil(n / 2)
    if (half >= model.size + 2) {
      const long = Math.ceil(2 * n / 3)
      // Half a list may hold too few corners to know the law by.
      const parts = model.kinked ? [[0, half], [n - half, n], [0, long], [n - long, n]] as const : [[0, half], [n - half, n]] as const
      for (const [from, to] of parts) {
        hear(series, model, care, told, shiftsFrom(series, partFit(series, model, y, from, to), sizes), 2)
      }
    }
    const { fit: sturdy, off } = doubted(series, fit, care)
    if (model.kinked) hear(series, model, care, told, shiftsFrom(series, sturdy, sizes), 3)
    if (off.length <= Math.min(spare, mostMisplaced(n))) told.push(tell(series, model, off, null, fit.numbers, care))
  }

  // The likeliest few may need a lone bad drawing on top.
  const most = Math.min(spare, mostMisplaced(n))
  const sigma = pencil(told, n, care)
  const likely = [...told].sort((a, b) => charge(a, sigma, n) - charge(b, sigma, n)).slice(0, 4)
  let least = Infinity
  for (const story of told) if (story.breaking === 0) least = Math.min(least, charge(story, sigma, n))
  for (const story of likely) {
    // However well it then fits, one more drawing set aside would already cost more than the best that explains all.
    if (story.breaking === 0 || assumed(story, n) + MISPLACED_CHARGE >= least) continue
    // A held drawing and bad ones beside it need a list long enough to tell them apart.
    const longer = extend(series, story, care, story.shift ? Math.min(most, Math.floor(n / 10)) : most)
    told.push(longer)
    if (longer.breaking === 0) least = Math.min(least, charge(longer, sigma, n))
  }
  return told
}

/**
 * The pencil's spread, reading units, judged by the story that leaves least unexplained. A third of the slop counts as four drawings
 * seen before the first one is (common practice: slop is what nobody means, and most drawings sit well inside it).
 */
export function pencil(told: readonly Story[], n: number, care: Care): number {
  const before = (care.slop / 3) ** 2
  let best = Infinity
  for (const { fit, out } of told) {
    const free = Math.max(1, n - out.length - fit.model.size)
    best = Math.min(best, (4 * before + fit.cost) / (4 + free))
  }
  return Math.sqrt(Math.max(best, care.least * care.least))
}

/** What a story costs, nats, if the pencil's spread is `sigma`. */
export function charge(story: Story, sigma: number, n: number): number {
  return story.fit.cost / (2 * sigma * sigma) + assumed(story, n)
}

/** What its assumptions alone cost. */
function assumed(story: Story, n: number): number {
  return MISPLACED_CHARGE * story.out.length + (story.shift ? SHIFT_CHARGE + Math.log(2 * n) : 0)
}
