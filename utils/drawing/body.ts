import type { Subject } from '~/utils/motion/types'
import type { ArcTrack } from '~/utils/drawing/track'
import { circlePath } from '~/utils/drawing/circle'
import type { Point } from '~/utils/drawing/strokes'
import { outlinePath, px } from '~/utils/drawing/strokes'

/** The body itself, in its true proportions, turned about its pivot. */

const ROD_WIDTH = 0.035
/** A pencil line is never thinner than this many pixels, whatever the body's proportions. */
const THINNEST = 5

/** Width over height of what is seen from the side, where the body stands on an edge. */
function slab(subject: Subject | undefined): { width: number; height: number } | null {
  if (!subject || !('shape' in subject)) return null
  if (subject.shape === 'block') return subject
  if (subject.shape === 'cylinder') return { width: 2 * subject.radius, height: subject.height }
  return null
}

/**
 * Outline of the body at an angle, reaching `length` pixels from the pivot. A block or a cylinder turns about the lower corner
 * on the side it falls to, and its angle is that of its centre, as motion.md counts the lean.
 */
export function bodyPath(subject: Subject | undefined, degrees: number, length: number, track: ArcTrack, falls: 1 | -1): string {
  const along = track.spot(degrees, 1)
  const way = { x: along.nx, y: along.ny }
  const side = { x: -way.y, y: way.x }
  const at = (out: number, across: number): Point => ({
    x: track.pivot.x + way.x * out + side.x * across,
    y: track.pivot.y + way.y * out + side.y * across,
  })
  const bar = (width: number, to = length) =>
    outlinePath([at(0, -width / 2), at(to, -width / 2), at(to, width / 2), at(0, width / 2)])

  const block = slab(subject)
  if (block) {
    // The far corner lies straight through the centre; the other two at either side of that line.
    const diagonal = Math.hypot(block.width, block.height)
    const scale = length / diagonal
    const thin = Math.max(block.width * scale, THINNEST) / scale
    const inward = (thin * block.height) / diagonal
    const lowAlong = (thin * thin) / diagonal
    const highAlong = (block.height * block.height) / diagonal
    return outlinePath([
      at(0, 0),
      at(highAlong * scale, inward * scale * falls),
      at(length, 0),
      at(lowAlong * scale, -inward * scale * falls),
    ])
  }
  if (subject && 'shape' in subject) {
    if (subject.shape === 'pole') {
      const top = Math.max(subject.height, subject.headHeight)
      const head = Math.max(6, length * 0.06)
      const reach = length - head
      return bar(THINNEST, (reach * subject.height) / top) + circlePath(at((reach * subject.headHeight) / top, 0), head)
    }
    if (subject.shape === 'bob') return bobPath(at, length)
    if (subject.shape === 'custom' && track.hangs) return bobPath(at, length)
  } else if (track.hangs) return bobPath(at, length)
  return bar(Math.max(THINNEST, length * ROD_WIDTH))
}

/** A light cord and a bob at its end. */
function bobPath(at: (out: number, across: number) => Point, length: number): string {
  const bob = Math.max(6, length * 0.06)
  const end = at(length - 2 * bob, 0)
  const start = at(0, 0)
  return `M${px(start.x)} ${px(start.y)}L${px(end.x)} ${px(end.y)}${circlePath(at(length - bob, 0), bob)}`
}
