/** Where two spans of points meet: the place on the drawing and the velocity carry over, unless the claim says contact there. */
import { misplacedFinding } from '../findings'
import { RADIAN } from '../series'
import type { CheckRequest, Finding, JudgedJoint, JudgedKey } from '../types'
import { narrowed } from './divide'
import type { JointJudgement } from './joint'
import { judgePart } from './judgePart'
import type { JudgedPart } from './judgePart'
import { pointSideOf } from './pointSide'
import type { PointSide } from './pointSide'
import { spansApart, speedJumps, wayTurns } from './words'

/** As for readings, in both ways of the drawing: how many spreads of the two fits a difference must exceed before it counts. */
const SPREADS_APART = 3
const SPREADS_OF_SPEED = 3.3

interface Meeting {
  before: PointSide
  after: PointSide
  apart: number
  /** Length of the difference of the two velocities. */
  change: number
  meets: boolean
  keepsSpeed: boolean
}

/** Judges the joint at `frame` (of a key) between two judged parts of a list of points. */
export function judgePointJoint(request: CheckRequest, before: JudgedPart, after: JudgedPart, frame: number): JointJudgement {
  const contact = before.span.contact === true
  const plain = meeting(request, before, after, frame, contact)
  if (!plain) return sidesAlone(before, after, frame, contact)
  if (holds(plain, contact)) return { joint: jointOf(plain, frame, contact, true), finding: null, key: null }
  // A drawing that is off drags both lines with it: without it they may well meet.
  const bare = meeting(request, bareOf(request, before, 'last', frame), bareOf(request, after, 'first', frame), frame, contact)
  const stray = bare && holds(bare, contact) ? strayKey(request, before, after, bare, frame) : null
  if (bare && stray) return { joint: jointOf(bare, frame, contact, true), ...stray }
  return { joint: jointOf(plain, frame, contact, false), finding: brokenJoint(plain, frame, request.unit), key: null }
}

const holds = ({ meets, keepsSpeed }: Meeting, contact: boolean) => meets && (contact || keepsSpeed)

function meeting({ slop, tolerance }: CheckRequest, beforePart: JudgedPart, afterPart: JudgedPart, frame: number, contact: boolean): Meeting | null {
  const before = pointSideOf(beforePart, 'last', frame)
  const after = pointSideOf(afterPart, 'first', frame)
  if (!before || !after) return null
  const apart = Math.hypot(after.place.x - before.place.x, after.place.y - before.place.y)
  const change = Math.hypot(after.velocity.x - before.velocity.x, after.velocity.y - before.velocity.y)
  const exposure = (before.exposure + after.exposure) / 2
  const noticed = slop + tolerance * (before.speed * before.exposure + after.speed * after.exposure) / 2
  // A contact may fall between two drawings: the lines then cross up to one exposure away.
  const room = contact ? change * Math.max(before.exposure, after.exposure) : 0
  return {
    before, after, apart, change,
    meets: apart <= noticed + room + SPREADS_APART * Math.sqrt(before.placeVariance + after.placeVariance),
    keepsSpeed: change <= noticed / exposure + SPREADS_OF_SPEED * Math.sqrt(before.velocityVariance + after.velocityVariance),
  }
}

/** The part judged again without the joint's own drawing. */
function bareOf(request: CheckRequest, part: JudgedPart, end: 'first' | 'last', frame: number): JudgedPart {
  const [first, last] = end === 'first' ? [part.first + 1, part.last] : [part.first, part.last - 1]
  const own = request.keys[end === 'first' ? part.first : part.last]
  return own?.frame === frame ? judgePart(narrowed(request, part, first, last)) : part
}

/** The joint's drawing where it lies off both lines; null where it lies on either. */
function strayKey({ slop, tolerance, unit }: CheckRequest, beforePart: JudgedPart, afterPart: JudgedPart, { before, after }: Meeting, frame: number) {
  const key = keyAt(beforePart, frame) ?? keyAt(afterPart, frame)
  const point = key?.point
  if (!key || !point) return null
  const allowance = slop + tolerance * (before.speed * before.exposure + after.speed * after.exposure) / 2
  const offFrom = ({ place }: PointSide) => Math.hypot(point.x - place.x, point.y - place.y)
  if (![before, after].every(side => offFrom(side) > allowance + Math.sqrt(side.placeVariance))) return null
  // The line that is better known at the joint says where the drawing belongs.
  const known = before.placeVariance <= after.placeVariance ? before : after
  const stray: JudgedKey = { ...key, lawPoint: known.place, breaks: true }
  return { key: stray, finding: misplacedFinding({ ...stray, offset: offFrom(known), offsetFrames: null }, unit) }
}

const keyAt = ({ judgement: { result } }: JudgedPart, frame: number) => result.keys.find(key => key.frame === frame)

/** What can be said of a joint when a side has no line of its own law: nothing is held against it. */
function sidesAlone(before: JudgedPart, after: JudgedPart, frame: number, contact: boolean): JointJudgement {
  const [left, right] = [pointSideOf(before, 'last', frame), pointSideOf(after, 'first', frame)]
  return { joint: { frame, contact, before: left?.speed ?? null, after: right?.speed ?? null, apart: null, holds: true }, finding: null, key: null }
}

function jointOf({ before, after, apart }: Meeting, frame: number, contact: boolean, whole: boolean): JudgedJoint {
  return { frame, contact, before: before.speed, after: after.speed, apart, holds: whole }
}

function brokenJoint({ before, after, apart, change, meets }: Meeting, frame: number, unit: string): Finding {
  const text = !meets
    ? spansApart(frame, apart, unit)
    // Speeds that hardly differ say nothing of a corner.
    : Math.abs(after.speed - before.speed) < change / 2
      ? wayTurns(frame, turnBetween(before, after) / RADIAN)
      : speedJumps(frame, before.speed, after.speed, unit)
  return { kind: 'broken-joint', frames: [frame], amount: change, text }
}

/** Angle between the two velocities, radians, 0 to π. */
function turnBetween({ velocity: u }: PointSide, { velocity: v }: PointSide): number {
  return Math.atan2(Math.abs(u.x * v.y - u.y * v.x), u.x * v.x + u.y * v.y)
}
