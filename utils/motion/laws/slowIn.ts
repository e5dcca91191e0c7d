/** Constant slowing to a stop, and rest after it: r = rₛ − c·max(0, tₛ − t)²: the odd rule run backwards, with the stop in the list. */
import type { Series } from '../series'
import type { LawModel, Trace } from './model'

/** Stops that are tried at the start of a search. */
const TRIED = 24

/**
 * Numbers: the stop tₛ, spans; the reading rₛ there; c, readings per span² (half the slowing, signed with the travel). Linear in the
 * last two; continuous with its slope in the first.
 */
export const slowIn: LawModel = {
  law: 'slow-in',
  size: 3,
  linear: false,
  trace(_series: Series, numbers: Float64Array, x: Float64Array, withColumns: boolean): Trace {
    const [stop = 1, end = 0, c = 0] = numbers
    const n = x.length
    const value = new Float64Array(n)
    const rate = new Float64Array(n)
    const byStop = new Float64Array(n)
    const byC = new Float64Array(n)
    for (let i = 0; i < n; i++) {
      const left = Math.max(0, stop - (x[i] as number))
      value[i] = end - c * left * left
      rate[i] = 2 * c * left
      byStop[i] = -2 * c * left
      byC[i] = -left * left
    }
    return { value, rate, columns: withColumns ? [byStop, new Float64Array(n).fill(1), byC] : [] }
  },
  confine(series, numbers) {
    numbers[0] = Math.min(latest(series), Math.max(earliest(series), numbers[0] as number))
  },
  begin(series, y) {
    const from = earliest(series)
    const step = (latest(series) - from) / (TRIED - 1)
    const tried = Array.from({ length: TRIED }, (_, i) => bestWithStop(series, y, from + i * step))
    // Every stop that does better than its neighbours is a place to begin from; the two best of them are enough.
    return tried
      .filter(({ cost }, i) => cost <= (tried[i - 1]?.cost ?? Infinity) && cost <= (tried[i + 1]?.cost ?? Infinity))
      .sort((a, b) => a.cost - b.cost)
      .slice(0, 2)
      .map(({ numbers }) => numbers)
  },
}

/** Three drawings at least are under way, or there is no slowing to see. */
function earliest({ n, x }: Series): number {
  return x[Math.min(2, n - 1)] as number
}

/** A stop within the exposure of the last drawing is still a stop in the list. */
function latest({ n, x }: Series): number {
  const last = x[n - 1] as number
  return Math.max(1, last + last - (x[Math.max(0, n - 2)] as number))
}

/** Least squares over rₛ and c for one stop. */
function bestWithStop({ n, x }: Series, y: Float64Array, stop: number): { cost: number, numbers: Float64Array } {
  let [w, ww, r, rw, rr] = [0, 0, 0, 0, 0]
  for (let i = 0; i < n; i++) {
    const left = Math.max(0, stop - (x[i] as number))
    const weight = left * left
    const off = (y[i] as number) - (y[0] as number)
    w += weight
    ww += weight * weight
    r += off
    rw += off * weight
    rr += off * off
  }
  const spread = n * ww - w * w
  const c = spread > 0 ? (w * r - n * rw) / spread : 0
  const end = (r + c * w) / n
  const cost = rr - end * r + c * rw
  return { cost: Number.isFinite(cost) ? cost : Infinity, numbers: Float64Array.of(stop, end + (y[0] as number), c) }
}

/**
 * True where a list's last drawings move so little beside the rest that it may have come to a stop: a cheap look, so that lists which
 * plainly don't are spared the fit.
 */
export function mayStop({ n, x, y }: Series): boolean {
  if (n < 5) return false
  const pace = (from: number, to: number) => Math.abs((y[to] as number) - (y[from] as number)) / ((x[to] as number) - (x[from] as number))
  let fastest = 0
  for (let i = 2; i < n; i++) fastest = Math.max(fastest, pace(i - 2, i))
  return pace(n - 3, n - 1) < 0.25 * fastest
}
