/**
 * The centre of a body that goes over a brink, as a line over time: a circle about the brink up to where it leaves, a parabola after it.
 * One set of numbers for both: with reach d on the drawing, gravity there is g = 2dκ²/q per span², since k² = g/L and q = 2d/L.
 */
import { edgeEnergy, leavingCosine, overBrink, releaseAt } from '../edge'
import type { Release } from '../edge'
import type { LawModel, Trace } from '../laws/model'
import { confineSwing } from '../laws/swinging'
import type { Series } from '../series'

/** The numbers' places: ln κ, angle at the first key, turn per span there, ln d, the brink's x and y, leaving angle of its own (radians). */
export const LOG = 0
export const START = 1
export const TURN = 2
export const REACH = 3
export const RIGHT = 4
export const UP = 5
export const OWN = 6
export const ALL = 7

/** How the body lets go. 'straight': where the law has it, but dead sideways; 'never': the whole circle. */
export type Letting = 'law' | 'own' | 'straight' | 'never'

/** Places and speeds (per span) at some times; drawing units on the sheet, y up. */
export interface Places { x: Float64Array, y: Float64Array, vx: Float64Array, vy: Float64Array, release: Release }

/** Furthest that reach, brink and leaving angle are looked for. */
const MOST_REACH = Math.log(1e7)
const FURTHEST = 1e8
const LEAST_ANGLE = 0.03
const MOST_ANGLE = 3
const STEP = 1e-6

export function releaseOfBrink(numbers: Float64Array, ratio: number, letting: Letting): Release {
  const start = numbers[START] as number
  const push = (numbers[TURN] as number) / Math.exp(numbers[LOG] as number)
  if (letting === 'never') return { tau: Infinity, angle: start, turn: 0 }
  const cosine = letting === 'own' ? Math.cos(numbers[OWN] as number) : leavingCosine(ratio, edgeEnergy(start, push))
  return releaseAt(start, push, cosine)
}

/** `numbers`: all seven. */
export function brinkPlaces(numbers: Float64Array, ratio: number, letting: Letting, times: ArrayLike<number>): Places {
  const n = times.length
  const kappa = Math.exp(numbers[LOG] as number)
  const reach = Math.exp(numbers[REACH] as number)
  const [right, up] = [numbers[RIGHT] as number, numbers[UP] as number]
  const release = releaseOfBrink(numbers, ratio, letting)
  const taus = Float64Array.from(times, at => at * kappa)
  const angle = new Float64Array(n)
  const rate = new Float64Array(n)
  overBrink(numbers[START] as number, (numbers[TURN] as number) / kappa, release, taus, n, angle, rate)
  const places: Places = { x: angle, y: new Float64Array(n), vx: rate, vy: new Float64Array(n), release }
  const [sin, cos] = [Math.sin(release.angle), Math.cos(release.angle)]
  const speed = reach * release.turn
  const across = letting === 'straight' ? 0 : speed * cos
  const fall = 2 * reach / ratio
  for (let i = 0; i < n; i++) {
    const since = (taus[i] as number) - release.tau
    const free = since > 0 || release.tau === 0
    const [at, turn] = [angle[i] as number, rate[i] as number]
    places.x[i] = right + (free ? reach * sin + across * since : reach * Math.sin(at))
    places.y[i] = up + (free ? reach * cos - speed * sin * since - fall * since * since / 2 : reach * Math.cos(at))
    places.vx[i] = kappa * (free ? across : reach * turn * Math.cos(at))
    places.vy[i] = kappa * (free ? -speed * sin - fall * since : -reach * turn * Math.sin(at))
  }
  return places
}

/** x and y in turn, drawing by drawing: how points are put to the fit of rows. */
export function inTurn(x: ArrayLike<number>, y: ArrayLike<number>): Float64Array {
  return Float64Array.from({ length: 2 * x.length }, (_, i) => (i % 2 === 0 ? x : y)[i >> 1] as number)
}

export interface BrinkModel extends LawModel {
  readonly letting: Letting
  /** All seven numbers from those that are free. */
  all(numbers: Float64Array): Float64Array
  /** The free ones of seven. */
  free(numbers: Float64Array): Float64Array
}

/** The law as a row of x and y in turn, for the fit of rows. `fixed`: all seven numbers, of which those at `free` are looked for. */
export function brinkModel(letting: Letting, free: readonly number[], fixed: Float64Array): BrinkModel {
  const all = (numbers: Float64Array) => {
    const full = fixed.slice()
    free.forEach((place, p) => { full[place] = numbers[p] as number })
    return full
  }
  return {
    law: 'over-edge', size: free.length, linear: false, letting, all,
    free: numbers => Float64Array.from(free, place => numbers[place] as number),
    begin: () => [],
    confine(series, numbers) {
      confineSwing(series, numbers)
      free.forEach((place, p) => { numbers[p] = within(place, numbers[p] as number) })
    },
    trace(series: Series, numbers, x, withColumns): Trace {
      const times = x.filter((_, i) => i % 2 === 0)
      const here = brinkPlaces(all(numbers), series.edgeRatio, letting, times)
      const value = inTurn(here.x, here.y)
      const columns = withColumns ? free.map((_, p) => slope(p)) : []
      return { value, rate: inTurn(here.vx, here.vy), columns }

      function slope(p: number): Float64Array {
        const moved = numbers.slice()
        const step = STEP * Math.max(1, Math.abs(moved[p] as number))
        moved[p] = (moved[p] as number) + step
        const there = brinkPlaces(all(moved), series.edgeRatio, letting, times)
        return inTurn(there.x, there.y).map((at, i) => (at - (value[i] as number)) / step)
      }
    },
  }
}

function within(place: number, value: number): number {
  switch (place) {
    case REACH: return Math.min(MOST_REACH, Math.max(-MOST_REACH, value))
    case RIGHT: case UP: return Math.min(FURTHEST, Math.max(-FURTHEST, value))
    case OWN: return Math.min(MOST_ANGLE, Math.max(LEAST_ANGLE, value))
    default: return value
  }
}
