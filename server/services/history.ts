import { rows } from '~/server/models/database'
import type { Decision } from '~/utils/contracts/production'
import type { Ruling, TakeLine } from '~/utils/contracts/take'
import type { Verdict } from '~/utils/motion/types'
import { named, someone } from './wire'

interface LineRow {
  number: number
  note: string
  verdict: Verdict
  at: string
  withdrawnAt: string | null
  personId: string
  personName: string
  rulingId: string | null
  decision: Decision
  rulingNote: string
  ruledAt: string
  rulerId: string
  rulerName: string
  reopenedAt: string | null
  reopenedBy: string | null
  reopenerName: string | null
  reopenedReason: string | null
}

/** Every take of a shot in the order of their numbers, with its ruling and without its list. */
export async function takeLines(shotId: string): Promise<TakeLine[]> {
  const found = await rows<LineRow>(
    `SELECT takes.number, takes.note, takes.verdict, takes.created_at AS at, takes.withdrawn_at AS withdrawnAt,
            poster.id AS personId, poster.name AS personName,
            rulings.id AS rulingId, rulings.decision, rulings.note AS rulingNote, rulings.created_at AS ruledAt,
            ruler.id AS rulerId, ruler.name AS rulerName,
            rulings.reopened_at AS reopenedAt, reopener.id AS reopenedBy, reopener.name AS reopenerName,
            rulings.reopened_reason AS reopenedReason
       FROM takes
       JOIN people AS poster ON poster.id = takes.person_id
       LEFT JOIN rulings ON rulings.take_id = takes.id
       LEFT JOIN people AS ruler ON ruler.id = rulings.person_id
       LEFT JOIN people AS reopener ON reopener.id = rulings.reopened_by
      WHERE takes.shot_id = :shotId ORDER BY takes.number`,
    { shotId },
  )
  return found.map((line) => ({
    number: line.number,
    by: someone(line.personId, line.personName),
    at: line.at,
    note: line.note,
    verdict: line.verdict,
    withdrawnAt: line.withdrawnAt,
    ruling: rulingOf(line),
  }))
}

function rulingOf(line: LineRow): Ruling | null {
  if (line.rulingId === null) return null
  const reopener = named(line.reopenedBy, line.reopenerName)
  return {
    id: line.rulingId,
    take: line.number,
    decision: line.decision,
    note: line.rulingNote,
    by: someone(line.rulerId, line.rulerName),
    at: line.ruledAt,
    reopened:
      reopener && line.reopenedAt !== null ? { by: reopener, at: line.reopenedAt, reason: line.reopenedReason ?? '' } : null,
  }
}

/** Takes as `deskOf` wants them. */
export const postings = (lines: readonly TakeLine[]) =>
  lines.map(({ number, at, withdrawnAt, ruling }) => ({
    number,
    at,
    withdrawnAt,
    ruling: ruling && { decision: ruling.decision, at: ruling.at, reopenedAt: ruling.reopened?.at ?? null },
  }))
