import { v7 as uuid } from 'uuid'
import type { z } from 'zod'
import { Ruling, Take } from '~/server/models'
import { fail, stale } from '~/server/utils/fail'
import { usedElsewhere } from '~/server/utils/made'
import type { Made } from '~/server/utils/made'
import type { reopening } from '~/utils/contracts/production'
import type { newRuling, Ruling as RulingWire, ShotFacts } from '~/utils/contracts/take'
import { deskOf } from '~/utils/desk'
import { appendEvent } from './events'
import { postings, takeLines } from './history'
import { oweRulingLetters } from './letters'
import { raiseVersion, requireFresh, shotFacts } from './shots'
import { asker, now } from './wire'
import type { OnShot, OnTake } from './wire'

/**
 * Rules on the newest standing take, once. The ruling, the shot's new desk, the event and the letters it owes are one
 * transaction: the caller's. @throws 409 with what stands now, when somebody was faster or the ruler looked at less.
 */
export async function rule({ production, shot, take, person }: OnTake, body: z.infer<typeof newRuling>): Promise<Made<RulingWire>> {
  const before = await Ruling.findOne({ where: { personId: person.id, clientId: body.clientId } })
  if (before && before.takeId !== take.id) usedElsewhere()
  if (before) return { made: false, answer: await rulingOn(take) }

  const lines = await takeLines(shot.id)
  const current = await shotFacts(shot, lines)
  const { newest } = deskOf(shot.createdAt, postings(lines))
  if (take.withdrawnAt) fail(409, `Take ${take.number} was taken back.`, { current })
  if (lines.find((line) => line.number === take.number)?.ruling) fail(409, `Take ${take.number} has been ruled on already.`, { current })
  if (newest !== take.number) fail(409, `Take ${newest} is newer: rule on that one.`, { current })
  if (shot.version !== body.version) stale(current)

  const ruling = await Ruling.create({
    id: uuid(),
    clientId: body.clientId,
    takeId: take.id,
    decision: body.decision,
    note: body.note,
    personId: person.id,
    createdAt: now(),
  })
  await raiseVersion(shot)
  await appendEvent(production, { kind: 'ruling', shot, personId: person.id, take: take.number })
  await oweRulingLetters(ruling)
  return { made: true, answer: rulingWire(ruling, take.number, person) }
}

/** Puts a settled shot back on the animator's desk, with the reason; the ruling stays on record as reopened. */
export async function reopen({ production, shot, person }: OnShot, body: z.infer<typeof reopening>): Promise<ShotFacts> {
  const lines = await takeLines(shot.id)
  const { desk, newest } = deskOf(shot.createdAt, postings(lines))
  if (desk !== 'settled' || newest === null)
    return fail(409, 'This shot is not settled: there is nothing to reopen.', { current: await shotFacts(shot, lines) })
  await requireFresh(shot, body.version)
  const take = await Take.findOne({ where: { shotId: shot.id, number: newest }, rejectOnEmpty: true })
  await Ruling.update(
    { reopenedAt: now(), reopenedBy: person.id, reopenedReason: body.reason },
    { where: { takeId: take.id } },
  )
  await raiseVersion(shot)
  await appendEvent(production, { kind: 'reopening', shot, personId: person.id, take: newest })
  return shotFacts(shot)
}

async function rulingOn(take: Take): Promise<RulingWire> {
  const ruling = (await takeLines(take.shotId)).find((line) => line.number === take.number)?.ruling
  if (!ruling) throw new Error('A ruling without its take.')
  return ruling
}

const rulingWire = (ruling: Ruling, take: number, by: OnTake['person']): RulingWire => ({
  id: ruling.id,
  take,
  decision: ruling.decision,
  note: ruling.note,
  by: asker(by),
  at: ruling.createdAt,
  reopened: null,
})
