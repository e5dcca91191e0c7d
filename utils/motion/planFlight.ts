/** The bench: a throw worked out before anything is drawn. */
import { gravityOf } from './bodies'
import { RADIAN } from './series'
import type { PathSubject, Place, PointKey, YAxis } from './types'

/** How a body is thrown: speed in m/s and degrees above level, or sideways alone in m/s (positive to the right). */
export type Throw = { speed: number, angle: number } | { sideways: number }

export interface FlightPlan {
  /** Drawing scale, and gravity where it isn't the Earth's. */
  subject: PathSubject & { unitsPerMetre: number }
  throw: Throw
  /** Metres below the start at which it lands; 0 at its own height, negative above it. */
  drop: number
  fps: number
  /** Frames per drawing. */
  exposure: number
  /** First frame's number; 1 when left out. */
  firstFrame?: number
  /** Points are rounded to this many drawing units; not at all when left out. */
  step?: number
  /** Where it starts on the drawing, drawing units; 0, 0 when left out. */
  origin?: Place
  /** Which way y counts on the drawing; 'down' when left out. */
  yAxis?: YAxis
}

/** One moment of a throw. */
export interface FlightEvent extends Place {
  seconds: number
  /** Frame's number, whole or not. */
  frame: number
}

export interface PlannedPoints {
  keys: PointKey[]
  /** Seconds that the whole flight takes, and the same in frames, not rounded: where it lands between two drawings. */
  seconds: number
  frames: number
  /** Its highest point, drawing units; null where it never rises. */
  apex: FlightEvent | null
  /** Where it lands; its highest point where it never gets as high as it was to land. */
  landing: FlightEvent
  /** How far it gets sideways, and how far above the start it rises, metres. */
  range: number
  height: number
}

/** No plan has more keys than a list may have. */
const MOST_KEYS = 2000

interface Launch { sideways: number, up: number }

function launchOf(thrown: Throw): Launch {
  if ('sideways' in thrown) return { sideways: thrown.sideways, up: 0 }
  const angle = thrown.angle * RADIAN
  // A throw straight up has no sideways speed at all: cos 90° leaves 6e-17 of it.
  return { sideways: Math.abs(thrown.angle) === 90 ? 0 : thrown.speed * Math.cos(angle), up: thrown.speed * Math.sin(angle) }
}

/** Seconds until it is `drop` metres below its start, on the way down; until its highest point where it never gets there. */
function secondsAloft({ up }: Launch, gravity: number, drop: number): number {
  const left = up * up + 2 * gravity * drop
  if (left < 0) return Math.max(0, up / gravity)
  // Both forms of the same root: neither subtracts like from like.
  const fall = Math.sqrt(left)
  return up >= 0 ? (up + fall) / gravity : fall > 0 ? Math.max(0, 2 * drop / (fall - up)) : 0
}

/** Seconds that the planned throw is in the air. */
export function flightSeconds(plan: FlightPlan): number {
  return secondsAloft(launchOf(plan.throw), gravityOf(plan.subject), plan.drop)
}

/**
 * Points at every exposure until it lands: x = vₓt, height = v_y·t − ½gt², in drawing units from `origin`. At most 2,000 keys. `subject`
 * needs only its scale and gravity: nothing in the air knows of a slope.
 */
export function plannedFlight(plan: FlightPlan): PlannedPoints {
  const launch = launchOf(plan.throw)
  const gravity = gravityOf(plan.subject)
  const seconds = secondsAloft(launch, gravity, plan.drop)
  const frames = seconds * plan.fps
  const first = plan.firstFrame ?? 1
  const origin = plan.origin ?? { x: 0, y: 0 }
  const scale = plan.subject.unitsPerMetre
  const up = plan.yAxis === 'up' ? 1 : -1
  const at = (t: number): Place => ({
    x: origin.x + scale * launch.sideways * t,
    y: origin.y + up * scale * (launch.up * t - gravity * t * t / 2),
  })
  const event = (t: number): FlightEvent => ({ ...at(t), seconds: t, frame: first + t * plan.fps })
  const rises = launch.up > 0
  const count = Math.min(MOST_KEYS, Math.floor(frames / plan.exposure + 1e-9) + 1)
  return {
    keys: Array.from({ length: count }, (_, i) => {
      const { x, y } = at(i * plan.exposure / plan.fps)
      return { frame: first + i * plan.exposure, x: rounded(x, plan.step), y: rounded(y, plan.step) }
    }),
    seconds, frames,
    apex: rises ? event(launch.up / gravity) : null,
    landing: event(seconds),
    range: Math.abs(launch.sideways) * seconds,
    height: rises ? launch.up * launch.up / (2 * gravity) : 0,
  }
}

/** toFixed drops the stray last bits of a multiple of 0.1. */
function rounded(value: number, step: number | undefined): number {
  return step ? Number((Math.round(value / step) * step).toFixed(9)) : value
}
