/** Whether one law explains the whole list, and how well. */
import { UNNOTICED, cheapest, storyCost } from '../../choose'
import { badDrawings, pencil, plainFit, stories, strain } from '../../hypotheses'
import type { Care, Story } from '../../hypotheses'
import { LAWS, lawsFor, rivalsOf } from '../../laws/index'
import { seriesOf } from '../../series'
import type { ReadingCheck, ReadingLaw } from '../../types'

export interface Single {
  law: ReadingLaw
  told: Story[]
}

/** Every law that the list can be held against as a whole, with its stories. */
export function singles(request: ReadingCheck, care: Care): Single[] {
  const series = seriesOf(request)
  const rivals = rivalsOf('steady', request.measure, series)
  // A law that is told as its kin is no second opinion.
  const own = lawsFor(request.measure).filter(law => LAWS[law].law === law && !NOT_ASKED.includes(law) && (rivals.includes(law) || !BASE.includes(law)) || law === request.law)
  return own.filter(law => series.n >= LAWS[law].size + 2)
    .map(law => ({ law, told: stories(series, plainFit(series, LAWS[law], care), care) }))
}

/** One line with another law, or laws with a joint inside them: only where the claim names them. */
const NOT_ASKED: readonly ReadingLaw[] = ['spin', 'over-edge', 'bounce']
const BASE: readonly ReadingLaw[] = ['odd-rule', 'steady', 'slow-in', 'topple', 'pendulum']

export function pencilOf(all: readonly Single[], n: number, care: Care): number {
  return Math.min(Infinity, ...all.map(({ told }) => pencil(told, n, care)))
}

export interface SingleCost { law: ReadingLaw, charge: number, unnoticed: boolean }

/** What each costs if the pencil's spread is `sigma`, cheapest first. */
export function singleCosts(request: ReadingCheck, all: readonly Single[], care: Care, sigma: number): SingleCost[] {
  const series = seriesOf(request)
  return all.map(({ law, told }) => {
    const story = cheapest(series, told, care, sigma)
    const strained = strain(series, story.fit, care, story.shift)
    const misfit = Math.sqrt(strained.reduce((sum, value) => sum + Math.min(1e3, value) ** 2, 0) / series.n)
    return {
      law, charge: storyCost(story, sigma, series.n),
      // Nothing is wrong that anyone would see.
      unnoticed: misfit <= UNNOTICED && !story.shift && badDrawings(series, story, care).length === 0,
    }
  }).sort((a, b) => a.charge - b.charge)
}
