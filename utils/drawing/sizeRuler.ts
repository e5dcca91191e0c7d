import { scaleLog } from 'd3-scale'
import { placeLabels, spreadRow, textWidth } from '~/utils/drawing/labels'
import type { Placed } from '~/utils/drawing/labels'
import { metres, roundFigure, sizeFigure } from '~/utils/drawing/words'
import type { SizeReading } from '~/utils/motion/types'

/** What size the timing reads as, on a ruler where each step is a multiple. */

export interface SizeRuler {
  x: (size: number) => number
  ticks: { at: number; tall: boolean }[]
  names: Placed<number>[]
  reads: { at: number; from: number; to: number; labelAt: number; text: string }
  claimed: { at: number; labelAt: number; text: string } | null
}

/** Sizes that everyone has stood beside, the most useful first. */
const LANDMARKS: [number, string][] = [
  [0.05, 'matchbox 5 cm'],
  [100, 'tower 100 m'],
  [1.7, 'person'],
  [10, 'house 10 m'],
  [0.45, 'chair'],
  [1_000, '1 km'],
  [0.001, '1 mm'],
]

function rangeOf(values: number[], unit: string): [number, number] {
  const low = Math.min(...values)
  const high = Math.max(...values)
  // Metres keep the same ruler from take to take, unless something lies beyond it.
  if (unit === 'm') return [Math.min(0.05, low / 1.5), Math.max(100, high * 1.5)]
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
  const landmarks: [number, string][] =
    size.unit === 'm'
      ? LANDMARKS.filter(([at]) => at >= low * 0.999 && at <= high * 1.001)
      : decades.map((at) => [at, sizeFigure(at, size.unit)])
  const bounds = { x: 0, y: 0, width, height: 100 }
  const names = placeLabels(
    landmarks.map(([at, text]) => {
      const half = textWidth(text) / 2
      return { item: at, text, places: [{ x: Math.min(Math.max(x(at), half + 1), width - half - 1), y: 52, anchor: 'middle' as const }] }
    }),
    bounds,
    [],
    { gap: 10 },
  )
  const readsText = `reads ${sizeFigure(size.value, size.unit)}`
  const claimedText = claimed === null ? '' : `claimed ${size.unit === 'm' ? metres(claimed, 3) : `${roundFigure(claimed, 3)} ${size.unit}`}`
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
  }
}
