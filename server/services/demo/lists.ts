import { equalLength, pathAcceleration, STANDARD_GRAVITY } from '~/utils/motion'
import { freeSwing } from '~/utils/motion/swing'
import type { BodySubject, Key, PathSubject, PointKey } from '~/utils/motion/types'

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

/** A hand that puts one value after the other on paper. */
function hand({ seed, grid, slip }: Pencil): (value: number) => number {
  const noise = pencilNoise(seed)
  return (value) => Number((Math.round((value + noise() * slip) / grid) * grid).toFixed(4))
}

function drawn(exposure: Exposure, readings: readonly number[], pencil: Pencil): Key[] {
  const put = hand(pencil)
  return readings.map((reading, i) => ({ frame: exposure.first + i * exposure.step, reading: put(reading) }))
}

/** A planned list as somebody drew it. */
export function traced(keys: readonly Key[], pencil: Pencil): Key[] {
  const put = hand(pencil)
  return keys.map(({ frame, reading }) => ({ frame, reading: put(reading) }))
}

/** Planned points as somebody drew them. */
export function tracedPoints(keys: readonly PointKey[], pencil: Pencil): PointKey[] {
  const put = hand(pencil)
  return keys.map(({ frame, x, y }) => ({ frame, x: put(x), y: put(y) }))
}

/**
 * Pushed off, rolling, braked, on ones: `out` frames of speeding up to `push`, `run` frames at `speed`, then slowing to a stop over `stop`
 * frames. Units per frame; where push and speed differ, the joint between them is broken.
 */
export function pushedAndBraked(first: number, { out, push, run, speed, stop }: Record<'out' | 'push' | 'run' | 'speed' | 'stop', number>, pencil: Pencil): Key[] {
  const away = (push * out) / 2
  const at = (i: number) => {
    if (i <= out) return (push * i * i) / (2 * out)
    if (i <= out + run) return away + speed * (i - out)
    const left = out + run + stop - i
    return away + speed * run + (speed * (stop * stop - left * left)) / (2 * stop)
  }
  return drawn({ fps: 24, first, step: 1, count: out + run + stop + 1 }, Array.from({ length: out + run + stop + 1 }, (_, i) => at(i)), pencil)
}

/** What somebody draws who forgets that a falling thing keeps its way: from `frame` on it goes straight down. */
export function straightDown(keys: readonly PointKey[], frame: number): PointKey[] {
  const stays = keys.findLast((key) => key.frame <= frame)?.x ?? 0
  return keys.map((key) => (key.frame > frame ? { ...key, x: stays } : key))
}

/** Puts one drawing off its path. */
export function strayed(keys: readonly PointKey[], index: number, by: { x: number; y: number }): PointKey[] {
  return keys.map((key, i) => (i === index ? { ...key, x: key.x + by.x, y: key.y + by.y } : key))
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
