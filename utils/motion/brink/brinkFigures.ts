/** What the timing of a body over a brink reads as: its size, and where it lets go. */
import { bodyScale, uncertainty } from '../size'
import type { Scale } from '../size'
import { slopes } from '../release'
import { RADIAN } from '../series'
import type { Figure, PointCheck } from '../types'
import type { BrinkLine } from './brinkLine'
import { LOG, releaseOfBrink } from './brinkModel'
import type { BrinkStory, Tipped } from './brinkStories'

/** Coordinates that a story's fit counts. */
const kept = ({ sheet }: Tipped, { out }: BrinkStory) => 2 * (sheet.n - out.length)

/** The size by k² = g/L, as of a topple. */
export function brinkScale({ subject }: PointCheck, tipped: Tipped, story: BrinkStory): Scale {
  return bodyScale('over-edge', subject, tipped.series, story.fit, kept(tipped, story), tipped.care.least)
}

/** Angle and frame of leaving as drawn, where that lies within the list. */
export function brinkFigures(request: PointCheck, tipped: Tipped, { model, fit, ...story }: BrinkStory, line: BrinkLine): Figure[] {
  if (!(line.drawn > line.lag && line.drawn < 1)) return []
  const { series, care } = tipped
  const release = (numbers: Float64Array) => releaseOfBrink(model.all(numbers), series.edgeRatio, model.letting)
  const figure = (kind: Figure['kind'], unit: string, value: (numbers: Float64Array) => number): Figure => {
    const at = value(fit.numbers)
    const half = Math.min(Number.MAX_SAFE_INTEGER, uncertainty(fit, slopes(fit.numbers, value), kept(tipped, { model, fit, ...story }), care.least))
    return { kind, value: at, low: at - half, high: at + half, unit }
  }
  const first = request.keys[0]?.frame ?? 0
  return [
    figure('release-angle', 'deg', numbers => Math.abs(release(numbers).angle) / RADIAN),
    figure('release', 'frame', numbers => first + (line.lag + release(numbers).tau / Math.exp(model.all(numbers)[LOG] as number)) * series.spanFrames),
  ]
}
