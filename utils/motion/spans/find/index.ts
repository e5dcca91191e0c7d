/** "Find the joints for me": the best division of a list into at most four spans, or the one law that needs none. */
import type { Care } from '../../hypotheses'
import { roundingSpread } from '../../series'
import type { ReadingCheck, ReadingLaw, Span } from '../../types'
import type { Rates } from './division'
import { sceneOf } from './scene'
import { carriedOver, divisions, exactly } from './search'
import type { Found } from './search'
import { pencilOf, singleCosts, singles } from './single'
import { spansOf } from './spans'

/** Spans at most. */
const MOST_SPANS = 4
/** By how much a division must beat the best single law, nats: nobody wants a motion cut up for a hair. */
const MARGIN = 4
/** Single laws that do within this of each other, nats, are equally good. */
const AS_GOOD = 3

/** Divisions within this of the best, nats, are judged before one is chosen: the search knows less of the laws than the judge does. */
const SECOND_LOOK = 6

/** A division dearer than the cheapest by this, nats, will not come back by being fitted exactly. */
const HOPELESS = 40
/** Longer lists are searched by every second, third … drawing first. */
const MOST_KEYS = 200

/** What a search comes to: divisions that explain the list about as well, cheapest first, or the laws that explain the whole list, most likely first. */
export type Answer = { divisions: Span[][] } | { laws: ReadingLaw[] }

/** Searches a list of readings. Deterministic; never throws on what the contract lets through. */
export function bestAnswer(request: ReadingCheck): Answer {
  const { slop, tolerance, keys } = request
  const n = keys.length
  const least = roundingSpread(Float64Array.from(keys, ({ reading }) => reading))
  const care: Care = { slop, tolerance, least }
  const one = singles(request, care)
  const first: Rates = { sigma: Math.max(least, slop / 3), slop, tolerance }
  const rough = roughly(request, first)
  const hopeful = Math.min(...rough.map(({ charge }) => charge)) + HOPELESS
  const found = rough.filter(({ charge }) => charge <= hopeful).map(each => exactly(request, each, first))
  // All are charged by the same pencil: that of whoever explains the list best.
  const sigma = Math.max(least, Math.min(pencilOf(one, n, care), ...found.map(each => spreadOf(each, n, care))))
  const divided = found.filter(({ pieces }) => pieces.length > 1).map(each => rescaled(each, first.sigma, sigma)).sort((a, b) => a.charge - b.charge)
  const [best] = divided
  const costs = singleCosts(request, one, care, sigma)
  const [whole] = costs
  const laws = costs.filter(({ charge }) => whole && charge <= whole.charge + AS_GOOD).map(({ law }) => law)
  if (!best) return { laws }
  if (whole && (whole.unnoticed || whole.charge <= best.charge + MARGIN)) return { laws }
  const likely = divided.filter(({ charge }) => charge <= best.charge + SECOND_LOOK).map(each => spansOf(request, each)).filter(spans => spans.length > 1)
  return likely.length > 0 ? { divisions: likely } : { laws }
}

/** The cheapest division for every number of spans. Of a long list every so many drawings show where to look. */
function roughly(request: ReadingCheck, rates: Rates): Found[] {
  const { keys } = request
  const scene = sceneOf(request)
  if (keys.length <= MOST_KEYS) return divisions(scene, MOST_SPANS, rates)
  const stride = Math.ceil(keys.length / MOST_KEYS)
  const thin = sceneOf({ ...request, keys: keys.filter((_, i) => i % stride === 0 || i === keys.length - 1) })
  return divisions(thin, MOST_SPANS, rates).flatMap(each => carriedOver(scene, each, rates) ?? [])
}

function spreadOf({ pieces }: Found, n: number, { slop }: Care): number {
  let cost = 4 * (slop / 3) ** 2
  let free = 4 + n
  for (const piece of pieces) {
    cost += piece.cost
    free -= piece.size
  }
  return Math.sqrt(cost / Math.max(4, free))
}

/** A charge as another pencil would put it: what the squares cost goes with the inverse square of the spread. */
function rescaled(found: Found, from: number, to: number): Found {
  const { charge, squares } = found
  return { ...found, charge: charge + squares / (2 * to * to) - squares / (2 * from * from) }
}

