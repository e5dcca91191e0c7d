/** Where two spans meet: position and speed carry over, unless the claim says contact there. */
import type { CheckRequest, Finding, JudgedJoint, JudgedKey } from '../types'
import type { JudgedPart } from './judgePart'
import { sideOf } from './side'
import type { Side } from './side'
import { spansApart, speedJumps } from './words'

/** How many spreads of the two fits a difference must exceed before it counts: clean lists have up to three joints, each looked at twice. */
const SPREADS_APART = 3
const SPREADS_OF_SPEED = 3.3

export interface JointJudgement {
  joint: JudgedJoint
  finding: Finding | null
  /** There where the joint's own drawing is what is wrong: how it sits against the lines that meet there. `finding` tells of it, if not null. */
  key: JudgedKey | null
}

interface Meeting {
  before: Side
  after: Side
  apart: number
  meets: boolean
  keepsSpeed: boolean
}

/** Judges the joint at `frame` (of a key) between two judged parts. */
export function judgeJoint(request: CheckRequest, before: JudgedPart, after: JudgedPart, frame: number): JointJudgement {
  const contact = before.span.contact === true
  const plain = meeting(request, before, after, frame, contact, false)
  if (!plain) return sidesAlone(before, after, frame, contact)
  const off = [before, after].some(part => keyAt(part, frame)?.breaks)
  const suspect = off || !plain.meets || !(plain.keepsSpeed || contact)
  const bare = suspect ? meeting(request, before, after, frame, contact, true) : null
  // Both lines, drawn without it, meet elsewhere: the drawing is off, not the joint.
  const key = bare && holds(bare, contact) ? strayKey(request, before, after, bare, frame) : null
  if (bare && key) return { joint: jointOf(bare, frame, contact, true), finding: null, key }
  const judged = off && bare ? bare : plain
  const whole = holds(judged, contact)
  return { joint: jointOf(judged, frame, contact, whole), finding: whole ? null : brokenJoint(judged, frame, request.unit), key: null }
}

const holds = ({ meets, keepsSpeed }: Meeting, contact: boolean) => meets && (contact || keepsSpeed)

function meeting(
  { slop, tolerance }: CheckRequest, beforePart: JudgedPart, afterPart: JudgedPart, frame: number, contact: boolean, bare: boolean,
): Meeting | null {
  const before = sideOf(beforePart, 'last', frame, bare)
  const after = sideOf(afterPart, 'first', frame, bare)
  if (!before || !after) return null
  const apart = after.value - before.value
  const change = Math.abs(after.speed - before.speed)
  const exposure = (before.exposure + after.exposure) / 2
  const gap = (Math.abs(before.speed) * before.exposure + Math.abs(after.speed) * after.exposure) / 2
  const noticed = slop + tolerance * gap
  // A contact may fall between two drawings: the lines then cross up to one exposure away.
  const room = contact ? change * Math.max(before.exposure, after.exposure) : 0
  return {
    before, after, apart,
    meets: Math.abs(apart) <= noticed + room + SPREADS_APART * Math.sqrt(before.valueVariance + after.valueVariance),
    keepsSpeed: change <= noticed / exposure + SPREADS_OF_SPEED * Math.sqrt(before.speedVariance + after.speedVariance),
  }
}

const keyAt = ({ judgement: { result } }: JudgedPart, frame: number) => result.keys.find(key => key.frame === frame)

/** The joint's drawing where it lies off both lines, as it would be judged against the two together; null where it lies on either. */
function strayKey(
  { slop, tolerance }: CheckRequest, beforePart: JudgedPart, afterPart: JudgedPart, { before, after }: Meeting, frame: number,
): JudgedKey | null {
  const key = keyAt(beforePart, frame) ?? keyAt(afterPart, frame)
  if (!key) return null
  // The line that is better known at the joint weighs more.
  const share = before.valueVariance / Math.max(Number.MIN_VALUE, before.valueVariance + after.valueVariance)
  const law = before.value + share * (after.value - before.value)
  const speed = before.speed + share * (after.speed - before.speed)
  const gap = (Math.abs(before.speed) * before.exposure + Math.abs(after.speed) * after.exposure) / 2
  const allowance = slop + tolerance * gap
  const strays = [before, after].every(({ value, valueVariance }) => Math.abs(key.reading - value) > allowance + Math.sqrt(valueVariance))
  if (!strays || Math.abs(key.reading - law) <= allowance) return null
  const offset = key.reading - law
  return { ...key, law, offset, offsetFrames: Math.abs(speed) * before.exposure > slop / 4 ? offset / speed : null, allowance, breaks: true }
}

/** What can be said of a joint when a side has no line of its own law: nothing is held against it. */
function sidesAlone(before: JudgedPart, after: JudgedPart, frame: number, contact: boolean): JointJudgement {
  const left = sideOf(before, 'last', frame, false)
  const right = sideOf(after, 'first', frame, false)
  return { joint: { frame, contact, before: left?.speed ?? null, after: right?.speed ?? null, apart: null, holds: true }, finding: null, key: null }
}

function jointOf({ before, after, apart }: Meeting, frame: number, contact: boolean, whole: boolean): JudgedJoint {
  return { frame, contact, before: before.speed, after: after.speed, apart, holds: whole }
}

function brokenJoint({ before, after, apart, meets }: Meeting, frame: number, unit: string): Finding {
  return {
    kind: 'broken-joint', frames: [frame], amount: after.speed - before.speed,
    text: meets ? speedJumps(frame, before.speed, after.speed, unit) : spansApart(frame, apart, unit),
  }
}

