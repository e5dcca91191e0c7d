/** Whether drawings of a centre keep to the law of a body over a brink, let go of it wrongly, or are something else. */
import { DOUBT, DOUBT_WITH_FAULTS, UNNOTICED } from '../choose'
import { fitPlanar, freeOf, planarAllowances } from '../flight/planar'
import type { Degrees } from '../flight/planar'
import { shiftedTimes } from '../scan'
import type { Law, LawMisfit } from '../types'
import { LOG, OWN, brinkPlaces, releaseOfBrink } from './brinkModel'
import { brinkCost, brinkPencil, circling, lawStories, likeliestOf, misfitOf, otherStories, ownSaves, rowsOf, tooMany } from './brinkStories'
import type { BrinkStory, Tipped } from './brinkStories'

/** Beyond this, nats, a drawing counts as a lone bad one, not as evidence against a law. */
const MOST_PER_DRAWING = 7
const LEAST_BEFORE = 3
const LEAST_AFTER = 2

export interface BrinkOpinion {
  kind: 'law-holds' | 'wrong-release' | 'wrong-law' | 'in-the-air'
  story: BrinkStory
  /** With nothing assumed. */
  plain: BrinkStory
  readsAs: LawMisfit[]
  /** For a wrong law: what it reads as. */
  reads: Law | null
}

interface Rival { law: Law, misfit: number, charge: number, fits: boolean }

/** A flight or an even move, both of them polynomials. */
function planarRival({ sheet, series, care }: Tipped, law: Law, degrees: Degrees, sigma: number): Rival {
  const fit = fitPlanar(sheet, series.x, new Float64Array(sheet.n).fill(1), degrees)
  const allowed = planarAllowances(fit, care.slop, care.tolerance)
  let [sum, breaking, charge] = [0, 0, 0]
  for (let i = 0; i < sheet.n; i++) {
    const off = Math.hypot((sheet.x[i] as number) - (fit.x[i] as number), (sheet.y[i] as number) - (fit.y[i] as number))
    const strained = off === 0 ? 0 : (allowed[i] as number) > 0 ? Math.min(1e3, off / (allowed[i] as number)) : 1e3
    sum += strained * strained
    if (strained > 1) breaking++
    charge += Math.min(MOST_PER_DRAWING, off * off / (2 * sigma * sigma))
  }
  const misfit = Math.sqrt(sum / sheet.n)
  return { law, misfit, charge: charge + 0.5 * freeOf(fit) * Math.log(2 * sheet.n), fits: misfit <= 1 && breaking <= 0.1 * sheet.n }
}

/** Null where no search could begin. `misscaled`: whether a story's size is another than the claim's, which is a fault like the others. */
export function brinkOpinion(tipped: Tipped, misscaled: (story: BrinkStory) => boolean): BrinkOpinion | null {
  const { sheet: { n }, care } = tipped
  const told = lawStories(tipped)
  const plain = told[0]
  if (!plain) return null
  const judged = (stories: readonly BrinkStory[], sigma: number) => {
    const story = likeliestOf(tipped, stories, sigma)
    return { story, cost: brinkCost(story, sigma, n), misfit: misfitOf(story) }
  }
  let sigma = brinkPencil(told, n, care)
  let law = judged(told, sigma)
  const faults = (story: BrinkStory) => story.bad.length + (story.shift ? 1 : 0) + (misscaled(story) ? 1 : 0)
  // A brink that isn't given, and the size, give way to a wrong angle until hardly anything is left to notice; the pencil scatters, though,
  // and what is left then doesn't.
  const close = faults(law.story) === 0 && law.misfit <= UNNOTICED
  const bent = close && ownSaves(tipped, law.story, fromOf(law.story, tipped)) > DOUBT
  const clean = close && !bent
  // Other ways of letting go are only heard where something is wrong at all.
  const ways: BrinkStory[][] = clean ? [] : (['own', 'straight'] as const).map(letting => otherStories(tipped, letting, fromOf(law.story, tipped))).filter(stories => stories.length > 0)
  sigma = Math.min(sigma, ...ways.map(stories => brinkPencil(stories, n, care)))
  law = judged(told, sigma)
  const other = ways.map(stories => judged(stories, sigma))
    .filter(({ story }) => !tooMany(story, n) && shown(tipped, story))
    .sort((a, b) => a.cost - b.cost)[0]

  const circle = clean ? undefined : circling(tipped, fromOf(law.story, tipped))
  const rivals: Rival[] = [
    planarRival(tipped, 'flight', { x: 1, y: 2 }, sigma), planarRival(tipped, 'steady', { x: 1, y: 1 }, sigma),
    ...(circle ? [{
      law: 'topple' as const, misfit: misfitOf(circle), charge: brinkCost(circle, sigma, n), fits: misfitOf(circle) <= 1 && circle.bad.length <= 0.1 * n,
    }] : []),
  ]
  const readsAs = [{ law: 'over-edge' as const, misfit: law.misfit, charge: law.cost }, ...rivals]
    .sort((a, b) => a.charge - b.charge).map(({ law: name, misfit }) => ({ law: name, misfit }))
  const answer = (kind: BrinkOpinion['kind'], story: BrinkStory, reads: Law | null = null): BrinkOpinion => ({ kind, story, plain, readsAs, reads })

  const faulted = law.story.bad.length + (law.story.shift ? 1 : 0)
  const acceptable = !tooMany(law.story, n)
  const best = rivals.filter(({ fits }) => fits).sort((a, b) => a.charge - b.charge)[0]
  const evenly = best && rivals.find(({ law: name, fits, charge }) => name === 'steady' && fits && charge <= best.charge + DOUBT)
  const free = acceptable ? law.cost : Infinity
  const airborne = onBrink(tipped, law.story) < LEAST_BEFORE
  // A plain flight, or no move that bends at all, leaves nothing to tell a brink by.
  if (best && best.law !== 'topple' && best.charge <= law.cost + (airborne ? DOUBT : 0)) return answer(evenly ? 'wrong-law' : 'in-the-air', plain, evenly ? 'steady' : null)
  if (other) {
    const saves = faults(other.story) < faults(law.story)
    const clearly = other.cost + (saves ? DOUBT_WITH_FAULTS : DOUBT) < free && (saves || bent || law.misfit > UNNOTICED)
    if (clearly && !(best && best.charge < other.cost)) return answer('wrong-release', other.story)
  }
  if (!acceptable) return answer('wrong-law', plain, best ? (evenly ?? best).law : null)
  const margin = faulted > 0 ? DOUBT_WITH_FAULTS : DOUBT
  if (best && (faulted > 0 || law.misfit > UNNOTICED) && best.charge + margin < law.cost) return answer('wrong-law', plain, (evenly ?? best).law)
  return answer('law-holds', law.story)
}

/** All seven numbers of a story, its own leaving angle set to the law's. */
function fromOf({ model, fit }: BrinkStory, { series }: Tipped): Float64Array {
  const numbers = model.all(fit.numbers)
  numbers[OWN] = Math.abs(releaseOfBrink(numbers, series.edgeRatio, 'law').angle)
  return numbers
}

/** Drawings before it lets go. */
function onBrink({ series }: Pick<Tipped, 'series'>, { model, fit, shift }: Pick<BrinkStory, 'model' | 'fit' | 'shift'>): number {
  const numbers = model.all(fit.numbers)
  const at = releaseOfBrink(numbers, series.edgeRatio, model.letting).tau / Math.exp(numbers[LOG] as number)
  return shiftedTimes(series.x, shift).filter(x => x < at).length
}

/** True where enough is drawn on either side of the brink, and some drawing really lies off the law's line from the same start. */
function shown({ series, sheet, care }: Tipped, { model, fit, shift }: BrinkStory): boolean {
  const before = onBrink({ series }, { model, fit, shift })
  if (before < LEAST_BEFORE || sheet.n - before < LEAST_AFTER) return false
  const numbers = model.all(fit.numbers)
  const times = shiftedTimes(series.x, shift)
  const drawn = rowsOf(fit.trace)
  const law = brinkPlaces(numbers, series.edgeRatio, 'law', times)
  const allowed = planarAllowances(law, care.slop, care.tolerance)
  return allowed.some((allowance, i) => Math.hypot((drawn.x[i] as number) - (law.x[i] as number), (drawn.y[i] as number) - (law.y[i] as number)) > allowance)
}
