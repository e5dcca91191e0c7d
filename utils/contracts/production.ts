import { z } from 'zod'
import { claim, fps } from './check'
import type { Claim } from './check'
import { clientId, day, frame, line, LIMITS, prose, sequenceCode, serverId, shotCode, slug, version } from './common'
import type { Day, Time } from './common'
import type { PersonName } from './people'
import type { Role } from '../permissions'
import type { TakeSketch } from './take'

/** Whose move it is. Derived from takes and rulings, never set by hand. */
export const desks = ['not-started', 'animator', 'supervisor', 'settled'] as const
export type Desk = (typeof desks)[number]

export const decisions = ['stands', 'stands-with-notes', 'goes-back'] as const
export type Decision = (typeof decisions)[number]

/** What the shot says it shows: motion.md. The unit of slop is the unit of the readings. */
export { claim }
export type { Claim }

export const productionParams = z.strictObject({ production: slug })
export const shotParams = z.strictObject({ production: slug, code: shotCode })
export const sequenceParams = z.strictObject({ production: slug, sequence: sequenceCode })

export const newSequence = z.strictObject({ code: sequenceCode, title: line(LIMITS.titleChars) })
export const sequenceChange = z.strictObject({
  title: line(LIMITS.titleChars).optional(),
  position: z.number().int().min(0).max(100_000).optional(),
})

const shotFields = {
  title: line(LIMITS.titleChars),
  sequence: sequenceCode,
  firstFrame: frame,
  lastFrame: frame,
  fps,
  brief: prose(LIMITS.briefChars),
  position: z.number().int().min(0).max(1_000_000),
  dueOn: day.nullable(),
  animator: serverId.nullable(),
  supervisor: serverId.nullable(),
}
const orderedRange = (value: { firstFrame?: number; lastFrame?: number }) =>
  value.firstFrame === undefined || value.lastFrame === undefined || value.lastFrame >= value.firstFrame
const rangeMessage = { path: ['lastFrame'], message: 'The last frame does not come before the first.' }

export const newShot = z
  .strictObject({
    clientId,
    code: shotCode,
    ...shotFields,
    brief: shotFields.brief.default(''),
    position: shotFields.position.optional(),
    dueOn: shotFields.dueOn.default(null),
    animator: shotFields.animator.default(null),
    supervisor: shotFields.supervisor.default(null),
  })
  .refine(orderedRange, rangeMessage)
export const shotChange = z.strictObject({ ...z.object(shotFields).partial().shape, version }).refine(orderedRange, rangeMessage)
export const claimChange = z.strictObject({ claim, version })
export const reopening = z.strictObject({ reason: prose(LIMITS.reasonChars, 1), version })
export const eventsQuery = z.strictObject({ after: z.coerce.number().int().min(0).default(0) })

export interface Sequence {
  code: string
  title: string
  position: number
}
export interface Production {
  slug: string
  title: string
  /** The asking person's role. */
  role: Role
  sequences: Sequence[]
  members: (PersonName & { role: Role })[]
}
/** A stamp: the last ruling. There is none while that one is reopened: an older ruling does not come back. */
export interface Stamp {
  take: number
  decision: Decision
  at: Time
}
/** One sheet of the wall. */
export interface Sheet {
  code: string
  title: string
  sequence: string
  position: number
  dueOn: Day | null
  animator: PersonName | null
  supervisor: PersonName | null
  desk: Desk
  /** When the shot came to this desk. */
  deskSince: Time
  stamp: Stamp | null
  openThreads: number
  claim: Claim | null
  /** The newest take that was not taken back, drawn small; null before the first. */
  sketch: TakeSketch | null
}
export interface Wall {
  production: { slug: string; title: string }
  sequences: Sequence[]
  sheets: Sheet[]
  /** Number of the newest event that this answer already holds. */
  eventNumber: number
}
