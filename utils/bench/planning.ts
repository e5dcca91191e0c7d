import { courseIn, momentsIn } from '~/utils/bench/course'
import type { Course, Moment } from '~/utils/bench/course'
import { hasBody, measureFor } from '~/utils/bench/laws'
import { pathIn } from '~/utils/bench/plans'
import { atSize, lastingFor, sizeIn } from '~/utils/bench/size'
import { subjectIn } from '~/utils/bench/setup'
import type { BenchSetup } from '~/utils/bench/setup'
import type { Claim } from '~/utils/contracts/production'
import type { JudgedKey, Key, PointKey } from '~/utils/motion'

/** From what lies on the bench to figures and drawings. Metres, degrees, drawing units; frames count from 1. */

export interface Outcome {
  seconds: number
  /** Not rounded: where the motion ends between two drawings. */
  frames: number
  /** Whole frames that hold it. */
  wholeFrames: number
  /** On the chosen exposure, up to the end. */
  drawings: number
}

export function outcomeOf(setup: BenchSetup, { seconds, frames }: Pick<Course, 'seconds' | 'frames'>): Outcome {
  const exposures = frames / setup.on
  // What stays where it stopped is drawn there once, even where the stop falls between two drawings.
  const drawings = (setup.law === 'slow-in' ? Math.ceil(exposures - 1e-9) : Math.floor(exposures + 1e-9)) + 1
  return { seconds, frames, wholeFrames: Math.ceil(frames - 1e-9), drawings }
}

/** How long the planned motion takes. */
export const outcomeIn = (setup: BenchSetup): Outcome => outcomeOf(setup, courseIn(setup))

/** The planned thing, or the same at a size beside it. */
export interface Compared { setup: BenchSetup; planned: boolean }

/** The planned thing among its sizes, smallest first. */
export function comparedIn(setup: BenchSetup): Compared[] {
  const size = sizeIn(setup)
  if (size === null) return [{ setup, planned: true }]
  const others = setup.beside.filter((other) => other !== size)
  return [size, ...others].sort((a, b) => a - b).map((each) => ({ setup: atSize(setup, each), planned: each === size }))
}

/** The same motion over `frames`: at the size, or the rate, that it then reads as. */
export const setupForFrames = (setup: BenchSetup, frames: number): BenchSetup => lastingFor(setup, frames / courseIn(setup).frames)

/** What readings are rounded to: a tenth, finer where the whole list spans little. */
export function pencilStep(span: number): number {
  return span > 0 ? Math.min(0.1, 10 ** Math.floor(Math.log10(span / 200))) : 0.1
}
/** toFixed drops the stray last bits of a multiple of 0.1. */
const written = (value: number, step: number) => Number((Math.round(value / step) * step).toFixed(9))

const spread = (values: readonly number[]) => Math.max(...values) - Math.min(...values)
const readingStep = (setup: BenchSetup) => (measureFor(setup.law) === 'angle' ? 0.1 : pencilStep(setup.way * setup.scale))
const pointStep = (points: readonly PointKey[]) => pencilStep(Math.max(spread(points.map(({ x }) => x)), spread(points.map(({ y }) => y))))

/** The spacing list of readings: rounded, on the exposure's frames, from frame 1. At most 2,000 drawings. */
export function listIn(setup: BenchSetup, course = courseIn(setup)): Key[] {
  const step = course.flight ? pointStep(course.points!) : readingStep(setup)
  return course.keys.map(({ frame, reading }) => ({ frame, reading: written(reading, step) }))
}

/** The spacing list of points, rounded; null where the law has none. */
export function pointListIn(setup: BenchSetup, course = courseIn(setup)): PointKey[] | null {
  if (!course.points) return null
  const step = pointStep(course.points)
  return course.points.map(({ frame, x, y }) => ({ frame, x: written(x, step), y: written(y, step) }))
}

/** What moves on the stage: one moment per drawing, and where it rests when its frames are over. */
export function motionIn(setup: BenchSetup): { moments: Moment[]; end: Moment; frames: number } {
  const course = courseIn(setup)
  return { moments: momentsIn(setup, course), end: course.end, frames: course.frames }
}

/** The claim that the take drawings draw by. */
export function claimIn(setup: BenchSetup): Claim {
  const measure = measureFor(setup.law)
  const subject = setup.law === 'spin' ? undefined : hasBody(setup.law) ? subjectIn(setup) : pathIn(setup)
  return {
    law: setup.law, measure, unit: measure === 'angle' ? 'deg' : 'px', slop: 0.3, tolerance: 0.1,
    ...(subject ? { subject } : {}), ...(setup.law === 'flight' ? { path: 'parabola' } : {}),
  }
}

/** What the timing chart spaces its ticks by: the readings; of a throw the way along its path, drawing by drawing. */
export function chartKeysIn(course: Course): Key[] {
  if (!course.flight) return course.keys
  let way = 0
  return course.points!.map(({ frame, x, y }, i) => {
    const before = course.points![i - 1]
    if (before) way += Math.hypot(x - before.x, y - before.y)
    return { frame, reading: way }
  })
}

/** Six decimals: the same text on every machine, whatever the last bits of a sine were. */
const settle = (value: number) => Number(value.toFixed(6))

/** The list with the exact law beside the rounded readings, in the shape that the drawings take. */
export function planKeysIn(setup: BenchSetup, course = courseIn(setup)): JudgedKey[] {
  const rounded = listIn(setup, course)
  const points = pointListIn(setup, course)
  return rounded.map(({ frame, reading }, i) => {
    const law = settle(course.keys[i]!.reading)
    const [next, nextLaw] = [rounded[i + 1]?.reading, course.keys[i + 1]?.reading]
    return {
      frame, reading, law, offset: settle(reading - law), offsetFrames: null, allowance: null, breaks: false,
      gap: next === undefined ? null : settle(next - reading),
      lawGap: nextLaw === undefined ? null : settle(nextLaw - law),
      ...(points ? pointedOut(points[i]!, course, i) : {}),
    }
  })
}

function pointedOut({ x, y }: PointKey, course: Course, i: number): Partial<JudgedKey> {
  const exact = course.points![i]!
  const point = { point: { x, y }, lawPoint: { x: settle(exact.x), y: settle(exact.y) } }
  return course.flight ? { ...point, sideways: { reading: x, law: settle(exact.x), offset: settle(x - exact.x), breaks: false } } : point
}
