import { bodyPath } from '~/utils/drawing/body'
import { circlePath } from '~/utils/drawing/circle'
import { overTheEdge } from '~/utils/drawing/play/overTheEdge'
import type { PlayedList } from '~/utils/drawing/play/lists'
import type { Actor, PlayedAnswer, PlayedClaim, Reach } from '~/utils/drawing/play/stage'
import { besidePivot, shownArc } from '~/utils/drawing/stripArc'
import { px } from '~/utils/drawing/strokes'
import type { Point } from '~/utils/drawing/strokes'
import { degreesOf, direction, hangs, reach, stands, trackAt } from '~/utils/drawing/track'

/** A body that turns about its pivot, and leaves it where it goes over an edge. The unit of length is pivot to furthest point. */
export function turningActor(answer: PlayedAnswer, claim: PlayedClaim, lists: readonly PlayedList[]): Actor {
  const turned = lists.map(({ readings }) => readings.map((reading) => (reading === null ? null : degreesOf(claim, reading))))
  const all = turned.flatMap((list) => list.filter((one) => one !== null))
  const [low, high] = [Math.min(...all), Math.max(...all)]
  const falls = Math.abs(high) >= Math.abs(low) ? 1 : -1
  const swings = hangs(claim)
  const [from, to] = shownArc(low, high, claim, falls)
  const foot = overTheEdge(answer, claim, falls)
  return {
    reach: roomFor(from, to, claim, falls, foot ? turned.map((list) => list.map((angle, i) => angle !== null && tipAndFoot(angle, foot(i), swings))).flat() : []),
    draw: (pivot, scale) => {
      const track = trackAt(pivot, scale, swings)
      const arcTo = foot ? Math.min(to, 90) : to
      return {
        path: track.path(from, arcTo, scale) + groundPath(pivot, scale, claim, falls, foot !== null) + circlePath(pivot, 2.5),
        pose: (which, index) => {
          const angle = turned[which]?.[index]
          if (angle === null || angle === undefined) return ''
          const off = foot?.(index) ?? { x: 0, y: 0 }
          const at = trackAt({ x: pivot.x + off.x * scale, y: pivot.y + off.y * scale }, scale, swings)
          if (claim.subject && 'shape' in claim.subject && claim.subject.shape === 'custom') return dot(at.spot(angle, scale), at.pivot)
          return bodyPath(claim.subject, angle, scale, at, falls)
        },
      }
    },
  }
}

/** A body of which only the equal length is known: a dot at that length. */
const dot = (at: Point, pivot: Point) => `M${px(pivot.x)} ${px(pivot.y)}L${px(at.x)} ${px(at.y)}${circlePath(at, 6)}`

function tipAndFoot(angle: number, foot: Point, swings: boolean): Point[] {
  const way = direction(angle, swings)
  return [foot, { x: foot.x + way.x, y: foot.y + way.y }]
}

function roomFor(from: number, to: number, claim: PlayedClaim, falls: 1 | -1, spots: readonly (Point[] | false)[]): Reach {
  const [left, top, right, bottom] = reach(from, spots.length > 0 ? Math.min(to, 90) : to, hangs(claim))
  const beside = besidePivot(claim, falls)
  const points = spots.flatMap((one) => one || [])
  const xs = points.map(({ x }) => x)
  const ys = points.map(({ y }) => y)
  return {
    left: Math.max(-left, beside.left ?? 0, ...xs.map((x) => -x)),
    right: Math.max(right, beside.right ?? 0, ...xs),
    up: Math.max(-top, ...ys.map((y) => -y)),
    down: Math.max(bottom, ...ys),
  }
}

/** What it stands on, what it goes over, or what it hangs from. */
function groundPath(pivot: Point, scale: number, claim: PlayedClaim, falls: 1 | -1, brink: boolean): string {
  if (hangs(claim)) return `M${px(pivot.x - 14)} ${px(pivot.y)}h28`
  if (!stands(claim)) return ''
  const behind = pivot.x - falls * scale * 0.5
  if (brink) return `M${px(behind)} ${px(pivot.y)}H${px(pivot.x)}v${px(scale * 0.5)}`
  return `M${px(behind)} ${px(pivot.y)}H${px(pivot.x + falls * (scale + 8))}`
}
