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

/**
 * How the body lets go. 'own': at an angle of its own; 'straight': the same, and dead sideways from there (who draws that stops it on a
 * drawing, not at the law's angle); 'never': the whole circle.
 */
export type Letting = 'law' | 'own' | 'straight' | 'never'

/** Places and speeds (per span) at some times; drawing units on the sheet, y up. */
export interface Places { x: Float64Array, y: Float64Array, vx: Float64Array, vy: Float64Array, release: Release }

/** Furthest that reach, brink and leaving angle are looked for. */
const MOST_REACH = Math.log(1e7)
const FURTHEST = 1e8
const LEAST_ANGLE = 0.03
const MOST_ANGLE = 3
const STEP = 1e-6

/** True where the leaving angle is one of the numbers. */
export const hasOwnAngle = (letting: Letting) => letting === 'own' || letting === 'straight'

export function releaseOfBrink(numbers: Float64Array, ratio: number, letting: Letting): Release {
  const start = numbers[START] as number
  const push = (numbers[TURN] as number) / Math.exp(numbers[LOG] as number)
  if (letting === 'never') return { tau: Infinity, angle: start, turn: 0 }
  const cosine = hasOwnAngle(letting) ? Math.cos(numbers[OWN] as number) : leavingCosine(ratio, edgeEnergy(start, push))
  return releaseAt(start, push, cosine)
}

/** `numbers`: all seven. */
export function brinkPlaces(numbers: Float64Array, ratio: number, letting: Letting, times: ArrayLike<number>): Places {
  const n = times.length
  const kappa = Math.exp(numbers[LOG] as number)
  const reach = Math.exp(numbers[REACH] as number)
  const [right, up] = [numbers[RIGHT] as number, numbers[UP] as number]
  const release = releaseOfBrink(numbers, ratio, letting)
  const taus = new Float64Array(n)
  for (let i = 0; i < n; i++) taus[i] = (times[i] as number) * kappa
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
  const out = new Float64Array(2 * x.length)
  for (let i = 0; i < x.length; i++) {
    out[2 * i] = x[i] as number
    out[2 * i + 1] = y[i] as number
  }
  return out
}

/** One of the two rows back again: 0 for x, 1 for y. */
export function everyOther(values: Float64Array, from: 0 | 1): Float64Array {
  const out = new Float64Array(values.length >> 1)
  for (let i = 0; i < out.length; i++) out[i] = values[2 * i + from] as number
  return out
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
      const times = everyOther(x, 0)
      const full = all(numbers)
      const here = brinkPlaces(full, series.edgeRatio, letting, times)
      const columns = withColumns ? columnsOf(full, free, series.edgeRatio, letting, times, here) : []
      return { value: inTurn(here.x, here.y), rate: inTurn(here.vx, here.vy), columns }
    },
  }
}

/**
 * How the line bends with each free number. Brink and reach only carry it along; moving the start along the motion itself is the same as
 * moving time (as for a swing), which leaves one direction of the start, and the leaving angle, to a second line close by.
 */
function columnsOf(full: Float64Array, free: readonly number[], ratio: number, letting: Letting, times: Float64Array, here: Places): Float64Array[] {
  const n = times.length
  const kappa = Math.exp(full[LOG] as number)
  const push = (full[TURN] as number) / kappa
  const moved = (changes: [number, number][]): Float64Array => {
    const numbers = full.slice()
    for (const [place, by] of changes) numbers[place] = (numbers[place] as number) + by
    const there = brinkPlaces(numbers, ratio, letting, times)
    return differences(here, there, STEP)
  }
  // From the air there is no such motion to move along: the start is on the circle all the same.
  const pull = Math.sin(full[START] as number)
  const size = here.release.tau === 0 ? 0 : Math.hypot(push, pull)
  let byStart: Float64Array
  let byPush: Float64Array
  if (size > 1e-6) {
    const [a, b] = [push / size, pull / size]
    const across = moved([[START, -b * STEP], [TURN, a * STEP * kappa]])
    byStart = new Float64Array(2 * n)
    byPush = new Float64Array(2 * n)
    for (let i = 0; i < 2 * n; i++) {
      const along = ((i % 2 === 0 ? here.vx : here.vy)[i >> 1] as number) / kappa / size
      byStart[i] = a * along - b * (across[i] as number)
      byPush[i] = b * along + a * (across[i] as number)
    }
  } else {
    byStart = moved([[START, STEP]])
    byPush = moved([[TURN, STEP * kappa]])
  }
  return free.map((place): Float64Array => {
    const column = new Float64Array(2 * n)
    switch (place) {
      case START: return byStart
      case TURN: return byPush.map(value => value / kappa)
      case OWN: return moved([[OWN, STEP]])
      case LOG:
        // At a fixed turn rate, a larger κ also means a smaller push.
        for (let i = 0; i < 2 * n; i++) {
          column[i] = (times[i >> 1] as number) * ((i % 2 === 0 ? here.vx : here.vy)[i >> 1] as number) - push * (byPush[i] as number)
        }
        return column
      case REACH:
        for (let i = 0; i < 2 * n; i++) column[i] = i % 2 === 0 ? (here.x[i >> 1] as number) - (full[RIGHT] as number) : (here.y[i >> 1] as number) - (full[UP] as number)
        return column
      default:
        for (let i = place === RIGHT ? 0 : 1; i < 2 * n; i += 2) column[i] = 1
        return column
    }
  })
}

function differences(here: Places, there: Places, step: number): Float64Array {
  const out = new Float64Array(2 * here.x.length)
  for (let i = 0; i < here.x.length; i++) {
    out[2 * i] = ((there.x[i] as number) - (here.x[i] as number)) / step
    out[2 * i + 1] = ((there.y[i] as number) - (here.y[i] as number)) / step
  }
  return out
}

function within(place: number, value: number): number {
  switch (place) {
    case REACH: return Math.min(MOST_REACH, Math.max(-MOST_REACH, value))
    case RIGHT: case UP: return Math.min(FURTHEST, Math.max(-FURTHEST, value))
    case OWN: return Math.min(MOST_ANGLE, Math.max(LEAST_ANGLE, value))
    default: return value
  }
}
