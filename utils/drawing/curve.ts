import { scaleLinear } from 'd3-scale'
import { area, curveMonotoneX, line } from 'd3-shape'
import { paddedRange } from '~/utils/drawing/axis'
import type { Point } from '~/utils/drawing/strokes'
import { crossesPath, dotsPath, keepApart, px } from '~/utils/drawing/strokes'
import type { JudgedKey } from '~/utils/motion/types'

/** Reading against frame: what was posted, the law through it, and the band that nobody would notice. */

export type CurveKey = Pick<JudgedKey, 'frame' | 'reading' | 'law' | 'allowance' | 'breaks'>

export interface CurveDrawing {
  dots: string
  law: string
  band: string
  crosses: string
  /** Hairs from each broken drawing to the line it should sit on. */
  strays: string
  low: number
  high: number
  y: (reading: number) => number
  /** Diameter of a posted dot: smaller where they crowd. */
  dot: number
}

type Lawful = CurveKey & { law: number }

/** Draws the curve between `top` and `bottom` pixels; `x` places a frame. */
export function drawCurve(keys: readonly CurveKey[], x: (frame: number) => number, top: number, bottom: number): CurveDrawing {
  const [low, high] = paddedRange(keys.flatMap(({ reading, law }) => (law === null ? [reading] : [reading, law])))
  const y = scaleLinear().domain([low, high]).range([bottom, top])
  const lawful = keys.filter((key): key is Lawful => key.law !== null)
  const at = (key: CurveKey): Point => ({ x: x(key.frame), y: y(key.reading) })
  const inside = (value: number) => Math.min(Math.max(y(value), top), bottom)
  const lawLine = line<Lawful>()
    .x((key) => x(key.frame))
    .y((key) => y(key.law))
    .curve(curveMonotoneX)
    .digits(1)
  const bandShape = area<Lawful>()
    .x((key) => x(key.frame))
    .y0((key) => inside(key.law - (key.allowance ?? 0)))
    .y1((key) => inside(key.law + (key.allowance ?? 0)))
    .curve(curveMonotoneX)
    .digits(1)
  const broken = keys.filter((key) => key.breaks)
  const apart = keys.length > 1 ? (x(keys.at(-1)!.frame) - x(keys[0]!.frame)) / (keys.length - 1) : 20
  return {
    dots: dotsPath(keys.filter((key) => !key.breaks).map(at)),
    law: lawLine(lawful) ?? '',
    band: bandShape(lawful) ?? '',
    crosses: crossesPath(keepApart(broken.map(at), 7), 4.5),
    strays: broken
      .filter((key): key is Lawful => key.law !== null)
      .map((key) => `M${px(x(key.frame))} ${px(y(key.reading))}V${px(y(key.law))}`)
      .join(''),
    low,
    high,
    y,
    dot: Math.max(2.5, Math.min(6, apart * 0.8)),
  }
}
