/** Which path a list runs along, and how far along it each drawing has come. */
import { mostMisplaced } from '../hypotheses'
import { RADIAN } from '../series'
import type { FoundPath, Law, PathKind, Place, PointCheck } from '../types'
import { alongBow, fitBow, placeOnBow } from './bow'
import type { Bow } from './bow'
import { bearingOf, centreOf, placeAlong, radiusOf } from './curve'
import { fitAbout, fitCurve } from './curveFit'
import type { CurveFit } from './curveFit'
import { asPosted, onSheet, placeOf, roughAllowances } from './sheet'
import type { Sheet } from './sheet'

/** The laws that turn about a pivot and are read in degrees. */
export const TURNING: readonly Law[] = ['topple', 'over-edge', 'pendulum', 'swing-decay', 'spin']

export interface Course {
  kind: PathKind
  /** The line or circle; null for a parabola. */
  fit: CurveFit | null
  bow: Bow | null
  /** Every drawing's signed distance from the path, positive to the right of the way along it, drawing units. */
  off: Float64Array
  /** True where the claim named the pivot. */
  given: boolean
  measure: 'angle' | 'distance'
  /** Reading units per drawing unit along the path, and the reading at the path's own foot. */
  perUnit: number
  atFoot: number
  readings: Float64Array
}

/** Ways along a curve, carried on over full turns: no drawing is more than half a turn from the sound one before it. */
function waysAlong(sheet: Sheet, { curve, counts }: CurveFit): Float64Array {
  const along = Float64Array.from({ length: sheet.n }, (_, i) => bearingOf(curve, placeOf(sheet, i)).along)
  if (curve.bend === 0) return along
  const round = 2 * Math.PI * radiusOf(curve)
  let before = along[0] as number
  for (let i = 1; i < along.length; i++) {
    const here = (along[i] as number) - round * Math.round(((along[i] as number) - before) / round)
    along[i] = here
    if (counts[i]) before = here
  }
  return along
}

/** Mean of the later half less mean of the earlier: which way a list goes on the whole, though one drawing at an end be bad. */
function drift(values: Float64Array): number {
  const half = values.length >> 1
  let sum = 0
  for (let i = 0; i < half; i++) sum += (values[values.length - 1 - i] as number) - (values[i] as number)
  return sum
}

/** Where nothing moves on the whole, the way that it first leaves its start. */
function wayOf(along: Float64Array): 1 | -1 {
  const onTheWhole = drift(along)
  if (onTheWhole !== 0) return onTheWhole > 0 ? 1 : -1
  const left = along.find(value => value !== along[0]) ?? 0
  return left >= (along[0] ?? 0) ? 1 : -1
}

function distanceCourse(sheet: Sheet, kind: Course['kind'], fit: CurveFit, given: boolean): Course {
  const along = waysAlong(sheet, fit)
  const way = wayOf(along)
  const first = along[0] as number
  return { kind, fit, bow: null, off: fit.off, given, measure: 'distance', perUnit: way, atFoot: -way * first, readings: along.map(value => way * (value - first)) }
}

/** Along an upright parabola; null where there is none to be told from a line. */
function bowCourse(sheet: Sheet, allowed: Float64Array, slop: number): Course | null {
  const found = fitBow(sheet, allowed, slop)
  if (!found) return null
  const along = Float64Array.from({ length: sheet.n }, (_, i) => alongBow(found.bow, placeOf(sheet, i)))
  const way = wayOf(along)
  const first = along[0] as number
  return {
    kind: 'parabola', fit: null, bow: found.bow, off: found.off, given: false, measure: 'distance',
    perUnit: way, atFoot: -way * first, readings: along.map(value => way * (value - first)),
  }
}

/** Degrees counted anticlockwise from `rest` (where reading 0 stands, degrees anticlockwise from the x axis). */
export function angleCourse(sheet: Sheet, fit: CurveFit, given: boolean, law: Law): Course {
  const { curve } = fit
  const along = waysAlong(sheet, fit)
  const perUnit = 2 * curve.bend / RADIAN
  const foot = curve.normal / RADIAN + (curve.bend < 0 ? 180 : 0)
  const first = foot + perUnit * (along[0] as number)
  const rest = law === 'spin' ? first : law === 'pendulum' || law === 'swing-decay' ? -90 : 90
  // The first drawing within half a turn of where reading 0 stands.
  const turns = 360 * Math.round((first - rest) / 360)
  const angles = along.map(value => foot + perUnit * value - rest - turns)
  // A swing is read with its sign; what falls or spins is read the way it goes.
  const way = rest === -90 ? 1 : wayOf(angles)
  return {
    kind: 'circle', fit, bow: null, off: fit.off, given, measure: 'angle', perUnit: way * perUnit, atFoot: way * (foot - rest - turns), readings: angles.map(value => way * value),
  }
}

const breaking = (fit: CurveFit, allowed: Float64Array) => fit.off.reduce((count, off, i) => count + (Math.abs(off) > (allowed[i] as number) ? 1 : 0), 0)

/** A line, unless an arc does clearly better: a line that has to give up drawing after drawing that an arc holds. */
function lineOrArc(sheet: Sheet, allowed: Float64Array, slop: number): { kind: Course['kind'], fit: CurveFit } {
  const line = fitCurve(sheet, allowed, slop, false)
  const lost = breaking(line, allowed)
  if (lost >= Math.max(3, sheet.n / 6)) {
    const arc = fitCurve(sheet, allowed, slop, true)
    if (lost - breaking(arc, allowed) >= Math.max(3, sheet.n / 6)) return { kind: 'circle', fit: arc }
  }
  return { kind: 'line', fit: line }
}

/** A fitted pivot that the list could be turning about by less than this in all, radians, is none. */
const LEAST_TURN = 3 * RADIAN
/** A radius less well known than to this share of itself tells no angles. */
const MOST_DOUBT = 0.5

/**
 * What is told instead of angles: drawings that run straight, an arc too short to show its pivot, all drawings on the very pivot (the only
 * one without a course).
 */
export type Trouble = 'straight' | 'short' | 'on-pivot'

/** The path under a claim. Needs drawings that differ. */
export function courseOf(request: PointCheck, sheet: Sheet): { course: Course | null, trouble: Trouble | null } {
  const { law, slop, tolerance, path, pivot } = request
  const allowed = roughAllowances(sheet, slop, tolerance)
  const turning = TURNING.includes(law)
  const sound = (course: Course) => ({ course, trouble: null })
  if (pivot && (turning || path === 'circle')) {
    const fit = fitAbout(sheet, onSheet(sheet, pivot), allowed, slop)
    if (!fit) return { course: null, trouble: 'on-pivot' }
    return sound(turning ? angleCourse(sheet, fit, true, law) : distanceCourse(sheet, 'circle', fit, true))
  }
  const line = () => distanceCourse(sheet, 'line', fitCurve(sheet, allowed, slop, false), false)
  if (turning) {
    const arc = fitCurve(sheet, allowed, slop, true)
    const { bend } = arc.curve
    // Over an extent L a curvature 2A turns by 2AL, and bows by an eighth of that times L. So small a turn bows a long way by more than the slop; a short one hides it.
    if (2 * (Math.abs(bend) + arc.bendSpread) * sheet.extent < LEAST_TURN) {
      return { course: line(), trouble: sheet.extent * LEAST_TURN / 8 > slop ? 'straight' : 'short' }
    }
    return arc.bendSpread > MOST_DOUBT * Math.abs(bend) ? { course: line(), trouble: 'short' } : sound(angleCourse(sheet, arc, false, law))
  }
  if (path === 'circle') return sound(distanceCourse(sheet, 'circle', fitCurve(sheet, allowed, slop, true), false))
  if (path === 'line') return sound(line())
  if (path === 'parabola') return sound(bowCourse(sheet, allowed, slop) ?? line())
  const { kind, fit } = lineOrArc(sheet, allowed, slop)
  return sound(distanceCourse(sheet, kind, fit, false))
}

/** The place on the sheet that a reading stands for. */
export function placeAt(course: Course, reading: number): Place {
  const along = (reading - course.atFoot) / course.perUnit
  return course.fit ? placeAlong(course.fit.curve, along) : placeOnBow(course.bow as Bow, along)
}

/** How deep the arc of the list stands over its chord, drawing units. */
function depthOf({ curve }: CurveFit, { readings, perUnit }: Course): number {
  const [least, most] = [Math.min(...readings), Math.max(...readings)]
  const half = Math.abs(curve.bend * (most - least) / perUnit) / 2
  return half > Math.PI / 2 ? Infinity : 2 * radiusOf(curve) * Math.sin(half / 2) ** 2
}

/** True where nobody would see that the arc is not a line. */
function nearlyStraight(fit: CurveFit, course: Course, allowance: number): boolean {
  const { curve, bendSpread } = fit
  return curve.bend === 0 || depthOf(fit, course) <= allowance || Math.abs(curve.bend) <= bendSpread
}

/** The path in the contract's words. `allowed`: what each drawing may be off. */
export function foundPath(sheet: Sheet, course: Course, allowed: ArrayLike<number>): FoundPath {
  const { bow, fit, off: offs, readings } = course
  let [sum, room] = [0, 0]
  for (let i = 0; i < sheet.n; i++) {
    const [off, allowance] = [offs[i] as number, allowed[i] as number]
    sum += allowance > 0 ? Math.min(1e3, Math.abs(off) / allowance) ** 2 : off === 0 ? 0 : 1e6
    room += allowance
  }
  const misfit = Math.sqrt(sum / sheet.n)
  if (bow) return { kind: 'parabola', apex: asPosted(sheet, bow.apex), bend: sheet.up * bow.bend, misfit }
  const centre = fit && centreOf(fit.curve)
  if (course.kind === 'line' || !fit || !centre) {
    const to = readings.reduce((furthest, reading) => (Math.abs(reading) > Math.abs(furthest) ? reading : furthest), 0)
    return { kind: 'line', from: asPosted(sheet, placeAt(course, 0)), to: asPosted(sheet, placeAt(course, to)), misfit }
  }
  const radius = radiusOf(fit.curve)
  const zero = asPosted(sheet, placeAt(course, 0))
  const posted = asPosted(sheet, centre)
  return {
    kind: 'circle', centre: posted, radius, given: course.given, nearlyStraight: nearlyStraight(fit, course, room / sheet.n), misfit,
    zeroAt: Math.atan2(zero.y - posted.y, zero.x - posted.x) / RADIAN,
    // On the sheet y counts up; where the drawing counts it down, the same turn goes the other way.
    counts: course.perUnit * fit.curve.bend * sheet.up > 0 ? 1 : -1,
  }
}

/** Degrees between a line and the level. */
export function slopeOf({ curve }: CurveFit): number {
  return Math.atan2(Math.abs(Math.cos(curve.normal)), Math.abs(Math.sin(curve.normal))) / RADIAN
}

/** True where so many drawings, or so many together, are off that the path itself is in doubt. */
export function pathFails(off: readonly number[], n: number, run: number): boolean {
  return off.length > mostMisplaced(n) || run > 3
}
