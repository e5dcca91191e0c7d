/** Least squares of one law to one list, with a weight per key and any shift of the keys' times. */
import type { LawModel, Trace } from './laws/model'
import type { Series } from './series'
import { solve3 } from './solve'

export interface Fit {
  readonly model: LawModel
  numbers: Float64Array
  trace: Trace
  /** Weighted sum of squared offsets. */
  cost: number
  /** Normal matrix JᵀWJ at the answer, `size` × `size`. */
  normal: Float64Array
  /** False where the search ran out of steps: the line is the best found, no more. */
  converged: boolean
}

/** How hard to look. */
export interface Effort {
  /** Steps at most. */
  steps: number
  /** A step that saves no larger share of the cost than this is the last. */
  enough: number
}

/** For the law that the list is judged by. */
export const THOROUGH: Effort = { steps: 25, enough: 1e-7 }
/** For a story that begins from a fit in hand. */
export const BRIEF: Effort = { steps: 10, enough: 1e-3 }
/** For laws that are only there to be compared with: a misfit of thirty need not be known to the last digit. */
export const PASSING: Effort = { steps: 8, enough: 0.02 }

function confine(model: LawModel, series: Series, numbers: Float64Array): Float64Array {
  model.confine?.(series, numbers)
  return numbers
}

/** Numbers that have run to the edge of their range and that the list would have go further (b points downhill). */
function atBound(model: LawModel, series: Series, numbers: Float64Array, b: Float64Array): number[] {
  if (!model.confine) return []
  const tried = confine(model, series, numbers.map((value, p) => value + Math.sign(b[p] as number) * 1e-6 * Math.max(1, Math.abs(value))))
  return Array.from(tried.keys()).filter(p => b[p] !== 0 && tried[p] === numbers[p])
}

/** Takes a number out of a step: the others then look for their best without it, instead of being dragged along the edge. */
function leaveOut(a: Float64Array, index: number, size: number): void {
  for (let p = 0; p < size; p++) a[size * index + p] = a[size * p + index] = p === index ? 1 : 0
}

function costOf(trace: Trace, y: Float64Array, weights: Float64Array): number {
  let sum = 0
  for (let i = 0; i < y.length; i++) {
    const r = (y[i] as number) - (trace.value[i] as number)
    sum += (weights[i] as number) * r * r
  }
  return sum
}

/** JᵀWJ and JᵀWr. */
function normalOf(trace: Trace, y: Float64Array, weights: Float64Array, size: number): { a: Float64Array, b: Float64Array } {
  const a = new Float64Array(size * size)
  const b = new Float64Array(size)
  for (let p = 0; p < size; p++) {
    const cp = trace.columns[p] as Float64Array
    for (let i = 0; i < y.length; i++) {
      b[p] = (b[p] as number) + (weights[i] as number) * (cp[i] as number) * ((y[i] as number) - (trace.value[i] as number))
    }
    for (let q = 0; q <= p; q++) {
      const cq = trace.columns[q] as Float64Array
      let sum = 0
      for (let i = 0; i < y.length; i++) sum += (weights[i] as number) * (cp[i] as number) * (cq[i] as number)
      a[size * p + q] = sum
      a[size * q + p] = sum
    }
  }
  return { a, b }
}

/** What a full step saves if the law bends as its columns say: bᵀA⁻¹b. */
function promised(move: Float64Array, b: Float64Array): number {
  let sum = 0
  for (let p = 0; p < b.length; p++) sum += (b[p] as number) * (move[p] as number)
  return sum
}

/**
 * Levenberg–Marquardt from `from` (K. Levenberg, Quart. Appl. Math. 2 (1944) 164–168; D. W. Marquardt, SIAM J. 11 (1963) 431–441).
 * `x` are the times to use (shifted ones for a list with a repeated drawing). Linear laws take one step. Never throws; always returns
 * finite numbers when it was given finite ones.
 */
export function refine(
  model: LawModel, series: Series, x: Float64Array, y: Float64Array, weights: Float64Array, from: Float64Array, effort: Effort,
): Fit {
  const { steps, enough } = effort
  const size = model.size
  let numbers = confine(model, series, from.slice())
  let trace = model.trace(series, numbers, x, true)
  let cost = costOf(trace, y, weights)
  let { a, b } = normalOf(trace, y, weights, size)
  let damping = model.linear ? 0 : 1e-4
  let converged = false
  for (let step = 0; step < steps && !converged; step++) {
    let moved = false
    const held = atBound(model, series, numbers, b)
    for (const p of held) b[p] = 0
    for (let attempt = 0; attempt < 6; attempt++) {
      const damped = a.slice()
      for (const p of held) leaveOut(damped, p, size)
      for (let p = 0; p < size; p++) damped[size * p + p] = (damped[size * p + p] as number) * (1 + damping)
      const move = solve3(damped, b, size)
      if (!move) {
        if (model.linear) break
        damping = Math.max(1e-6, damping * 20)
        continue
      }
      // A near-undamped step knows what it can save: where that isn't worth having, this is the answer.
      if (!model.linear && damping <= 1e-3 && promised(move, b) <= enough * cost) break
      const next = confine(model, series, numbers.map((value, p) => value + (move[p] as number)))
      // A first try mostly succeeds; after a refusal the columns can wait until the step is taken.
      const first = attempt === 0
      const nextTrace = model.trace(series, next, x, first)
      const nextCost = costOf(nextTrace, y, weights)
      if (nextCost <= cost) {
        converged = cost - nextCost <= enough * cost
        numbers = next
        trace = first ? nextTrace : model.trace(series, next, x, true)
        cost = nextCost
        damping = damping < 1e-7 ? 0 : damping / 10
        moved = true
        break
      }
      if (nextCost - cost <= 1e-10 * cost) break
      damping = Math.max(1e-5, damping * 8)
    }
    if (!moved) {
      converged = true
      break
    }
    ;({ a, b } = normalOf(trace, y, weights, size))
    if (model.linear) converged = true
  }
  return { model, numbers, trace, cost, normal: a, converged }
}
