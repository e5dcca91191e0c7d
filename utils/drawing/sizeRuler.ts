import { scaleLog } from 'd3-scale'
import { placeLabels, spreadRow, textWidth } from '~/utils/drawing/labels'
import type { Placed } from '~/utils/drawing/labels'
import { landmarks, pulls } from '~/utils/drawing/landmarks'
import { sizeWithInterval } from '~/utils/motion/sizeWords'
import { metres, roundFigure, sizeFigure } from '~/utils/drawing/words'
import type { SizeReading } from '~/utils/motion/types'

/** What size the timing reads as, on a ruler where each step is a multiple. */

export interface SizeRuler {
  x: (size: number) => number
  ticks: { at: number; tall: boolean }[]
  names: (Placed<number> & { mark: number; outline: string })[]
  reads: { at: number; from: number; to: number; labelAt: number; text: string }
  claimed: { at: number; labelAt: number; text: string } | null
  /** Between what it reads as and what was claimed: how many times too small or too large. Null where they are close. */
  apart: { from: number; to: number; at: number; text: string } | null
}

/** Baselines: sizes over the ruler, how far they lie apart just over it, and the landmarks' names under it. */
export const RULER = { sizes: 13, apart: 30, line: 44, names: 82, height: 88 } as const

function rangeOf(values: number[], unit: string): [number, number] {
  const low = Math.min(...values)
  const high = Math.max(...values)
  // Metres keep the same ruler from take to take, unless something lies beyond it.
  if (unit === 'm') return [Math.min(0.05, low / 1.5), Math.max(100, high * 1.5)]
  if (unit === 'm/s²') return [Math.min(1, low / 1.5), Math.max(40, high * 1.5)]
  return [low / 4, high * 4]
}

/** Lays the ruler over `width` pixels; `claimed` in the unit of `size`. */
export function sizeRuler(size: SizeReading, claimed: number | null, width: number): SizeRuler {
  const inset = 10
  const values = [size.value, size.low, size.high, ...(claimed === null ? [] : [claimed])].filter((value) => value > 0)
  const [low, high] = rangeOf(values, size.unit)
  const x = scaleLog()
    .domain([low, high])
    .range([inset, width - inset])
    .clamp(true)
  const decades = []
  for (let power = Math.ceil(Math.log10(low) - 1e-9); power <= Math.log10(high) + 1e-9; power++) decades.push(10 ** power)
  const known = size.unit === 'm' ? landmarks : size.unit === 'm/s²' ? pulls : null
  const marks = known
    ? known.filter((one) => one.size >= low * 0.999 && one.size <= high * 1.001)
    : decades.map((at) => ({ size: at, name: sizeFigure(at, size.unit), outline: '' }))
  const bounds = { x: 0, y: 0, width, height: 100 }
  const names = placeLabels(
    marks.map(({ size: at, name }) => {
      const half = textWidth(name) / 2
      return { item: at, text: name, places: [{ x: Math.min(Math.max(x(at), half + 1), width - half - 1), y: RULER.names, anchor: 'middle' as const }] }
    }),
    bounds,
    [],
    { gap: 10 },
  ).map((name) => ({ ...name, mark: x(name.item), outline: marks.find(({ size: at }) => at === name.item)?.outline ?? '' }))
  const claimedText = claimed === null ? '' : `claimed ${size.unit === 'm' ? metres(claimed, 3) : `${roundFigure(claimed, 3)} ${size.unit}`}`
  const whole = `reads ${sizeWithInterval(size)}`
  // Where both won't fit beside each other, the interval is left to the bar.
  const roomy = textWidth(whole, 12, true) + textWidth(claimedText, 12, true) + 12 <= width
  const readsText = roomy ? whole : `reads ${sizeFigure(size.value, size.unit)}`
  const row = [readsText, claimedText].filter(Boolean).map((text, i) => ({
    x: i === 0 ? x(size.value) : x(claimed!),
    width: textWidth(text, 12, true),
  }))
  const [readsAt, claimedAt] = spreadRow(row, 0, width)
  const tall = new Set(names.map(({ item }) => item))
  return {
    x,
    names,
    ticks: [...new Set([...decades, ...tall])].map((at) => ({ at: x(at), tall: tall.has(at) })),
    reads: { at: x(size.value), from: x(Math.max(size.low, low)), to: x(size.high), labelAt: readsAt!, text: readsText },
    claimed: claimed === null ? null : { at: x(claimed), labelAt: claimedAt!, text: claimedText },
    apart: claimed === null ? null : apartBetween(size.value, claimed, x, width),
  }
}

/** Nearer than this they lie on top of each other, and the interval tells more. */
const NEAR = 1.25

function apartBetween(reads: number, claimed: number, x: (size: number) => number, width: number): SizeRuler['apart'] {
  const times = Math.max(reads / claimed, claimed / reads)
  if (!(times > NEAR) || !Number.isFinite(times)) return null
  const text = `${roundFigure(times, 2)} times too ${reads < claimed ? 'small' : 'large'}`
  const [from, to] = [x(reads), x(claimed)]
  const half = textWidth(text, 12, true) / 2 + 1
  return { from, to, at: Math.min(Math.max((from + to) / 2, half), width - half), text }
}
