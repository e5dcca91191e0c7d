/**
 * Free flights between contacts that give back the same share e of the speed each time: every hop lasts e times as long as the one
 * before it and rises e² times as high (Newton's law of restitution; any mechanics textbook).
 */
import type { Series } from '../series'
import { beginBounce } from './bounceStart'
import { hopsBy } from './hops'
import type { LawModel, Trace } from './model'

const LEAST_RESTITUTION = 0.02
const MOST_RESTITUTION = 0.995
/** Spans that the first hop may last, from too short to be drawn to far beyond the list. */
const SHORTEST_HOP = 1e-4
const LONGEST_HOP = 50

/**
 * Numbers: time of the first contact in the list, spans; the ground's reading; a, readings per span², positive where up is the positive
 * way; spans that the hop after the first contact lasts; e. With s from the hop's own contact and T its length: r = ground + ½a·s·(T − s).
 * Before the first contact the hop that ends there, T/e long, is carried on backwards.
 */
export const bounce: LawModel = {
  law: 'bounce',
  size: 5,
  linear: false,
  kinked: true,
  trace(_series: Series, numbers: Float64Array, x: Float64Array, withColumns: boolean): Trace {
    const [contact = 0, ground = 0, a = 0, hop = 1, e = 0.5] = numbers
    const n = x.length
    const value = new Float64Array(n).fill(ground)
    const rate = new Float64Array(n)
    const byContact = new Float64Array(n)
    const byA = new Float64Array(n)
    const byHop = new Float64Array(n)
    const byE = new Float64Array(n)
    for (let i = 0; i < n; i++) {
      const after = (x[i] as number) - contact
      const k = after < 0 ? -1 : hopsBy(after, hop, e)
      if (k === Infinity) continue
      if (k < 0) {
        const length = hop / e
        const left = -after
        byA[i] = left * (length - left) / 2
        rate[i] = -a * (length - 2 * left) / 2
        byHop[i] = a * left / (2 * e)
        byE[i] = -a * left * length / (2 * e)
      } else {
        const shrunk = e ** k
        const done = (1 - shrunk) / (1 - e)
        const length = hop * shrunk
        const s = after - hop * done
        byA[i] = s * (length - s) / 2
        const slope = a * (length - 2 * s) / 2
        rate[i] = slope
        byHop[i] = a * s * shrunk / 2 - slope * done
        // d done / de: the sum 1 + e + … + e^(k−1) by its quotient.
        byE[i] = a * s * hop * k * shrunk / (2 * e) - slope * hop * (done - k * shrunk / e) / (1 - e)
      }
      value[i] = ground + a * (byA[i] as number)
      byContact[i] = -(rate[i] as number)
    }
    return { value, rate, columns: withColumns ? [byContact, new Float64Array(n).fill(1), byA, byHop, byE] : [] }
  },
  confine(_series, numbers) {
    numbers[0] = Math.min(1, Math.max(0, numbers[0] as number))
    numbers[3] = Math.min(LONGEST_HOP, Math.max(SHORTEST_HOP, numbers[3] as number))
    numbers[4] = Math.min(MOST_RESTITUTION, Math.max(LEAST_RESTITUTION, numbers[4] as number))
  },
  later: ([contact = 0, ...rest]: Float64Array, by) => Float64Array.of(contact + by, ...rest),
  fromStart(numbers) {
    const [, ground = 0, a = 0, , e = 0.5] = numbers
    let [contact = 0, , , hop = 1] = numbers
    for (let before = contact - hop / e; before > 0 && hop < LONGEST_HOP; before = contact - hop / e) {
      contact = before
      hop /= e
    }
    return Float64Array.of(contact, ground, a, hop, e)
  },
  begin: beginBounce,
}
