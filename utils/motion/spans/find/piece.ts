/** One span as the search sees it: a line by least squares, and how well it is known at either end. */
import { solveInto } from '../../solve'
import type { Scene } from './scene'

/** Even spacing, a constant change of speed, or a swing of either kind. */
export type Kind = 'even' | 'curved' | 'swing'

export const SIZES: Record<Kind, number> = { even: 2, curved: 3, swing: 3 }

/**
 * A line at one drawing: per row its value and speed (per frame), how both move with the free numbers, and N⁻¹g of either gradient, N the
 * free numbers' normal matrix.
 */
export interface Place {
  values: number[]
  speeds: number[]
  byValue: Float64Array
  bySpeed: Float64Array
  solvedValue: Float64Array
  solvedSpeed: Float64Array
}

export interface Piece {
  kind: Kind
  /** Free numbers of each row. */
  size: number
  /** Squares left over, all rows. */
  cost: number
  at(i: number): Place
  /** Sign of the pull in a swing: +1 from upright balance, −1 from hanging rest. */
  pull: number
}

/** Least squares over keys from..to (both included); null where they don't settle the line. */
export function fitPiece({ frames, rows, weights, pull }: Scene, kind: Kind, from: number, to: number): Piece | null {
  if (kind === 'swing' && !pull) return null
  const size = SIZES[kind]
  const middle = ((frames[from] as number) + (frames[to] as number)) / 2
  const half = Math.max(1, ((frames[to] as number) - (frames[from] as number)) / 2)
  const around = (from + to) >> 1
  const third = (i: number) => {
    const t = ((frames[i] as number) - middle) / half
    if (kind !== 'swing' || !pull) return t * t
    return ((pull.twice[i] as number) - (pull.twice[around] as number)
      - (pull.once[around] as number) * ((frames[i] as number) - (frames[around] as number))) / (half * half)
  }
  const gradient = (i: number) => {
    const t = ((frames[i] as number) - middle) / half
    return size === 2 ? Float64Array.of(1, t) : Float64Array.of(1, t, third(i))
  }
  const normal = new Float64Array(size * size)
  const sides = rows.map(() => new Float64Array(size))
  const g = new Float64Array(size)
  const fill = (i: number) => {
    g[0] = 1
    g[1] = ((frames[i] as number) - middle) / half
    if (size === 3) g[2] = third(i)
  }
  for (let i = from; i <= to; i++) {
    if (weights[i] === 0) continue
    fill(i)
    for (let p = 0; p < size; p++) {
      const gp = g[p] as number
      for (let q = 0; q <= p; q++) normal[size * p + q] = (normal[size * p + q] as number) + gp * (g[q] as number)
      for (let r = 0; r < rows.length; r++) {
        const side = sides[r] as Float64Array
        side[p] = (side[p] as number) + gp * ((rows[r] as Float64Array)[i] as number)
      }
    }
  }
  for (let p = 0; p < size; p++) for (let q = 0; q < p; q++) normal[size * q + p] = normal[size * p + q] as number
  const solve = (b: Float64Array) => {
    const out = new Float64Array(size)
    return solveInto(normal, b, size, out) ? out : null
  }
  const numbers = sides.map(side => solve(side))
  if (numbers.some(found => found === null)) return null
  const found = numbers as Float64Array[]
  let cost = 0
  for (let i = from; i <= to; i++) {
    if (weights[i] === 0) continue
    fill(i)
    for (let r = 0; r < rows.length; r++) cost += (((rows[r] as Float64Array)[i] as number) - dot(g, found[r] as Float64Array)) ** 2
  }
  return {
    kind, size, cost,
    pull: kind === 'swing' ? Math.sign(found[0]?.[2] ?? 0) : 0,
    at: remembered((i) => {
      const byValue = gradient(i)
      const t = ((frames[i] as number) - middle) / half
      const bySpeed = size === 2
        ? Float64Array.of(0, 1 / half)
        : Float64Array.of(0, 1 / half, kind === 'swing' && pull
            ? ((pull.once[i] as number) - (pull.once[around] as number)) / (half * half)
            : 2 * t / half)
      return {
        values: found.map(each => dot(byValue, each)), speeds: found.map(each => dot(bySpeed, each)), byValue, bySpeed,
        solvedValue: solve(byValue) ?? new Float64Array(size), solvedSpeed: solve(bySpeed) ?? new Float64Array(size),
      }
    }),
  }
}

/** Joints are asked for over and over, by every division that shares the piece. */
export function remembered(at: (i: number) => Place): (i: number) => Place {
  const known = new Map<number, Place>()
  return (i) => {
    let place = known.get(i)
    if (!place) known.set(i, place = at(i))
    return place
  }
}

export function dot(a: ArrayLike<number>, b: ArrayLike<number>): number {
  let sum = 0
  for (let p = 0; p < a.length; p++) sum += (a[p] as number) * (b[p] as number)
  return sum
}
