import type { Time } from './contracts/common'
import type { Decision, Desk, Stamp } from './contracts/production'

/** As much of a take as decides whose move it is. */
export interface Posting {
  number: number
  at: Time
  withdrawnAt: Time | null
  ruling: { decision: Decision; at: Time; reopenedAt: Time | null } | null
}
export interface DeskState {
  desk: Desk
  /** When the shot came to this desk. */
  since: Time
  /** The last ruling; null before the first, and while the last one is reopened. */
  stamp: Stamp | null
  /** Number of the newest take that was not taken back. */
  newest: number | null
}

const later = (one: Time, other: Time | null): Time => (other !== null && other > one ? other : one)

/**
 * Whose move it is, from the takes of a shot in the order of their numbers: the newest take that was not taken back
 * decides, together with its ruling. Nothing else ever sets a desk.
 */
export function deskOf(shotCreatedAt: Time, takes: readonly Posting[]): DeskState {
  const newest = takes.findLast((take) => take.withdrawnAt === null)
  // A later take that was taken back again moved the shot to the supervisor and, on that day, back here.
  const back = takes
    .filter((take) => take.number > (newest?.number ?? 0))
    .reduce<Time | null>((last, take) => later(take.withdrawnAt ?? '', last), null)
  const last = takes.findLast((take) => take.ruling !== null)
  const stamp: Stamp | null =
    last?.ruling && last.ruling.reopenedAt === null
      ? { take: last.number, decision: last.ruling.decision, at: last.ruling.at }
      : null
  const at = (desk: Desk, since: Time): DeskState => ({ desk, since, stamp, newest: newest?.number ?? null })

  if (!newest) return at('not-started', later(shotCreatedAt, back))
  const { ruling } = newest
  if (!ruling) return at('supervisor', newest.at)
  if (ruling.decision === 'goes-back') return at('animator', later(ruling.at, back))
  if (ruling.reopenedAt !== null) return at('animator', later(ruling.reopenedAt, back))
  return at('settled', ruling.at)
}
