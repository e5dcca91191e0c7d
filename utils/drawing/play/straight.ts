import { circlePath } from '~/utils/drawing/circle'
import type { PlayedList } from '~/utils/drawing/play/lists'
import type { Actor, PlayedAnswer, PlayedClaim } from '~/utils/drawing/play/stage'
import { px } from '~/utils/drawing/strokes'
import type { Law } from '~/utils/motion/types'

/** A ball on a straight way: down a fall, along a slope, level where nothing pulls. */

const BALL = 7
const FALLING: readonly Law[] = ['odd-rule', 'bounce']

/** Degrees below the level that the way goes. */
function slopeOf({ law, subject, spans }: PlayedClaim): number {
  const slope = subject && !('shape' in subject) ? subject.slope : undefined
  const falls = FALLING.includes(law) || spans?.some((span) => FALLING.includes(span.law))
  return slope ?? (falls ? 90 : 0)
}

/** 1 where larger readings lie further down, −1 where readings count upwards: as gravity pulls, by the middle one of its pulls. */
export function pullOf(keys: readonly { frame: number; reading: number; law: number | null }[]): 1 | -1 {
  const at = (i: number) => keys[i]!.law ?? keys[i]!.reading
  const pulls: number[] = []
  for (let i = 1; i + 1 < keys.length; i++) {
    const before = (at(i) - at(i - 1)) / (keys[i]!.frame - keys[i - 1]!.frame)
    const after = (at(i + 1) - at(i)) / (keys[i + 1]!.frame - keys[i]!.frame)
    pulls.push(after - before)
  }
  pulls.sort((a, b) => a - b)
  // A bounce pulls the other way for a moment at every contact: the middle one is gravity's.
  return (pulls[pulls.length >> 1] ?? 0) < 0 ? -1 : 1
}

export function straightActor({ keys }: PlayedAnswer, claim: PlayedClaim, lists: readonly PlayedList[]): Actor {
  const slope = (slopeOf(claim) * Math.PI) / 180
  const sense = slope > 0 ? pullOf(keys) : 1
  const all = lists.flatMap(({ readings }) => readings.filter((one) => one !== null))
  const [low, high] = [Math.min(...all), Math.max(...all)]
  const top = sense > 0 ? low : high
  const long = Math.max(high - low, 1e-9)
  const way = { x: Math.cos(slope), y: Math.sin(slope) }
  return {
    reach: { left: 0, right: long * way.x, up: 0, down: long * way.y },
    draw: (anchor, scale) => {
      // The ball rides on the way, half its own width above it; in a free fall on the line itself.
      const lift = slope < Math.PI / 2 ? BALL : 0
      const at = (reading: number) => {
        const gone = (reading - top) * sense * scale
        return { x: anchor.x + way.x * gone + way.y * lift, y: anchor.y + way.y * gone - way.x * lift }
      }
      const end = { x: anchor.x + way.x * long * scale, y: anchor.y + way.y * long * scale }
      const floor = slope > 1.5 ? `M${px(end.x - 40)} ${px(end.y + BALL)}h80` : ''
      return {
        path: `M${px(anchor.x)} ${px(anchor.y)}L${px(end.x)} ${px(end.y)}${floor}`,
        pose: (which, index) => {
          const reading = lists[which]?.readings[index]
          return reading === null || reading === undefined ? '' : circlePath(at(reading), BALL)
        },
      }
    },
  }
}
