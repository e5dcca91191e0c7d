/**
 * Where the search for a bounce begins. First contact, length of a hop and restitution are tried on a grid, and the rest is one step of
 * least squares each; contacts are looked for where the spacing turns about most sharply.
 */
import type { Series } from '../series'
import { contactAfter, hopsBy } from './hops'

/** Keys that the grid looks at, at most: enough to tell hops apart, whatever the list's length. */
const MOST_LOOKED_AT = 160
const SHARPEST = 5
const RESTITUTIONS = [0.2, 0.35, 0.5, 0.6, 0.7, 0.78, 0.86, 0.94]
/** Spans, beside the distances between sharp turns. */
const HOPS = [0.06, 0.09, 0.13, 0.18, 0.26, 0.36, 0.5, 0.7, 1, 1.5]
/** Places to begin from. */
const BEGINNINGS = 4

interface Begun { cost: number, contact: number, hop: number, e: number, numbers: Float64Array }

export function beginBounce(series: Series, y: Float64Array): Float64Array[] {
  const stride = Math.ceil(series.n / MOST_LOOKED_AT)
  const x = series.x.filter((_, i) => i % stride === 0)
  const seen = y.filter((_, i) => i % stride === 0)
  const base = seen[0] as number
  const offsets = seen.map(value => value - base)
  const begun: Begun[] = []
  for (const way of [1, -1]) {
    const turns = sharpTurns(x, seen, way)
    // The hardest contact is the first one in the list; a bad drawing may look harder still.
    const firsts = [...new Set([...turns.slice(0, 3), Math.min(...turns)])].filter(Number.isFinite)
    for (const contact of firsts) {
      const hops = [...turns.map(other => other - contact).filter(hop => hop > 0), ...HOPS]
      for (const hop of hops) {
        let best: Begun | null = null
        for (const e of RESTITUTIONS) {
          const found = bestWith(x, offsets, contact, hop, e)
          if (way * (found.numbers[2] as number) > 0 && (!best || found.cost < best.cost)) best = found
        }
        if (best) begun.push(best)
      }
    }
  }
  begun.sort((p, q) => p.cost - q.cost)
  const chosen: Begun[] = []
  for (const one of begun) {
    if (chosen.length >= BEGINNINGS) break
    const near = chosen.some(({ contact, hop }) => Math.abs(contact - one.contact) < 1e-9 && Math.abs(Math.log(hop / one.hop)) < 0.1)
    if (!near) chosen.push(one)
  }
  if (chosen.length === 0) return [Float64Array.of(0.5, y[0] as number, 1, 0.5, 0.5)]
  return chosen.map(({ numbers }) => {
    numbers[1] = (numbers[1] as number) + base
    return numbers
  })
}

/**
 * Times between drawings at which the speed jumps the given way, sharpest first: where the lines through the two drawings on either side
 * cross. Of turns in neighbouring gaps the sharper one counts.
 */
function sharpTurns(x: Float64Array, y: Float64Array, way: number): number[] {
  const n = x.length
  const slope = (i: number) => ((y[i + 1] as number) - (y[i] as number)) / ((x[i + 1] as number) - (x[i] as number))
  const jumps = new Float64Array(n)
  for (let i = 1; i < n - 2; i++) jumps[i] = way * (slope(i + 1) - slope(i - 1))
  const turns: { at: number, jump: number }[] = []
  for (let i = 1; i < n - 2; i++) {
    const jump = jumps[i] as number
    if (!(jump > 0) || jump < (jumps[i - 1] as number) || jump < (jumps[i + 1] as number)) continue
    const left = x[i] as number
    const right = x[i + 1] as number
    const crossing = ((y[i] as number) - (y[i + 1] as number) + slope(i + 1) * right - slope(i - 1) * left) / (slope(i + 1) - slope(i - 1))
    turns.push({ at: Math.min(right, Math.max(left, crossing)), jump })
  }
  return turns.sort((p, q) => q.jump - p.jump).slice(0, SHARPEST).map(({ at }) => at)
}

/** Least squares over ground and acceleration for given contact, hop and restitution. */
function bestWith(x: Float64Array, offsets: Float64Array, contact: number, hop: number, e: number): Begun {
  const n = x.length
  let [w, ww, r, rw, rr] = [0, 0, 0, 0, 0]
  for (let i = 0; i < n; i++) {
    const after = (x[i] as number) - contact
    let weight = 0
    if (after < 0) {
      weight = -after * (hop / e + after) / 2
    } else {
      const k = hopsBy(after, hop, e)
      if (k < 60) {
        const s = after - contactAfter(k, hop, e)
        weight = s * (hop * e ** k - s) / 2
      }
    }
    const off = offsets[i] as number
    w += weight
    ww += weight * weight
    r += off
    rw += off * weight
    rr += off * off
  }
  const spread = n * ww - w * w
  const a = spread > 0 ? (n * rw - w * r) / spread : 0
  const ground = (r - a * w) / n
  const cost = rr - ground * r - a * rw
  return { cost: Number.isFinite(cost) ? cost : Infinity, contact, hop, e, numbers: Float64Array.of(contact, ground, a, hop, e) }
}
