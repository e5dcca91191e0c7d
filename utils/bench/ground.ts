import { edgeMotion } from '~/utils/motion'
import type { BodySubject, Place } from '~/utils/motion'

/** Where a body that has left a brink meets the ground below it. */

const RADIAN = Math.PI / 180

/**
 * A body's corners, metres from the pivot it stood on, at `angle` degrees from balance: x to the right, y up. What stands broad leans
 * to the right over its right lower corner.
 */
export function cornersAt(subject: BodySubject, angle: number): Place[] {
  const [sine, cosine] = [Math.sin(angle * RADIAN), Math.cos(angle * RADIAN)]
  // Along the line from the pivot through the centre, and across it to the right.
  const at = (along: number, across: number): Place => ({ x: along * sine + across * cosine, y: along * cosine - across * sine })
  const broad = subject.shape === 'block' ? subject.width : subject.shape === 'cylinder' ? 2 * subject.radius : 0
  if (broad > 0 && 'height' in subject) {
    const { height } = subject
    const across = Math.hypot(broad, height)
    // The side and the foot, each as far along the diagonal as its own share of it.
    return [
      at(0, 0), at(across, 0),
      at(height * height / across, broad * height / across), at(broad * broad / across, -broad * height / across),
    ]
  }
  return [at(0, 0), at(outermost(subject), 0)]
}

function outermost(subject: BodySubject): number {
  if (subject.shape === 'pole') return Math.max(subject.height, subject.headHeight)
  if ('height' in subject) return subject.height
  return 'length' in subject ? subject.length : subject.equalLength
}

/** Metres from the body's centre of mass down to its lowest point. */
export function depthAt(subject: BodySubject, reach: number, angle: number): number {
  const centre = reach * Math.cos(angle * RADIAN)
  return centre - Math.min(...cornersAt(subject, angle).map(({ y }) => y))
}

export interface Touch {
  /** Seconds from the start. */
  seconds: number
  /** Metres that the centre lies below the brink by then; negative above it. */
  drop: number
  /** The ground is met while the body still turns on the brink. */
  tooSoon: boolean
}

const LOOKS = 160

/** When a body let go at rest at `lean` degrees on a brink `height` metres above ground first touches it: looked for along the fall, then halved down to it. */
export function touchesAfter(subject: BodySubject, lean: number, height: number): Touch {
  const motion = edgeMotion(subject, lean)
  const leaves = motion.release.tau / motion.k
  const above = (seconds: number) => {
    const { angle, centre } = motion.at(seconds)
    return centre.y - depthAt(subject, motion.reach, angle) + height
  }
  // The centre itself is at ground level by then, so something has touched before.
  const latest = motion.landsAfter(height)
  let [low, high] = [leaves, latest]
  for (let i = 1; i <= LOOKS; i++) {
    const seconds = leaves + ((latest - leaves) * i) / LOOKS
    if (above(seconds) > 0) low = seconds
    else {
      high = seconds
      break
    }
  }
  for (let i = 0; i < 50; i++) {
    const middle = (low + high) / 2
    if (above(middle) > 0) low = middle
    else high = middle
  }
  return { seconds: high, drop: -motion.at(high).centre.y, tooSoon: above(leaves) <= 0 }
}
