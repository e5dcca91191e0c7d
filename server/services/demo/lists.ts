import { equalLength, pathAcceleration, STANDARD_GRAVITY } from '~/utils/motion'
import { freeSwing } from '~/utils/motion/swing'
import type { BodySubject, Key, PathSubject } from '~/utils/motion/types'

/**
 * Spacing lists for the demo: the laws' own motion, an animator's pencil, and here and there a fault put in on purpose.
 * Same shot, same list, whenever the demo is made.
 */

export interface Exposure {
  fps: number
  first: number
  /** Frames from one drawing to the next: 2 on twos. */
  step: number
  count: number
}
/** What the pencil does: the grid readings are read on, and how far a drawing may sit off. */
export interface Pencil {
  seed: number
  grid: number
  slip: number
}

const RADIANS = Math.PI / 180
const seconds = ({ fps, step, count }: Exposure) => Array.from({ length: count }, (_, i) => (i * step) / fps)

/** A small generator of our own, so that a list is the same on every machine. */
function pencilNoise(seed: number): () => number {
  let state = (seed * 2654435761) >>> 0
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0
    return (state / 2 ** 31 - 1) * 0.9
  }
}

function drawn(exposure: Exposure, readings: readonly number[], pencil: Pencil): Key[] {
  const noise = pencilNoise(pencil.seed)
  return readings.map((reading, i) => ({
    frame: exposure.first + i * exposure.step,
    reading: Number((Math.round((reading + noise() * pencil.slip) / pencil.grid) * pencil.grid).toFixed(4)),
  }))
}

/** Position along a fall, slide or roll, in drawing units; `start` in units, `speed` in units per second. */
export function fallen(exposure: Exposure, subject: PathSubject & { unitsPerMetre: number }, start: number, speed: number, pencil: Pencil): Key[] {
  const pull = pathAcceleration(subject) * subject.unitsPerMetre
  return drawn(exposure, seconds(exposure).map((t) => start + speed * t + (pull * t * t) / 2), pencil)
}

/** The same distance from one drawing to the next. */
export function even(exposure: Exposure, start: number, gap: number, pencil: Pencil): Key[] {
  return drawn(exposure, seconds(exposure).map((_, i) => start + i * gap), pencil)
}

/**
 * Angle of a topple from upright balance, or of a swing from hanging rest; degrees, `turn` in degrees per second.
 * A topple ends flat on the ground, however many drawings were asked for.
 */
export function turned(exposure: Exposure, subject: BodySubject, from: number, turn: number, topples: boolean, pencil: Pencil): Key[] {
  const k = Math.sqrt((subject.gravity ?? STANDARD_GRAVITY) / equalLength(subject))
  const taus = seconds(exposure).map((t) => k * t)
  const angle = new Float64Array(taus.length)
  freeSwing(from * RADIANS, (turn * RADIANS) / k, topples, taus, taus.length, angle, new Float64Array(taus.length))
  const readings = Array.from(angle, (radians) => radians / RADIANS)
  const flat = topples ? readings.findIndex((reading) => reading > 90) : -1
  return drawn(exposure, flat < 0 ? readings : readings.slice(0, flat), pencil)
}

/** Puts one drawing off its place. */
export function misplaced(keys: readonly Key[], index: number, by: number): Key[] {
  return keys.map((key, i) => (i === index ? { ...key, reading: Number((key.reading + by).toFixed(4)) } : key))
}

/** Repeats a drawing: from `index` on everything comes one exposure late. */
export function held(keys: readonly Key[], index: number): Key[] {
  return keys.map((key, i) => ({ frame: key.frame, reading: keys[i < index ? i : i - 1]?.reading ?? key.reading }))
}

/** Leaves a drawing out: from `index` on everything comes one exposure early. */
export function skipped(keys: readonly Key[], index: number): Key[] {
  return keys.slice(0, -1).map((key, i) => ({ frame: key.frame, reading: keys[i < index ? i : i + 1]?.reading ?? key.reading }))
}
