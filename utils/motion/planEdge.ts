/** The bench: a body that goes over a brink, worked out before anything is drawn. Angles and the flight of its centre. */
import { brinkRatio, equalLength, gravityOf } from './bodies'
import { edgeEnergy, leavingCosine, overBrink, releaseAt } from './edge'
import type { Release } from './edge'
import { RADIAN } from './series'
import { paceOf } from './times'
import type { BodySubject, Key, Place, PointKey, YAxis } from './types'

export interface EdgePlan {
  subject: BodySubject
  /** Degrees from centre-over-brink at which it is let go at rest; negative goes over to the left. */
  lean: number
  /** How far below the brink the centre of mass comes to land, metres. */
  drop: number
  fps: number
  /** Frames per drawing. */
  exposure: number
  /** First frame's number; 1 when left out. */
  firstFrame?: number
  /** Angles are rounded to this many degrees; not at all when left out. */
  step?: number
  /** Drawing units per metre for the points; 1 when left out. */
  unitsPerMetre?: number
  /** Points are rounded to this many drawing units; not at all when left out. */
  pointStep?: number
  /** Where the brink sits on the drawing, drawing units; 0, 0 when left out. */
  brink?: Place
  /** Which way y counts on the drawing; 'down' when left out. */
  yAxis?: YAxis
}

/** The body at one moment. */
export interface EdgeMoment {
  /** Degrees from upright balance; on and on as it turns in the air. */
  angle: number
  /** Its centre of mass, metres from the brink: right and up are positive. */
  centre: Place
  released: boolean
}

/** One of the two moments that matter. */
export interface EdgeEvent extends EdgeMoment {
  seconds: number
  /** Frame's number, whole or not. */
  frame: number
}

export interface PlannedEdge {
  /** Degrees from upright. */
  angles: Key[]
  /** The centre of mass in drawing units. */
  points: PointKey[]
  /** Where it leaves the brink. Seconds are so many that nobody waits for them where it starts in balance. */
  release: EdgeEvent
  /** Where its centre reaches the drop. */
  landing: EdgeEvent
  /** Degrees per second in the air. */
  turnRate: number
  /** Metres from brink to centre of mass. */
  reach: number
  /** The whole motion, seconds and frames, not rounded. */
  seconds: number
  frames: number
}

/** A body's way over the brink from rest at `lean` degrees, at any moment. */
export interface EdgeMotion {
  k: number
  reach: number
  /** In the body's own measure. */
  release: Release
  at(seconds: number): EdgeMoment
  /** Seconds at which the centre passes `drop` metres below the brink: never before the release. */
  landsAfter(drop: number): number
}

/** No plan has more keys than a list may have. */
const MOST_KEYS = 2000

/**
 * From rest at `lean` degrees. A body whose own centre isn't known (bob, hung rod, custom) is taken for a thin rod of the same
 * equal-pendulum length. After the release the centre keeps its velocity and falls freely.
 */
export function edgeMotion(subject: BodySubject, lean: number): EdgeMotion {
  const k = paceOf(subject)
  const gravity = gravityOf(subject)
  const ratio = brinkRatio(subject)
  const reach = ratio * equalLength(subject) / 2
  const start = lean * RADIAN
  const release = releaseAt(start, 0, leavingCosine(ratio, edgeEnergy(start, 0)))
  const leaves = release.tau / k
  const from = { x: reach * Math.sin(release.angle), y: reach * Math.cos(release.angle) }
  const speed = reach * release.turn * k
  const velocity = { x: speed * Math.cos(release.angle), y: -speed * Math.sin(release.angle) }
  const angle = new Float64Array(1)
  const rate = new Float64Array(1)
  return {
    k, reach, release,
    at(seconds) {
      overBrink(start, 0, release, [k * seconds], 1, angle, rate)
      const turned = angle[0] as number
      const since = seconds - leaves
      const released = since >= 0
      const centre = released
        ? { x: from.x + velocity.x * since, y: from.y + velocity.y * since - gravity * since * since / 2 }
        : { x: reach * Math.sin(turned), y: reach * Math.cos(turned) }
      return { angle: turned / RADIAN, centre, released }
    },
    landsAfter(drop) {
      const height = Math.max(0, from.y + drop)
      // The root with nothing subtracted: v ≤ 0 is the speed upwards.
      return leaves + 2 * height / (Math.sqrt(velocity.y * velocity.y + 2 * gravity * height) - velocity.y || Infinity)
    },
  }
}

/** Angles and points at every exposure until the centre lands. At most 2,000 keys. */
export function plannedEdge(plan: EdgePlan): PlannedEdge {
  const motion = edgeMotion(plan.subject, plan.lean)
  const first = plan.firstFrame ?? 1
  const event = (seconds: number): EdgeEvent => ({ ...motion.at(seconds), seconds, frame: first + seconds * plan.fps })
  const release = { ...event(motion.release.tau / motion.k), released: true }
  const landing = event(motion.landsAfter(plan.drop))
  const frames = landing.seconds * plan.fps
  const count = Math.min(MOST_KEYS, Math.floor(frames / plan.exposure + 1e-9) + 1)
  const moments = Array.from({ length: count }, (_, i) => ({ frame: first + i * plan.exposure, ...motion.at(i * plan.exposure / plan.fps) }))
  return {
    angles: moments.map(({ frame, angle }) => ({ frame, reading: rounded(angle, plan.step) })),
    points: moments.map(({ frame, centre }) => ({ frame, ...drawn(plan, centre) })),
    release, landing,
    turnRate: motion.release.turn * motion.k / RADIAN,
    reach: motion.reach,
    seconds: landing.seconds, frames,
  }
}

/** Metres from the brink as drawing units on the paper. */
function drawn({ brink = { x: 0, y: 0 }, unitsPerMetre = 1, yAxis = 'down', pointStep }: EdgePlan, { x, y }: Place): Place {
  const up = yAxis === 'up' ? 1 : -1
  return { x: rounded(brink.x + unitsPerMetre * x, pointStep), y: rounded(brink.y + up * unitsPerMetre * y, pointStep) }
}

/** toFixed drops the stray last bits of a multiple of 0.1. */
function rounded(value: number, step: number | undefined): number {
  return step ? Number((Math.round(value / step) * step).toFixed(9)) : value
}
