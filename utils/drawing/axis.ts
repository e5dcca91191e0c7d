import { scaleLinear } from 'd3-scale'
import { textWidth } from '~/utils/drawing/labels'

/** Rulers of the curve and the gaps. */

const DEGREE_STEPS = [0.1, 0.2, 0.5, 1, 2, 5, 10, 15, 30, 45, 90, 180, 360, 720]
const FRAME_STEPS = [1, 2, 4, 6, 8, 12, 24, 48, 72, 96, 120, 240, 480, 720, 960, 1_200, 2_400, 4_800, 9_600]

/** Readings to rule the height by, so that about `count` lines fall on round figures; degrees go by the protractor's steps. */
export function readingTicks(low: number, high: number, count: number, unit: string): number[] {
  if (!(high > low)) return [low]
  const step = unit === 'deg' ? DEGREE_STEPS.find((one) => (high - low) / one <= count) : undefined
  if (!step) return scaleLinear().domain([low, high]).ticks(count)
  const ticks = []
  // Adding zero turns a minus zero into a plain one.
  for (let n = Math.ceil(low / step - 1e-9); n * step <= high + 1e-9; n++) ticks.push(Math.round(n * step * 10) / 10 + 0)
  return ticks
}

/** Decimals that the tick labels need. */
export function tickDecimals(ticks: readonly number[]): number {
  const step = ticks.length > 1 ? Math.abs(ticks[1]! - ticks[0]!) : 1
  return step >= 1 || step === 0 ? 0 : Math.min(6, Math.ceil(-Math.log10(step) - 1e-9))
}

/** Room at both ends so that no dot sits on the edge; zero is kept in sight where the list starts near it. */
export function paddedRange(values: readonly number[]): [number, number] {
  const finite = values.filter(Number.isFinite)
  if (finite.length === 0) return [0, 1]
  let low = Math.min(...finite)
  let high = Math.max(...finite)
  if (low === high) return [low - 1, high + 1]
  const pad = (high - low) * 0.05
  if (low > 0 && low < (high - low) * 0.3) low = 0
  else if (low !== 0) low -= pad
  if (high < 0 && -high < (high - low) * 0.3) high = 0
  else if (high !== 0) high += pad
  return [low, high]
}

/** Frames to number along a ruler of `width` pixels: from the first by even steps, and the last where it has room. */
export function frameTicks(first: number, last: number, width: number): number[] {
  const room = Math.max(textWidth(String(first)), textWidth(String(last))) + 18
  const most = Math.max(1, Math.floor(width / room))
  const span = last - first
  const step = FRAME_STEPS.find((one) => span / one <= most) ?? Math.ceil(span / most / 1_000) * 1_000
  const ticks = []
  for (let frame = first; frame <= last; frame += step) ticks.push(frame)
  if (span > 0 && ticks.at(-1) !== last) {
    // The last frame is worth more than its neighbour.
    if (((last - ticks.at(-1)!) / span) * width < room && ticks.length > 1) ticks.pop()
    ticks.push(last)
  }
  return ticks
}

/** Position of the item nearest to `wanted` in a rising list; -1 for an empty one. */
export function nearest(rising: readonly number[], wanted: number): number {
  let low = 0
  let high = rising.length - 1
  if (high < 0) return -1
  while (high - low > 1) {
    const middle = (low + high) >> 1
    if (rising[middle]! <= wanted) low = middle
    else high = middle
  }
  return Math.abs(rising[high]! - wanted) < Math.abs(rising[low]! - wanted) ? high : low
}
