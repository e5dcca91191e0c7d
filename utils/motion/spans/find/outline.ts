/**
 * The best cuts of a list into one to four spans with nothing asked of the joints: dynamic programming over where the last span begins
 * (R. Bellman, Communications of the ACM 4 (1961) 284, for straight pieces; memory). Where a real search begins.
 */
import { solveInto } from '../../solve'
import type { Kind } from './piece'
import type { Scene } from './scene'

export interface Outline {
  /** Last key of every span but the last. */
  joints: number[]
  kinds: Kind[]
  /** Squares left over. */
  cost: number
}

/** More keys than this are cut only at every second, third … one; the search goes on from there key by key. */
const MOST_PLACES = 260

const a = new Float64Array(9)
const b = new Float64Array(3)
const out = new Float64Array(3)

/**
 * Best outlines of one, two … `most` spans. `sigma`: the pencil's spread. Moments of the keys between two cuts are gathered about the later
 * one, key by key, so that no two large sums are ever taken from one another.
 */
export function outlines(scene: Scene, most: number, sigma: number): Outline[] {
  const { n, frames, rows, weights, pull } = scene
  const stride = Math.ceil(n / MOST_PLACES)
  const places = Array.from({ length: Math.floor((n - 1) / stride) }, (_, i) => (i + 1) * stride).filter(at => at < n - 1)
  places.push(n - 1)
  const kinds: Kind[] = pull ? ['even', 'curved', 'swing'] : ['even', 'curved']
  const variance = 2 * sigma * sigma
  // Speed and position carry over at most joints, so that a new span is mostly one more number, and where it begins.
  const perNumber = 0.5 * Math.log(n) * rows.length
  const best = Array.from({ length: most }, () => new Float64Array(n).fill(Infinity))
  const left = Array.from({ length: most }, () => new Float64Array(n).fill(Infinity))
  const begun = Array.from({ length: most }, () => new Int32Array(n).fill(-1))
  const shape = Array.from({ length: most }, () => new Int8Array(n))
  const width = pull ? 4 : 3
  const sums = new Float64Array(width * width)
  const sides = rows.map(() => new Float64Array(width))
  const squares = new Float64Array(rows.length)
  const costs = new Float64Array(kinds.length)
  const g = new Float64Array(width)
  const isPlace = new Uint8Array(n)
  for (const at of places) isPlace[at] = 1
  for (const end of places) {
    sums.fill(0)
    squares.fill(0)
    for (const side of sides) side.fill(0)
    let count = 0
    for (let i = end; i >= 0; i--) {
      if (weights[i] !== 0) {
        count++
        const t = (frames[i] as number) - (frames[end] as number)
        g[0] = 1
        g[1] = t
        g[2] = t * t
        if (pull) g[3] = (pull.twice[i] as number) - (pull.twice[end] as number) - (pull.once[end] as number) * t
        for (let p = 0; p < width; p++) {
          for (let q = 0; q <= p; q++) sums[width * p + q] = (sums[width * p + q] as number) + (g[p] as number) * (g[q] as number)
        }
        for (let r = 0; r < rows.length; r++) {
          const value = ((rows[r] as Float64Array)[i] as number) - ((rows[r] as Float64Array)[end] as number)
          const side = sides[r] as Float64Array
          for (let p = 0; p < width; p++) side[p] = (side[p] as number) + (g[p] as number) * value
          squares[r] = (squares[r] as number) + value * value
        }
      }
      // Keys i..end are gathered; the span before, if any, ends on key i − 1.
      const first = i === 0
      if (count < 3 || (!first && isPlace[i - 1] === 0)) continue
      for (let k = 0; k < kinds.length; k++) costs[k] = count < (k === 0 ? 3 : 4) + (first ? 1 : 0) ? Infinity : leftOver(k, width, sums, sides, squares)
      for (let k = 0; k < kinds.length; k++) {
        const charge = (costs[k] as number) / variance + (k === 0 ? 0 : perNumber)
        if (first) {
          if (charge < (best[0] as Float64Array)[end]!) {
            ;(best[0] as Float64Array)[end] = charge
            ;(left[0] as Float64Array)[end] = costs[k] as number
            ;(shape[0] as Int8Array)[end] = k
          }
          continue
        }
        for (let spans = 1; spans < most; spans++) {
          const total = ((best[spans - 1] as Float64Array)[i - 1] as number) + charge
          if (total >= ((best[spans] as Float64Array)[end] as number)) continue
          ;(best[spans] as Float64Array)[end] = total
          ;(left[spans] as Float64Array)[end] = ((left[spans - 1] as Float64Array)[i - 1] as number) + (costs[k] as number)
          ;(begun[spans] as Int32Array)[end] = i - 1
          ;(shape[spans] as Int8Array)[end] = k
        }
      }
    }
  }
  return best.flatMap((row, spans) => {
    if (!Number.isFinite(row[n - 1] as number)) return []
    const joints: number[] = []
    const chosen: Kind[] = []
    let end = n - 1
    for (let level = spans; level >= 0; level--) {
      chosen.unshift(kinds[(shape[level] as Int8Array)[end] as number] as Kind)
      end = (begun[level] as Int32Array)[end] as number
      if (level > 0) joints.unshift(end)
    }
    return [{ joints, kinds: chosen, cost: (left[spans] as Float64Array)[n - 1] as number }]
  })
}

/** Squares left over by least squares with columns 1, t, and t² (kind 1) or the swing's own (kind 2). */
function leftOver(kind: number, width: number, sums: Float64Array, sides: readonly Float64Array[], squares: Float64Array): number {
  const size = kind === 0 ? 2 : 3
  const column = (p: number) => (p < 2 ? p : kind + 1)
  for (let p = 0; p < size; p++) {
    for (let q = 0; q <= p; q++) {
      const [row, other] = column(p) >= column(q) ? [column(p), column(q)] : [column(q), column(p)]
      a[size * p + q] = a[size * q + p] = sums[width * row + other] as number
    }
  }
  let cost = 0
  for (let r = 0; r < sides.length; r++) {
    const side = sides[r] as Float64Array
    for (let p = 0; p < size; p++) b[p] = side[column(p)] as number
    if (!solveInto(a, b, size, out)) return Infinity
    let saved = 0
    for (let p = 0; p < size; p++) saved += (b[p] as number) * (out[p] as number)
    cost += Math.max(0, (squares[r] as number) - saved)
  }
  return cost
}
