import { z } from 'zod'
import type { CheckResult } from './check'
import { anyKeys } from './check'
import { clientId, frame, line, LIMITS, prose, serverId, shotCode, slug, version } from './common'
import type { Time } from './common'
import type { PersonName } from './people'
import type { Claim, Decision, Desk, Sequence } from './production'
import type { Place } from '../motion/types'
import type { Thread } from './thread'

const takeNumber = z.coerce.number().int().min(1).max(100_000)
/** Which take the shot page shows; the newest standing one when left out. */
export const shotQuery = z.strictObject({ take: takeNumber.optional() })
export const takeParams = z.strictObject({ production: slug, code: shotCode, number: takeNumber })
export const flagParams = z.strictObject({ ...takeParams.shape, flag: serverId })
export const waiverParams = z.strictObject({ ...takeParams.shape, waiver: serverId })

/** A posting: the list itself. Law, measure, unit, slop and tolerance come from the shot's claim. */
export const newTake = z.strictObject({ clientId, keys: anyKeys, note: prose(LIMITS.noteChars).default('') })

export const findingKinds = [
  'misplaced', 'held', 'skipped', 'wrong-law', 'wrong-scale', 'not-at-rest', 'backward',
  'broken-joint', 'off-path', 'wrong-release',
] as const
export type FindingKind = (typeof findingKinds)[number]
/** Which finding of the judge's answer is meant: its kind and the frames it names. */
const findingName = z.strictObject({ kind: z.enum(findingKinds), frames: z.array(frame).max(2_000) })
export type FindingName = z.infer<typeof findingName>
/** Do both mean the same finding of one answer? */
export const sameFinding = (one: FindingName, other: FindingName): boolean =>
  one.kind === other.kind && one.frames.length === other.frames.length && one.frames.every((frame, i) => frame === other.frames[i])

export const newFlag = z
  .strictObject({
    clientId,
    fromFrame: frame,
    toFrame: frame,
    reason: prose(LIMITS.reasonChars, 1),
    finding: findingName.nullable().default(null),
  })
  .refine((flag) => flag.toFrame >= flag.fromFrame, {
    path: ['toFrame'],
    message: 'The run ends before it begins.',
  })
export const newWaiver = z.strictObject({ clientId, finding: findingName, reason: prose(LIMITS.reasonChars, 1) })
export const newRuling = z.strictObject({
  clientId,
  decision: z.enum(['stands', 'stands-with-notes', 'goes-back']),
  note: prose(LIMITS.noteChars).default(''),
  /** The shot's version that the supervisor was looking at. */
  version,
})
export { line }

export interface Flag {
  id: string
  fromFrame: number
  toFrame: number
  reason: string
  finding: FindingName | null
  by: PersonName
  at: Time
}
export interface Waiver {
  id: string
  finding: FindingName
  reason: string
  by: PersonName
  at: Time
}
export interface Ruling {
  id: string
  take: number
  decision: Decision
  note: string
  by: PersonName
  at: Time
  reopened: { by: PersonName; at: Time; reason: string } | null
}
/** A take without its list: one line of the history. */
export interface TakeLine {
  number: number
  by: PersonName
  at: Time
  note: string
  verdict: CheckResult['verdict']
  withdrawnAt: Time | null
  ruling: Ruling | null
}
export interface Take extends TakeLine {
  /** The claim as it stood when the list was posted: what the judge judged. */
  claim: Claim
  fps: number
  judgeVersion: string
  answer: CheckResult
  flags: Flag[]
  waivers: Waiver[]
}
/** Enough of a take to draw it on a sheet and say what the judge said. At most 60 drawings cross the wire. */
export interface TakeSketch {
  number: number
  verdict: CheckResult['verdict']
  /** One short sentence: "Frame 61 lands 0.8 frame early." */
  headline: string
  drawings: number
  /** `law` is null where no law could be fitted (verdict `undecided`); points only of lists that were posted as points. */
  marks: { frame: number; reading: number; law: number | null; breaks: boolean; point?: Place; lawPoint?: Place | null }[]
}
/** What is known of a shot itself: the answer to every change of it, and what a stale write is compared with. */
export interface ShotFacts {
  sequence: Sequence
  code: string
  title: string
  brief: string
  firstFrame: number
  lastFrame: number
  fps: number
  position: number
  dueOn: string | null
  animator: PersonName | null
  supervisor: PersonName | null
  claim: Claim | null
  version: number
  desk: Desk
  deskSince: Time
}
/** Everything that the shot page shows, for one chosen take. */
export interface ShotPage extends ShotFacts {
  production: { slug: string; title: string }
  takes: TakeLine[]
  /** The asked-for take, or the newest that was not taken back. */
  take: Take | null
  threads: Thread[]
  /** How many would get a letter if the asking person ruled on `take` now; 0 where they may not. */
  letterCount: number
  eventNumber: number
}
