import { courseIn } from '~/utils/bench/course'
import type { Moment } from '~/utils/bench/course'
import { hangs, hasBody } from '~/utils/bench/laws'
import { flatAngle } from '~/utils/bench/plans'
import { subjectIn } from '~/utils/bench/setup'
import type { BenchSetup } from '~/utils/bench/setup'
import { outreach } from '~/utils/bench/stageReach'
import { bodyPath } from '~/utils/drawing/body'
import { circlePath } from '~/utils/drawing/circle'
import { px } from '~/utils/drawing/strokes'
import type { Point } from '~/utils/drawing/strokes'
import { trackAt } from '~/utils/drawing/track'
import { edgeMotion } from '~/utils/motion'

/** One body on the stage: what it moves against, its path of action, and itself at a moment. */
export interface Drawn {
  scene: string
  path: string
  pose: (moment: Moment) => string
}

/** Pixels: what has no size of its own is drawn as a ball. */
export const BALL = 6
const rad = (degrees: number) => (degrees * Math.PI) / 180

/** Draws a setup about its anchor, `scale` pixels per metre; `from` is the left end of its column. */
export function drawnFor(setup: BenchSetup, anchor: Point, scale: number, from: number): Drawn {
  if (setup.law === 'over-edge') return overEdge(setup, anchor, scale, from)
  if (hasBody(setup.law)) return turning(setup, anchor, scale)
  if (setup.law === 'spin') return spinning(anchor, scale)
  if (setup.law === 'flight') return thrown(setup, anchor, scale)
  return setup.law === 'bounce' ? bouncing(setup, anchor, scale) : falling(setup, anchor, scale)
}

function turning(setup: BenchSetup, pivot: Point, scale: number): Drawn {
  const hung = hangs(setup.law)
  const length = Math.max(hung ? 16 : 8, outreach(setup) * scale)
  const track = trackAt(pivot, length, hung)
  const subject = subjectIn(setup)
  return {
    scene: hung ? `M${px(pivot.x - 12)} ${px(pivot.y)}h24` : '',
    path: hung ? track.path(-setup.amplitude, setup.amplitude, length) : track.path(setup.lean, flatAngle(setup), length),
    pose: ({ reading }) => bodyPath(subject, reading, length, track, 1) + circlePath(pivot, 2.5),
  }
}

const FLOWN = 24
/** The brink, the arc of the body's middle and the parabola that it goes on along. */
function overEdge(setup: BenchSetup, brink: Point, scale: number, from: number): Drawn {
  const subject = subjectIn(setup)
  const { edge, seconds } = courseIn(setup)
  const { release, reach } = edge!
  const motion = edgeMotion(subject, setup.lean)
  const length = Math.max(8, outreach(setup) * scale)
  const place = ({ x, y }: Point) => ({ x: brink.x + x * scale, y: brink.y - y * scale })
  const flown = Array.from({ length: FLOWN }, (_, i) => place(motion.at(release.seconds + ((seconds - release.seconds) * (i + 1)) / FLOWN).centre))
  return {
    scene: `M${px(from)} ${px(brink.y + 1)}H${px(brink.x)}V${px(brink.y + setup.brink * scale + 1)}`,
    path: trackAt(brink, length, false).path(setup.lean, release.angle, reach * scale) + flown.map(({ x, y }) => `L${px(x)} ${px(y)}`).join(''),
    pose: ({ reading, at }) => {
      const middle = place(at ?? { x: 0, y: 0 })
      const pivot = { x: middle.x - reach * scale * Math.sin(rad(reading)), y: middle.y + reach * scale * Math.cos(rad(reading)) }
      return bodyPath(subject, reading, length, trackAt(pivot, length, false), 1) + circlePath(middle, 2.5)
    },
  }
}

/** From the hand along the parabola: exactly a quadratic curve, whose middle handle lies where both tangents meet. */
function thrown(setup: BenchSetup, hand: Point, scale: number): Drawn {
  const { flight, end } = courseIn(setup)
  // The ball lies on the line, not astride it.
  const place = ({ x, y }: Point) => ({ x: hand.x + x * scale, y: hand.y - y * scale - BALL })
  const handle = place({ x: flight!.range / 2, y: (flight!.range / 2) * Math.tan(rad(setup.throwAngle)) })
  const [start, landing] = [place({ x: 0, y: 0 }), place(end.at!)]
  return {
    scene: setup.landing > 0 ? `M${px(start.x - BALL)} ${px(hand.y + 1)}h${2 * BALL}` : '',
    path: `M${px(start.x)} ${px(start.y)}Q${px(handle.x)} ${px(handle.y)} ${px(landing.x)} ${px(landing.y)}`,
    pose: ({ at }) => circlePath(place(at ?? { x: 0, y: 0 }), BALL),
  }
}

/** A wheel with one spoke to see it turn by. */
function spinning(middle: Point, scale: number): Drawn {
  const radius = scale * 0.92
  const track = trackAt(middle, radius, false)
  return {
    scene: '',
    path: circlePath(middle, radius),
    pose: ({ reading }) => {
      const rim = track.spot(reading, radius)
      const mark = track.spot(reading, radius - 9)
      return `${circlePath(middle, 3)}M${px(middle.x)} ${px(middle.y)}L${px(rim.x)} ${px(rim.y)}${circlePath(mark, 7)}`
    },
  }
}

/** Straight down and up again, with a tick at each height that it comes back to. */
function bouncing(setup: BenchSetup, foot: Point, scale: number): Drawn {
  const height = (share: number) => foot.y - setup.way * scale * share
  const e = setup.back / 100
  const ticks = Array.from({ length: Math.min(setup.bounces, 8) }, (_, n) => `M${px(foot.x - 14)} ${px(height(e ** (2 * n)) - BALL)}h28`)
  return {
    scene: '',
    path: `M${px(foot.x)} ${px(height(1) - BALL)}V${px(foot.y)}${ticks.join('')}`,
    pose: ({ reading }) => circlePath({ x: foot.x, y: foot.y - (setup.way - reading / setup.scale) * scale - BALL }, BALL),
  }
}

/** Down to the right; a free fall straight down. */
function falling(setup: BenchSetup, anchor: Point, scale: number): Drawn {
  const long = setup.way * scale
  const along = { x: Math.cos(rad(setup.slope)), y: Math.sin(rad(setup.slope)) }
  const top = { x: anchor.x, y: anchor.y - along.y * long }
  // The body rides on the slope, half its own width above it; in a free fall on the line itself.
  const lift = setup.slope < 90 ? BALL : 0
  const pose = ({ reading }: Moment) => {
    const gone = (reading / setup.scale) * scale
    const at = { x: top.x + along.x * gone + along.y * lift, y: top.y + along.y * gone - along.x * lift }
    return circlePath({ x: at.x, y: setup.slope < 90 ? at.y : at.y - BALL }, BALL)
  }
  return { scene: '', path: `M${px(top.x)} ${px(top.y)}L${px(top.x + along.x * long)} ${px(anchor.y)}`, pose }
}
