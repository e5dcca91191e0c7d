/**
 * First looks at what could be wrong with a list: which drawings to set aside, and from which key on time could be shifted. Everything
 * here is one step of Gauss–Newton away from a fit in hand, for all keys at once; whoever asks fits the few best ones properly.
 */
import type { Fit } from './fit'
import type { Series } from './series'
import { solve3, solveInto } from './solve'

export interface Shift {
  /** Index of the first key that is late (by > 0) or early (by < 0). */
  at: number
  /** Spans. */
  by: number
}

/** Times with everything from `at` on moved back by `by`: what a key there shows is what the law had that much earlier. */
export function shiftedTimes(x: Float64Array, shift: Shift | null): Float64Array {
  if (!shift) return x
  const out = x.slice()
  for (let i = shift.at; i < out.length; i++) out[i] = (out[i] as number) - shift.by
  return out
}

/**
 * Sets of one and two drawings whose removal relieves the fit most: best first, the best of each kind and the runner-up pair.
 * Removal of a set S saves rᵀ(I − H)⁻¹r over S, H the hat matrix (common least-squares algebra; Cook & Weisberg 1982, memory).
 */
export function worstDrawings(fit: Fit, y: Float64Array, weights: Float64Array): number[][] {
  const n = y.length
  const size = fit.model.size
  const r = y.map((value, i) => (weights[i] as number) * (value - (fit.trace.value[i] as number)))
  const inverse: Float64Array[] = []
  for (let p = 0; p < size; p++) {
    const unit = new Float64Array(size)
    unit[p] = 1
    const row = solve3(fit.normal, unit, size)
    if (!row) return []
    inverse.push(row)
  }
  const hat = (i: number, j: number) => {
    let sum = 0
    for (let p = 0; p < size; p++) {
      const cp = (fit.trace.columns[p] as Float64Array)[i] as number
      for (let q = 0; q < size; q++) sum += cp * ((inverse[p] as Float64Array)[q] as number) * ((fit.trace.columns[q] as Float64Array)[j] as number)
    }
    return sum
  }
  const leverage = r.map((_, i) => Math.min(1 - 1e-9, hat(i, i)))
  const gain = r.map((value, i) => value * value / (1 - (leverage[i] as number)))
  const order = Array.from({ length: n }, (_, i) => i).filter(i => (weights[i] as number) > 0)
    .sort((a, b) => (gain[b] as number) - (gain[a] as number) || a - b)
  const first = order[0]
  if (first === undefined) return []
  const sets: { keys: number[], gain: number }[] = []
  const few = order.slice(0, 24)
  for (let a = 0; a < few.length; a++) {
    for (let b = a + 1; b < few.length; b++) {
      const i = few[a] as number
      const j = few[b] as number
      const h = hat(i, j)
      const di = 1 - (leverage[i] as number)
      const dj = 1 - (leverage[j] as number)
      const det = di * dj - h * h
      if (det < 1e-9) continue
      const ri = r[i] as number
      const rj = r[j] as number
      sets.push({ keys: i < j ? [i, j] : [j, i], gain: (dj * ri * ri + 2 * h * ri * rj + di * rj * rj) / det })
    }
  }
  sets.sort((a, b) => b.gain - a.gain)
  return [[first], ...sets.slice(0, 2).map(set => set.keys)]
}

/** Entries per key of the running sums: products of columns, products of columns with offsets, offsets squared. */
const widthFor = (size: number) => size * (size + 1) / 2 + size + 1

/** Running sums, key by key, of what a least-squares step needs. */
function runningSums(series: Series, fit: Fit, y: Float64Array, x: Float64Array): Float64Array {
  const n = y.length
  const size = fit.model.size
  const trace = fit.model.trace(series, fit.numbers, x, true)
  const width = widthFor(size)
  const table = new Float64Array((n + 1) * width)
  for (let i = 0; i < n; i++) {
    const r = (y[i] as number) - (trace.value[i] as number)
    const from = i * width
    const to = from + width
    for (let k = 0; k < width; k++) table[to + k] = table[from + k] as number
    let slot = to
    for (let p = 0; p < size; p++) {
      const cp = (trace.columns[p] as Float64Array)[i] as number
      for (let q = 0; q <= p; q++) {
        table[slot] = (table[slot] as number) + cp * ((trace.columns[q] as Float64Array)[i] as number)
        slot++
      }
      table[to + width - 1 - size + p] = (table[to + width - 1 - size + p] as number) + cp * r
    }
    table[to + width - 1] = (table[to + width - 1] as number) + r * r
  }
  return table
}

export interface Candidate { shift: Shift, cost: number, numbers: Float64Array }

/**
 * The most promising places for a shift of each of `sizes` (spans), given a fit to begin from: for each size the best two, none within
 * two keys of an end (a single late drawing at an end is a misplaced one). Running sums make each size one pass over the list.
 */
export function bestShifts(series: Series, fit: Fit, y: Float64Array, sizes: readonly number[], together = 1): Candidate[] {
  const n = y.length
  const size = fit.model.size
  const width = widthFor(size)
  const early = runningSums(series, fit, y, series.x)
  const a = new Float64Array(size * size)
  const b = new Float64Array(size)
  const move = new Float64Array(size)
  const total = new Float64Array(width)
  const last = n * width
  const found: Candidate[] = []
  for (const by of sizes) {
    const late = runningSums(series, fit, y, series.x.map(at => at - by))
    const best: Candidate[] = []
    for (let at = 2 * together; at <= n - 2 * together; at += together) {
      const cut = at * width
      for (let k = 0; k < width; k++) total[k] = (early[cut + k] as number) + (late[last + k] as number) - (late[cut + k] as number)
      let slot = 0
      for (let p = 0; p < size; p++) {
        for (let q = 0; q <= p; q++) {
          a[size * p + q] = a[size * q + p] = total[slot] as number
          slot++
        }
        b[p] = total[width - 1 - size + p] as number
      }
      if (!solveInto(a, b, size, move)) continue
      let cost = total[width - 1] as number
      for (let p = 0; p < size; p++) cost -= (b[p] as number) * (move[p] as number)
      const runnerUp = best[1]
      if (runnerUp && cost >= runnerUp.cost) continue
      best.push({ shift: { at, by }, cost, numbers: fit.numbers.map((value, p) => value + (move[p] as number)) })
      best.sort((p, q) => p.cost - q.cost || p.shift.at - q.shift.at)
      best.length = Math.min(best.length, 2)
    }
    found.push(...best)
  }
  return found
}
