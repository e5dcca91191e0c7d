import type { Production } from '~/server/models'
import { row, rows } from '~/server/models/database'
import { notFound } from '~/server/utils/fail'
import type { Claim, Decision, Sequence, Sheet, Wall } from '~/utils/contracts/production'
import type { TakeSketch } from '~/utils/contracts/take'
import { deskOf } from '~/utils/desk'
import type { Posting } from '~/utils/desk'
import { named } from './wire'

interface ShotRow {
  id: string
  code: string
  title: string
  sequence: string
  position: number
  dueOn: string | null
  claim: string | null
  createdAt: string
  animatorId: string | null
  animatorName: string | null
  supervisorId: string | null
  supervisorName: string | null
  openThreads: number
}
interface PostingRow {
  shotId: string
  number: number
  at: string
  withdrawnAt: string | null
  decision: Decision | null
  ruledAt: string
  reopenedAt: string | null
}

/**
 * The whole wall in five queries, however many shots it has. The event number was read first: whatever changes while
 * the sheets are read comes again as an event.
 */
export async function wall(production: Production): Promise<Wall> {
  const newest = await row<{ n: number }>('SELECT event_number AS n FROM productions WHERE id = :id', { id: production.id })
  return {
    production: { slug: production.slug, title: production.title },
    sequences: await sequencesOf(production.id),
    sheets: await sheets(production.id),
    eventNumber: newest?.n ?? 0,
  }
}

/** One sheet, for a wall that heard of a change. @throws 404 */
export async function sheet(production: Production, code: string): Promise<Sheet> {
  return (await sheets(production.id, code))[0] ?? notFound()
}

/** In story order. */
export function sequencesOf(productionId: string): Promise<Sequence[]> {
  return rows<Sequence>('SELECT code, title, position FROM sequences WHERE production_id = :productionId ORDER BY position, code', {
    productionId,
  })
}

/** The sheets of a production in story order, or the one with `code`. */
async function sheets(productionId: string, code: string | null = null): Promise<Sheet[]> {
  const which = { productionId, code }
  const shots = await rows<ShotRow>(
    `SELECT shots.id, shots.code, shots.title, sequences.code AS sequence, shots.position, shots.due_on AS dueOn, shots.claim,
            shots.created_at AS createdAt,
            animator.id AS animatorId, animator.name AS animatorName,
            supervisor.id AS supervisorId, supervisor.name AS supervisorName,
            (SELECT count(*) FROM threads WHERE threads.shot_id = shots.id AND threads.settled_at IS NULL) AS openThreads
       FROM shots
       JOIN sequences ON sequences.id = shots.sequence_id
       LEFT JOIN people AS animator ON animator.id = shots.animator_id
       LEFT JOIN people AS supervisor ON supervisor.id = shots.supervisor_id
      WHERE shots.production_id = :productionId AND (:code IS NULL OR shots.code = :code)
      ORDER BY sequences.position, sequences.code, shots.position, shots.code`,
    which,
  )
  const history = await postingsByShot(which)
  const drawn = await sketchesByShot(which)
  return shots.map((shot) => {
    const { desk, since, stamp } = deskOf(shot.createdAt, history.get(shot.id) ?? [])
    return {
      code: shot.code,
      title: shot.title,
      sequence: shot.sequence,
      position: shot.position,
      dueOn: shot.dueOn,
      animator: named(shot.animatorId, shot.animatorName),
      supervisor: named(shot.supervisorId, shot.supervisorName),
      desk,
      deskSince: since,
      stamp,
      openThreads: shot.openThreads,
      claim: shot.claim === null ? null : (JSON.parse(shot.claim) as Claim),
      sketch: drawn.get(shot.id) ?? null,
    }
  })
}

type Which = { productionId: string; code: string | null }

async function postingsByShot(which: Which): Promise<Map<string, Posting[]>> {
  const found = await rows<PostingRow>(
    `SELECT takes.shot_id AS shotId, takes.number, takes.created_at AS at, takes.withdrawn_at AS withdrawnAt,
            rulings.decision, rulings.created_at AS ruledAt, rulings.reopened_at AS reopenedAt
       FROM takes
       JOIN shots ON shots.id = takes.shot_id
       LEFT JOIN rulings ON rulings.take_id = takes.id
      WHERE shots.production_id = :productionId AND (:code IS NULL OR shots.code = :code)
      ORDER BY takes.shot_id, takes.number`,
    which,
  )
  const byShot = new Map<string, Posting[]>()
  for (const { shotId, number, at, withdrawnAt, decision, ruledAt, reopenedAt } of found) {
    const posting = { number, at, withdrawnAt, ruling: decision && { decision, at: ruledAt, reopenedAt } }
    const before = byShot.get(shotId)
    if (before) before.push(posting)
    else byShot.set(shotId, [posting])
  }
  return byShot
}

/** The stored drawing of each shot's newest take that was not taken back. */
async function sketchesByShot(which: Which): Promise<Map<string, TakeSketch>> {
  const found = await rows<{ shotId: string; sketch: string }>(
    `SELECT takes.shot_id AS shotId, takes.sketch
       FROM shots
       JOIN takes ON takes.shot_id = shots.id
        AND takes.number = (SELECT max(number) FROM takes AS own WHERE own.shot_id = shots.id AND own.withdrawn_at IS NULL)
      WHERE shots.production_id = :productionId AND (:code IS NULL OR shots.code = :code)`,
    which,
  )
  return new Map(found.map(({ shotId, sketch }) => [shotId, JSON.parse(sketch) as TakeSketch]))
}
