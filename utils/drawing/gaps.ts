import { scaleLinear } from 'd3-scale'
import { runsOf } from '~/utils/drawing/passes'
import type { Point } from '~/utils/drawing/strokes'
import { barsPath, crossesPath, px } from '~/utils/drawing/strokes'
import type { JudgedKey } from '~/utils/motion/types'

/** Posted gaps beside the law's: a pair of bars per drawing, or per handful of drawings where there are many. */

export type GapKey = Pick<JudgedKey, 'frame' | 'gap' | 'lawGap' | 'allowance' | 'breaks'>

export interface Gap {
  /** Frames that the gap lies between. */
  from: number
  to: number
  posted: number
  law: number | null
  broken: boolean
}
export interface GapsDrawing {
  posted: string
  law: string
  broken: string
  crosses: string
  zero: number
  low: number
  high: number
  y: (gap: number) => number
  /** How many drawings one pair stands for. */
  each: number
}

const PAIR = 6
const WIDEST = 14

/** Gaps of a list. One is broken where a drawing at either end breaks and the gap itself is off by more than is allowed there. */
export function gapsOf(keys: readonly GapKey[]): Gap[] {
  return keys.slice(0, -1).flatMap((key, i) => {
    const next = keys[i + 1]!
    if (key.gap === null) return []
    const allowed = Math.max(key.allowance ?? 0, next.allowance ?? 0)
    const off = key.lawGap === null ? 0 : Math.abs(key.gap - key.lawGap)
    return [{ from: key.frame, to: next.frame, posted: key.gap, law: key.lawGap, broken: (key.breaks || next.breaks) && off > allowed }]
  })
}

/** Thins to one gap per handful: the one furthest off, so that a fault never disappears. */
export function thinGaps(gaps: readonly Gap[], each: number): Gap[] {
  if (each <= 1) return [...gaps]
  const kept: Gap[] = []
  for (let start = 0; start < gaps.length; start += each) {
    const handful = gaps.slice(start, start + each)
    const off = (gap: Gap) => (gap.broken ? 1e9 : 0) + Math.abs(gap.posted - (gap.law ?? gap.posted))
    kept.push(handful.reduce((worst, gap) => (off(gap) > off(worst) ? gap : worst)))
  }
  return kept
}

/** Bars between `top` and `bottom` pixels; `x` places a frame. */
export function drawGaps(keys: readonly GapKey[], x: (frame: number) => number, width: number, top: number, bottom: number): GapsDrawing {
  const all = gapsOf(keys)
  const each = Math.max(1, Math.ceil((all.length * PAIR) / Math.max(width, 1)))
  const shown = thinGaps(all, each)
  const values = shown.flatMap(({ posted, law }) => (law === null ? [posted] : [posted, law]))
  const low = Math.min(0, ...values)
  const high = Math.max(0, ...values)
  const y = scaleLinear()
    .domain(low === high ? [0, 1] : [low, high])
    .range([bottom, top])
  const zero = y(0)
  const bars = shown.map((gap, i) => {
    const middle = x((gap.from + gap.to) / 2)
    const neighbour = shown[i + 1] ?? shown[i - 1]
    const apart = neighbour ? Math.abs(x((neighbour.from + neighbour.to) / 2) - middle) : WIDEST * 3
    const bar = Math.max(1.5, Math.min(WIDEST, apart * 0.36))
    return { gap, middle, bar }
  })
  const column = (at: number, width: number, value: number) => ({ x: at, y: zero, width, height: y(value) - zero })
  const postedBar = ({ gap, middle, bar }: (typeof bars)[number]) => column(middle + 0.5, bar, gap.posted)
  const crosses: Point[] = bars
    .filter(({ gap }) => gap.broken)
    .map(({ gap, middle, bar }) => ({ x: middle + 0.5 + bar / 2, y: Math.min(y(Math.max(gap.posted, 0)), zero) - 8 }))
  return {
    law: barsPath(bars.filter(({ gap }) => gap.law !== null).map(({ gap, middle, bar }) => column(middle - bar - 0.5, bar, gap.law!))),
    posted: barsPath(bars.filter(({ gap }) => !gap.broken).map(postedBar)),
    broken: barsPath(bars.filter(({ gap }) => gap.broken).map(postedBar)),
    crosses: crossesPath(crosses, 3.5),
    zero,
    low,
    high,
    y,
    each,
  }
}

/** Upright stripes over the runs of drawings that break, from half-way before to half-way after. */
export function brokenRunsPath(keys: readonly GapKey[], x: (frame: number) => number, top: number, bottom: number): string {
  return runsOf(keys, (key) => key.breaks)
    .map(([first, last]) => {
      const before = keys[first - 1]?.frame ?? keys[first]!.frame
      const after = keys[last + 1]?.frame ?? keys[last]!.frame
      const from = x((before + keys[first]!.frame) / 2)
      const to = x((after + keys[last]!.frame) / 2)
      return `M${px(from)} ${px(top)}H${px(Math.max(to, from + 2))}V${px(bottom)}H${px(from)}Z`
    })
    .join('')
}
