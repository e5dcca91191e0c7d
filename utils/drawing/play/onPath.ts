import { circlePath } from '~/utils/drawing/circle'
import { pathShape } from '~/utils/drawing/pathShape'
import type { PlayedList } from '~/utils/drawing/play/lists'
import type { Actor, PlayedAnswer, PlayedClaim } from '~/utils/drawing/play/stage'
import { px } from '~/utils/drawing/strokes'
import type { Point } from '~/utils/drawing/strokes'
import type { Place } from '~/utils/motion/types'

/** A point on its path, where the drawing has it. */

const DOT = 6

export function pathActor({ path, spans }: PlayedAnswer, claim: PlayedClaim, lists: readonly PlayedList[]): Actor {
  const up = claim.yAxis === 'up'
  const all = lists.flatMap(({ points }) => points?.filter((one) => one !== null) ?? [])
  const pivot = path?.kind === 'circle' && !path.nearlyStraight ? path.centre : null
  const shown = pivot ? [...all, pivot] : all
  const xs = shown.map(({ x }) => x)
  const ys = shown.map(({ y }) => (up ? -y : y))
  const [left, top] = [Math.min(...xs), Math.min(...ys)]
  return {
    reach: { left: 0, right: Math.max(...xs) - left, up: 0, down: Math.max(...ys) - top },
    draw: (anchor, scale) => {
      const to = ({ x, y }: Place): Point => ({ x: anchor.x + (x - left) * scale, y: anchor.y + ((up ? -y : y) - top) * scale })
      const centre = pivot && to(pivot)
      // The law's own places lie on the path in order; a path of one kind is drawn as what it is.
      const places = (lists[1] ?? lists[0])?.points?.filter((one) => one !== null) ?? []
      return {
        path: pathShape(spans ? null : path, places, to) + (centre ? circlePath(centre, 2.5) : ''),
        pose: (which, index) => {
          const place = lists[which]?.points?.[index]
          if (!place) return ''
          const at = to(place)
          const cord = centre ? `M${px(centre.x)} ${px(centre.y)}L${px(at.x)} ${px(at.y)}` : ''
          return cord + circlePath(at, DOT)
        },
      }
    },
  }
}
