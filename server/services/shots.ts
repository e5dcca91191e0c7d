import { v7 as uuid } from 'uuid'
import type { z } from 'zod'
import { Sequence, Shot } from '~/server/models'
import type { Production } from '~/server/models'
import { row } from '~/server/models/database'
import { fail, invalid, stale } from '~/server/utils/fail'
import { usedElsewhere } from '~/server/utils/made'
import type { Made } from '~/server/utils/made'
import { LIMITS } from '~/utils/contracts/common'
import type { newShot, shotChange } from '~/utils/contracts/production'
import type { ShotFacts, TakeLine } from '~/utils/contracts/take'
import { deskOf } from '~/utils/desk'
import { may } from '~/utils/permissions'
import type { Role } from '~/utils/permissions'
import { appendEvent } from './events'
import { postings, takeLines } from './history'
import { named, now, sequenceWire } from './wire'
import type { InProduction, OnShot } from './wire'

/** Room between two shots, so that one more fits without moving the others. */
const STEP = 10

interface PlaceRow {
  code: string
  title: string
  position: number
  animatorId: string | null
  animatorName: string | null
  supervisorId: string | null
  supervisorName: string | null
}

/** What stands on record of a shot now. `lines` saves a query where the caller has them. */
export async function shotFacts(shot: Shot, lines?: readonly TakeLine[]): Promise<ShotFacts> {
  const place = await row<PlaceRow>(
    `SELECT sequences.code, sequences.title, sequences.position,
            animator.id AS animatorId, animator.name AS animatorName,
            supervisor.id AS supervisorId, supervisor.name AS supervisorName
       FROM sequences
       LEFT JOIN people AS animator ON animator.id = :animator
       LEFT JOIN people AS supervisor ON supervisor.id = :supervisor
      WHERE sequences.id = :sequence`,
    { sequence: shot.sequenceId, animator: shot.animatorId ?? null, supervisor: shot.supervisorId ?? null },
  )
  if (!place) throw new Error('A shot without its sequence.')
  const { desk, since } = deskOf(shot.createdAt, postings(lines ?? (await takeLines(shot.id))))
  return {
    sequence: sequenceWire(place),
    code: shot.code,
    title: shot.title,
    brief: shot.brief,
    firstFrame: shot.firstFrame,
    lastFrame: shot.lastFrame,
    fps: shot.fps,
    position: shot.position,
    dueOn: shot.dueOn ?? null,
    animator: named(place.animatorId, place.animatorName),
    supervisor: named(place.supervisorId, place.supervisorName),
    claim: shot.claim ?? null,
    version: shot.version,
    desk,
    deskSince: since,
  }
}

/** @throws 409 with what stands now, when the writer looked at an older version. */
export async function requireFresh(shot: Shot, version: number): Promise<void> {
  if (shot.version !== version) stale(await shotFacts(shot))
}

/** Something changed that a ruler should have seen: whoever looked before looks again. */
export async function raiseVersion(shot: Shot): Promise<void> {
  await shot.update({ version: shot.version + 1 })
}

export async function createShot(
  { production, person }: InProduction,
  body: z.infer<typeof newShot>,
): Promise<Made<ShotFacts>> {
  const before = await Shot.findOne({ where: { createdBy: person.id, clientId: body.clientId } })
  if (before && before.productionId !== production.id) usedElsewhere()
  if (before) return { made: false, answer: await shotFacts(before) }

  if (await Shot.count({ where: { productionId: production.id, code: body.code } }))
    fail(409, `There is a shot ${body.code} already.`, { issues: [{ path: 'code', message: `There is a shot ${body.code} already.` }] })
  if ((await Shot.count({ where: { productionId: production.id } })) >= LIMITS.shotsPerProduction)
    fail(409, `A production has at most ${LIMITS.shotsPerProduction} shots.`)
  const sequence = await findSequence(production, body.sequence)
  await requireRoles(production, body)
  const shot = await Shot.create({
    id: uuid(),
    clientId: body.clientId,
    productionId: production.id,
    sequenceId: sequence.id,
    code: body.code,
    title: body.title,
    firstFrame: body.firstFrame,
    lastFrame: body.lastFrame,
    fps: body.fps,
    brief: body.brief,
    position: body.position ?? (await nextPosition(sequence.id)),
    dueOn: body.dueOn,
    animatorId: body.animator,
    supervisorId: body.supervisor,
    createdBy: person.id,
    createdAt: now(),
  })
  await appendEvent(production, { kind: 'shot', shot, personId: person.id })
  return { made: true, answer: await shotFacts(shot) }
}

export async function changeShot({ production, shot, person }: OnShot, body: z.infer<typeof shotChange>): Promise<ShotFacts> {
  await requireFresh(shot, body.version)
  const { version, sequence, animator, supervisor, ...plain } = body
  if ((plain.lastFrame ?? shot.lastFrame) < (plain.firstFrame ?? shot.firstFrame))
    invalid(plain.lastFrame === undefined ? 'firstFrame' : 'lastFrame', 'The last frame does not come before the first.')
  // Whoever stands there already may stay, even when they have left the production since.
  await requireRoles(production, {
    animator: animator === shot.animatorId ? null : animator,
    supervisor: supervisor === shot.supervisorId ? null : supervisor,
  })
  shot.set({
    ...plain,
    ...(sequence === undefined ? {} : { sequenceId: (await findSequence(production, sequence)).id }),
    ...(animator === undefined ? {} : { animatorId: animator }),
    ...(supervisor === undefined ? {} : { supervisorId: supervisor }),
  })
  if (shot.changed()) {
    // Not `update`: that saves its own columns only.
    shot.version = version + 1
    await shot.save()
    await appendEvent(production, { kind: 'shot', shot, personId: person.id })
  }
  return shotFacts(shot)
}

async function findSequence(production: Production, code: string): Promise<Sequence> {
  return (
    (await Sequence.findOne({ where: { productionId: production.id, code } })) ??
    invalid('sequence', `There is no sequence ${code} in this production.`)
  )
}

async function nextPosition(sequenceId: string): Promise<number> {
  const last = await row<{ position: number | null }>('SELECT max(position) AS position FROM shots WHERE sequence_id = :sequenceId', {
    sequenceId,
  })
  return last?.position == null ? STEP : last.position + STEP
}

interface Assigned {
  animator?: string | null
  supervisor?: string | null
}

/** @throws 422 for somebody who is no member, or whose role never has such a desk. */
async function requireRoles(production: Production, { animator, supervisor }: Assigned): Promise<void> {
  if (animator) {
    const role = await roleOf(production, animator)
    if (!may(role, 'take.post', { ownShot: true })) invalid('animator', 'A shot’s animator is an animator or a supervisor of this production.')
  }
  if (supervisor) {
    const role = await roleOf(production, supervisor)
    if (!may(role, 'take.rule')) invalid('supervisor', 'A shot’s supervisor is a supervisor of this production.')
  }
}

async function roleOf(production: Production, personId: string): Promise<Role | null> {
  const found = await row<{ role: Role }>(
    `SELECT memberships.role FROM memberships JOIN people ON people.id = memberships.person_id
      WHERE memberships.production_id = :production AND memberships.person_id = :personId AND people.disabled_at IS NULL`,
    { production: production.id, personId },
  )
  return found?.role ?? null
}
