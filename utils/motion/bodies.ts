/** Bodies: how long a simple pendulum would be that moves as they do, and how big a body of the same proportions such a pendulum stands for. */
import type { BodySubject, PathSubject, Roll, Subject } from './types'

/** m/s². 3rd General Conference on Weights and Measures, 1901. */
export const STANDARD_GRAVITY = 9.80665

/** q of a thin rod on its foot, d = h/2 and L = 2h/3: what a body on a brink is taken for when its own d isn't known. */
const ROD_RATIO = 3 / 2

/** I/(m·r²) about the centre, per way of going; textbook moments of inertia. */
const ROLL: Record<Roll, number> = { slide: 0, ball: 2 / 5, cylinder: 1 / 2, shell: 2 / 3, hoop: 1 }

const ROLL_WORDS: Record<Roll, string> = {
  slide: 'slides without friction', ball: 'rolls as a solid ball', cylinder: 'rolls as a solid cylinder',
  shell: 'rolls as a thin shell', hoop: 'rolls as a hoop',
}

/** True where the subject is a body about a pivot, false where it is something on a path. */
export function isBody(subject: Subject): subject is BodySubject {
  return 'shape' in subject && subject.shape !== undefined
}

export function gravityOf(subject: Subject | undefined): number {
  return subject?.gravity ?? STANDARD_GRAVITY
}

/**
 * Equal-pendulum length I/(m·d), metres: the simple pendulum with the same k² = g/L. Moments about the pivot by the parallel-axis rule;
 * each formula is in the project's motion sheet and in any mechanics textbook.
 */
export function equalLength(subject: BodySubject): number {
  switch (subject.shape) {
    case 'rod': return 2 * subject.height / 3
    case 'block': return 2 / 3 * Math.hypot(subject.width, subject.height)
    case 'cylinder': {
      const { radius: r, height: h } = subject
      return (15 * r * r + 4 * h * h) / (12 * Math.sqrt(r * r + h * h / 4))
    }
    case 'pole': {
      const { height: h, mass: m, headMass: M, headHeight: c } = subject
      return (m * h * h / 3 + M * c * c) / (m * h / 2 + M * c)
    }
    case 'bob': return subject.length
    case 'hung-rod': return 2 * subject.length / 3
    case 'custom': return subject.equalLength
  }
}

/** The one length, metres, by which people name the body's size: its height, or its length where it hangs. */
export function namedSize(subject: BodySubject): number {
  switch (subject.shape) {
    case 'rod': case 'block': case 'cylinder': case 'pole': return subject.height
    case 'bob': case 'hung-rod': return subject.length
    case 'custom': return subject.equalLength
  }
}

/** Named size, metres, of a body of the same proportions whose equal-pendulum length is `length` metres: all lengths scale together. */
export function sizeForLength(subject: BodySubject, length: number): number {
  return namedSize(subject) * length / equalLength(subject)
}

/** Degrees that a body's own upright stands from centre-over-pivot: a block on its edge, a cylinder on its rim; 0 for the thin ones. */
export function uprightLean(subject: BodySubject): number {
  if (subject.shape === 'block') return Math.atan2(subject.width, subject.height) * 180 / Math.PI
  if (subject.shape === 'cylinder') return Math.atan2(2 * subject.radius, subject.height) * 180 / Math.PI
  return 0
}

/** q = 2d/L, d from pivot to centre of mass; null where the body's own d is not known. */
export function edgeRatio(subject: BodySubject): number | null {
  const distance = centreDistance(subject)
  return distance === null ? null : 2 * distance / equalLength(subject)
}

function centreDistance(subject: BodySubject): number | null {
  switch (subject.shape) {
    case 'rod': return subject.height / 2
    case 'block': return Math.hypot(subject.width, subject.height) / 2
    case 'cylinder': return Math.hypot(subject.radius, subject.height / 2)
    case 'pole': return (subject.mass * subject.height / 2 + subject.headMass * subject.headHeight) / (subject.mass + subject.headMass)
    default: return null
  }
}

/** q for a body on a brink: its own, or the thin rod's 3/2 where its centre isn't known or no body is named. */
export function brinkRatio(subject: Subject | undefined): number {
  return (subject && isBody(subject) ? edgeRatio(subject) : null) ?? ROD_RATIO
}

/** Acceleration along the path, m/s²: g·sin α/(1 + β). */
export function pathAcceleration(subject: PathSubject): number {
  return gravityOf(subject) * pathShare(subject)
}

/** The share of gravity that ends up in the motion. */
export function pathShare(subject: PathSubject): number {
  return Math.sin((subject.slope ?? 90) * Math.PI / 180) / (1 + ROLL[subject.roll ?? 'slide'])
}

/** Four figures at most, trailing noughts dropped, no exponent for the sizes that bodies come in. */
export function figure(value: number): string {
  return String(Number(value.toPrecision(4)))
}

/** The subject in words, as it is read after "a claim of": "a rod 38 m tall", "a drop at 80 units per metre". */
export function describeBody(subject: Subject): string {
  const words = isBody(subject) ? bodyWords(subject) : pathWords(subject)
  return subject.gravity === undefined || subject.gravity === STANDARD_GRAVITY ? words : `${words}, gravity ${figure(subject.gravity)} m/s²`
}

function bodyWords(subject: BodySubject): string {
  switch (subject.shape) {
    case 'rod': return `a rod ${figure(subject.height)} m tall`
    case 'block': return `a block ${figure(subject.width)} m wide and ${figure(subject.height)} m tall`
    case 'cylinder': return `an upright cylinder ${figure(2 * subject.radius)} m across and ${figure(subject.height)} m tall`
    case 'pole': return `a pole ${figure(subject.height)} m tall with a head of ${figure(subject.headMass)} kg at ${figure(subject.headHeight)} m`
    case 'bob': return `a bob on ${figure(subject.length)} m of cord`
    case 'hung-rod': return `a rod ${figure(subject.length)} m long hung by its end`
    case 'custom': return `a body that swings like a pendulum of ${figure(subject.equalLength)} m`
  }
}

function pathWords(subject: PathSubject): string {
  const slope = subject.slope ?? 90
  const way = slope === 90 && (subject.roll ?? 'slide') === 'slide'
    ? 'a free fall'
    : `something that ${ROLL_WORDS[subject.roll ?? 'slide']} on a slope of ${figure(slope)}°`
  return subject.unitsPerMetre === undefined ? way : `${way} at ${figure(subject.unitsPerMetre)} units per metre`
}
