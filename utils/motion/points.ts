/** A list of points on the drawing: its path of action found, its timing judged along it. */
import { judgeBrink } from './brink/judgeBrink'
import { inOrder } from './findings'
import { judgeFlight } from './flight/judgeFlight'
import { lawCurve } from './line'
import { judgeBouncing } from './path/bouncing'
import { courseOf, foundPath, placeAt, slopeOf } from './path/course'
import type { Course, Trouble } from './path/course'
import { STILL, without } from './path/nothing'
import { straightFinding, withOffPath } from './path/offPath'
import { withPivotDoubt } from './path/pivotDoubt'
import { asPosted, roughAllowances, sheetOf } from './path/sheet'
import type { Sheet } from './path/sheet'
import { isBody } from './bodies'
import { judgeReadings } from './readings'
import type { Judgement } from './readings'
import type { CheckResult, JudgedKey, Key, PointCheck, PointKey, ReadingCheck, Subject } from './types'

const REASONS: Record<Exclude<Trouble, 'straight'>, string> = {
  'short': 'The arc is too short to show what it turns about: name the pivot in the claim.',
  'on-pivot': 'Every drawing sits on the pivot itself, so nothing turns.',
}

/** A slope that is drawn flatter than this, degrees, pulls nothing along it that a drawing would show. */
const LEVEL = 1

/** Judges a list of points; `spans` are left alone. Never throws and never answers NaN on what the contract lets through. */
export function judgePoints(request: PointCheck): Judgement {
  if (request.law === 'flight') return judgeFlight(request)
  if (request.law === 'bounce') return judgeBouncing(request)
  if (request.law === 'over-edge') return judgeBrink(request)
  const sheet = sheetOf(request)
  if (!(sheet.extent > 2 * request.slop)) return without(request, null, STILL)
  const { course, trouble } = courseOf(request, sheet)
  const path = course && foundPath(sheet, course, roughAllowances(sheet, request.slop, request.tolerance))
  if (trouble === 'straight') {
    const { result } = without(request, path, '')
    return { line: null, pace: null, result: { ...result, verdict: 'breaks', reason: null, findings: [straightFinding()] } }
  }
  if (trouble || !course || !path) return without(request, path, REASONS[trouble ?? 'short'])
  const check = alongCourse(request, course)
  return onPaper(request, sheet, course, check, withPivotDoubt(sheet, course, check, judgeReadings(check)))
}

/** The timing alone: readings along the path. */
function alongCourse(request: PointCheck, course: Course): ReadingCheck {
  const { law, fps, tolerance, start } = request
  const { measure, readings } = course
  const subject = subjectOn(request.subject, course)
  return {
    law, fps, tolerance, measure,
    unit: measure === 'angle' ? 'deg' : request.unit,
    slop: request.slop * Math.abs(course.perUnit),
    keys: request.keys.map(({ frame }, i) => ({ frame, reading: readings[i] as number })),
    ...(start && { start }),
    ...(subject && { subject }),
  }
}

/** On a straight line whose slope the claim leaves open, the drawn slope is the slope. A level line has none, and no gravity to read. */
function subjectOn(subject: Subject | undefined, course: Course): Subject | undefined {
  if (course.kind !== 'line' || !course.fit || (subject && (isBody(subject) || subject.slope !== undefined))) return subject
  const slope = slopeOf(course.fit)
  return slope < LEVEL ? undefined : { ...subject, slope }
}

/** The judged readings put back onto the drawing, with what is to be said of the path. */
function onPaper(request: PointCheck, sheet: Sheet, course: Course, check: ReadingCheck, judged: Judgement): Judgement {
  const { result } = judged
  const scale = Math.abs(course.perUnit)
  const point = (reading: number) => asPosted(sheet, placeAt(course, reading))
  const rough = roughAllowances(sheet, request.slop, request.tolerance)
  const allowed = result.keys.map((key, i) => (key.allowance === null ? rough[i] as number : key.allowance / scale))
  const ratio: number[] = []
  const keys = result.keys.map((key, i): JudgedKey => {
    const offPath = leftOf(course, result.keys, i)
    const [distance, allowance] = [Math.abs(offPath), allowed[i] as number]
    ratio.push(distance === 0 ? 0 : allowance > 0 ? distance / allowance : Infinity)
    const { x, y } = request.keys[i] as PointKey
    return {
      ...key, point: { x, y }, lawPoint: key.law === null ? null : point(key.law), offPath,
      breaks: key.breaks || (key.law !== null && distance > allowance),
    }
  })
  const path = foundPath(sheet, course, allowed)
  const level = course.kind === 'line' && !check.subject
  // Along a path, pencil moves both ends of a gap by as much as the slop; rounding, which tells more of a row of readings, is in it.
  const timing = result.findings.filter(({ kind, frames, amount }) =>
    kind !== 'backward' || amount > 2 * check.slop || keys.some(key => key.frame === frames[0] && key.breaks))
  const findings = result.verdict === 'undecided' ? [] : inOrder(withOffPath(timing, keys, ratio, path, request.unit), strained(keys, ratio))
  // A timing along a path that isn't there tells no size.
  const lost = findings.some(({ kind, frames }) => kind === 'off-path' && frames.length === 0)
  const points = (list: readonly Key[]): PointKey[] => list.map(({ frame, reading }) => ({ frame, ...point(reading) }))
  const full: CheckResult = {
    ...result, keys, findings, path,
    verdict: result.verdict === 'undecided' ? 'undecided' : findings.length > 0 || keys.some(key => key.breaks) ? 'breaks' : 'holds',
    size: level || lost ? null : result.size,
    reads: { measure: course.measure, unit: check.unit },
    ruledPoints: { fit: points(result.ruled.fit), claim: result.ruled.claim && points(result.ruled.claim) },
  }
  const { line } = judged
  return line
    ? { ...judged, result: full, along: check, placesAt: (frames, rate) => lawCurve(line, check, frames, rate).map(point) }
    : { ...judged, result: full, along: check }
}

/** Distance from the path, positive to the left of the way the list goes at drawing i. */
function leftOf(course: Course, keys: readonly JudgedKey[], i: number): number {
  const read = (at: number) => keys[at]?.law ?? keys[at]?.reading ?? 0
  const goes = (read(Math.min(keys.length - 1, i + 1)) - read(Math.max(0, i - 1))) * course.perUnit
  const off = course.off[i] as number
  // The curve's normal points to the right of the way along it.
  return off === 0 ? 0 : goes < 0 ? off : -off
}

/** For the order of telling: a drawing off the path is as far off as that, whatever its timing. */
function strained(keys: readonly JudgedKey[], ratio: readonly number[]): JudgedKey[] {
  return keys.map((key, i) => {
    const across = Math.min(1e6, ratio[i] as number) * (key.allowance ?? 0)
    return across > Math.abs(key.offset ?? 0) ? { ...key, offset: across } : key
  })
}
