import { px } from '~/utils/drawing/strokes'
import type { Point } from '~/utils/drawing/strokes'
import type { FoundPath, Place } from '~/utils/motion/types'

/** The path that points run along, as a line on paper. `to` turns drawing units into pixels. */

const SAMPLES = 64

/** How far along a line beyond the drawings it is shown, as a share of the way. */
const BEYOND = 0.04

/** `shown` are the drawings and the law's places: the path is drawn as far as they go. */
export function pathShape(path: FoundPath | null | undefined, shown: readonly Place[], to: (place: Place) => Point): string {
  if (shown.length === 0) return ''
  if (path?.kind === 'line') return joined(lineAlong(path, shown).map(to))
  if (path?.kind === 'circle') return joined(arcAlong(path, shown).map(to))
  if (path?.kind === 'parabola') {
    const xs = shown.map(({ x }) => x)
    const [low, high] = [Math.min(...xs), Math.max(...xs)]
    const at = (i: number) => low + ((high - low) * i) / SAMPLES
    return joined(Array.from({ length: SAMPLES + 1 }, (_, i) => to({ x: at(i), y: path.apex.y + path.bend * (at(i) - path.apex.x) ** 2 })))
  }
  return joined(shown.map(to))
}

const joined = (points: readonly Point[]) => points.map(({ x, y }, i) => `${i === 0 ? 'M' : 'L'}${px(x)} ${px(y)}`).join('')

function lineAlong({ from, to }: Extract<FoundPath, { kind: 'line' }>, shown: readonly Place[]): Place[] {
  const [dx, dy] = [to.x - from.x, to.y - from.y]
  const long = Math.hypot(dx, dy)
  if (!(long > 0)) return [...shown]
  const along = shown.map(({ x, y }) => ((x - from.x) * dx + (y - from.y) * dy) / long ** 2)
  const [low, high] = [Math.min(...along), Math.max(...along)]
  const more = (high - low) * BEYOND
  return [low - more, high + more].map((share) => ({ x: from.x + dx * share, y: from.y + dy * share }))
}

/** The part of the circle that the drawings take up; all of it where they go round. */
function arcAlong({ centre, radius }: Extract<FoundPath, { kind: 'circle' }>, shown: readonly Place[]): Place[] {
  const angles = shown.map(({ x, y }) => Math.atan2(y - centre.y, x - centre.x)).sort((a, b) => a - b)
  // The widest stretch without a drawing is what is left out.
  let [widest, start] = [-1, 0]
  angles.forEach((angle, i) => {
    const next = i + 1 < angles.length ? angles[i + 1]! : angles[0]! + 2 * Math.PI
    if (next - angle > widest) [widest, start] = [next - angle, next]
  })
  const span = 2 * Math.PI - widest
  const whole = widest < Math.PI / 3
  const [from, sweep] = whole ? [0, 2 * Math.PI] : [start - span * BEYOND, span * (1 + 2 * BEYOND)]
  return Array.from({ length: SAMPLES + 1 }, (_, i) => {
    const angle = from + (sweep * i) / SAMPLES
    return { x: centre.x + radius * Math.cos(angle), y: centre.y + radius * Math.sin(angle) }
  })
}
