import type { Claim } from '~/utils/contracts/production'
import type { Point, Spot } from '~/utils/drawing/strokes'
import { px } from '~/utils/drawing/strokes'

/** The path of action on paper: where a reading lies, and which side is the posted one. */

export interface Margins {
  top: number
  right: number
  bottom: number
  left: number
}
export interface Size {
  width: number
  height: number
}

/** Degrees that a reading stands for, or null where the list measures a straight way. */
export function degreesOf(claim: Pick<Claim, 'measure' | 'radius' | 'zeroAt'>, reading: number): number | null {
  const zero = claim.zeroAt ?? 0
  if (claim.measure === 'angle') return zero + reading
  if (claim.measure === 'arc' && claim.radius) return zero + ((reading / claim.radius) * 180) / Math.PI
  return null
}

/** True where the readings say how far something has turned about a pivot. */
export const turns = (claim: Pick<Claim, 'measure'>) => claim.measure === 'angle' || claim.measure === 'arc'

/** Laws of what hangs; whatever else turns is counted from upright. */
export const hangs = (claim: Pick<Claim, 'law'>) => claim.law === 'pendulum' || claim.law === 'swing-decay'

/** Laws of what stands and goes over: drawn on its ground, from upright on. */
export const stands = (claim: Pick<Claim, 'law'>) => claim.law === 'topple' || claim.law === 'over-edge'

export interface LineTrack {
  kind: 'line'
  /** Where a reading lies on a lane's line, whose height is `y`. Posted side up. */
  spot: (reading: number, y: number) => Spot
  x: (reading: number) => number
  from: number
  to: number
}

/** A straight way drawn level, smallest reading at the left. A list that never moves sits in the middle. */
export function lineTrack(readings: readonly number[], width: number, inset: number): LineTrack {
  const low = Math.min(...readings)
  const high = Math.max(...readings)
  const room = Math.max(1, width - 2 * inset)
  const x = (reading: number) => (high > low ? inset + ((reading - low) / (high - low)) * room : width / 2)
  return { kind: 'line', x, spot: (reading, y) => ({ x: x(reading), y, nx: 0, ny: -1 }), from: inset, to: inset + room }
}

export interface ArcTrack {
  kind: 'arc'
  pivot: Point
  /** Pixels from the pivot to the outermost lane. */
  radius: number
  /** Where an angle lies at a distance from the pivot. Posted side outwards. */
  spot: (degrees: number, radius: number) => Spot
  /** The arc itself between two angles. */
  path: (fromDegrees: number, toDegrees: number, radius: number) => string
  hangs: boolean
}

/** Direction of an angle: a topple counts from upright, a pendulum from hanging; both grow to the right. */
export function direction(degrees: number, hangs: boolean): Point {
  const angle = (degrees * Math.PI) / 180
  return { x: Math.sin(angle), y: hangs ? Math.cos(angle) : -Math.cos(angle) }
}

/** The part of the unit circle between two angles, with its pivot, as a box: [left, top, right, bottom]. */
export function reach(from: number, to: number, hangs: boolean): [number, number, number, number] {
  const points: Point[] = [{ x: 0, y: 0 }, direction(from, hangs), direction(to, hangs)]
  for (let quarter = Math.ceil(from / 90) * 90; quarter <= to && quarter < from + 450; quarter += 90)
    points.push(direction(quarter, hangs))
  const xs = points.map(({ x }) => x)
  const ys = points.map(({ y }) => y)
  return [Math.min(...xs), Math.min(...ys), Math.max(...xs), Math.max(...ys)]
}

/**
 * The largest true arc from `from` to `to` degrees that fits with its pivot into `size` less `margins`, in the middle.
 * `aside` asks for room beside the pivot, in radii: a standing body leans on nothing there but takes it up.
 */
export function arcTrack(
  from: number,
  to: number,
  hangs: boolean,
  size: Size,
  margins: Margins,
  aside: { left?: number; right?: number } = {},
): ArcTrack {
  const [arcLeft, top, arcRight, bottom] = reach(from, to, hangs)
  const left = Math.min(arcLeft, -(aside.left ?? 0))
  const right = Math.max(arcRight, aside.right ?? 0)
  const roomX = Math.max(20, size.width - margins.left - margins.right)
  const roomY = Math.max(20, size.height - margins.top - margins.bottom)
  const radius = Math.max(
    10,
    Math.min(roomX / Math.max(right - left, 0.01), roomY / Math.max(bottom - top, 0.01)),
  )
  const pivot = {
    x: margins.left + roomX / 2 - ((left + right) / 2) * radius,
    y: margins.top + roomY / 2 - ((top + bottom) / 2) * radius,
  }
  return trackAt(pivot, radius, hangs)
}

/** An arc about a pivot, both in pixels. */
export function trackAt(pivot: Point, radius: number, hangs: boolean): ArcTrack {
  const spot = (degrees: number, at: number): Spot => {
    const way = direction(degrees, hangs)
    return { x: pivot.x + way.x * at, y: pivot.y + way.y * at, nx: way.x, ny: way.y }
  }
  const path = (fromDegrees: number, toDegrees: number, at: number) => {
    // Whole turns in two halves: SVG draws nothing from a point to itself.
    const span = Math.min(Math.abs(toDegrees - fromDegrees), 360)
    const pieces = Math.max(1, Math.ceil(span / 170))
    const step = (Math.sign(toDegrees - fromDegrees) * span) / pieces
    const sweep = step > 0 !== hangs ? 1 : 0
    const ends = Array.from({ length: pieces + 1 }, (_, i) => spot(fromDegrees + i * step, at))
    return ends.map((end, i) => (i === 0 ? 'M' : `A${px(at)} ${px(at)} 0 0 ${sweep} `) + `${px(end.x)} ${px(end.y)}`).join('')
  }
  return { kind: 'arc', pivot, radius, spot, path, hangs }
}
