/** How a size with its interval is written, wherever it is written. */
import type { SizeReading } from './types'

/** More telling digits than this nobody can draw. */
const TELLING = 4
/** Ends further away than this factor, both, say only that the list hardly tells. */
const ANYTHING = 10
/** Lengths below this are said in centimetres. */
const SMALL = 0.0995

export interface SizeWords {
  /** "8.2 m", "4.6 cm", "81 px/m": as many decimals as the interval warrants. */
  value: string
  /** "7.8–8.6"; null where both ends would read the same. */
  interval: string | null
}

/**
 * A size in words: value and both ends with the same decimals, just enough to keep the ends apart, four telling digits at most. Where
 * even those don't, there is no interval to speak of, and trailing noughts go.
 */
export function sizeWords({ value, low, high, unit }: SizeReading): SizeWords {
  const small = unit === 'm' && value < SMALL
  const of = small ? 100 : 1
  const sign = small ? 'cm' : unit
  const most = Math.max(0, TELLING - 1 - Math.floor(Math.log10(Math.max(value * of, 1e-12))))
  const decimals = Math.min(most, placesFor((high - low) * of))
  const written = (size: number) => (size * of).toFixed(decimals)
  const plain = `${Number(written(value))} ${sign}`
  if (written(low) === written(high)) return { value: plain, interval: null }
  if (high > ANYTHING * value && low < value / ANYTHING) return { value: `${figure(value * of, 2)} ${sign}`, interval: 'from under a tenth to over ten times that' }
  return { value: `${written(value)} ${sign}`, interval: low > 0 ? `${written(low)}–${written(high)}` : `up to ${written(high)}` }
}

/** "8.2 m (7.8–8.6)". */
export function sizeWithInterval(size: SizeReading): string {
  const { value, interval } = sizeWords(size)
  return interval === null ? value : `${value} (${interval})`
}

/** A size that was claimed, as it was typed: "38 m", "5 cm". */
export function claimedWords(value: number, unit: string): string {
  return unit === 'm' && value < SMALL ? `${figure(value * 100, TELLING)} cm` : `${figure(value, TELLING)} ${unit}`
}

const figure = (value: number, digits: number) => String(Number(value.toPrecision(digits)))

/** Decimal places that show an interval of this width as an interval: none for metres of doubt. */
function placesFor(width: number): number {
  return width > 0 ? Math.max(0, Math.ceil(-Math.log10(width / 2))) : TELLING
}
