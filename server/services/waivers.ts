import { v7 as uuid } from 'uuid'
import type { z } from 'zod'
import { Waiver } from '~/server/models'
import { fail, invalid, notFound } from '~/server/utils/fail'
import { usedElsewhere } from '~/server/utils/made'
import type { Made } from '~/server/utils/made'
import { sameFinding } from '~/utils/contracts/take'
import type { newWaiver, Waiver as WaiverWire } from '~/utils/contracts/take'
import { appendEvent } from './events'
import { raiseVersion } from './shots'
import { hasFinding, requireUnruled } from './takes'
import { asker, now } from './wire'
import type { OnTake } from './wire'

/** Lets one finding of the judge pass, with the reason. */
export async function waive({ production, shot, take, person }: OnTake, body: z.infer<typeof newWaiver>): Promise<Made<WaiverWire>> {
  const before = await Waiver.findOne({ where: { personId: person.id, clientId: body.clientId } })
  if (before && before.takeId !== take.id) usedElsewhere()
  if (before) return { made: false, answer: waiverWire(before, person) }

  await requireUnruled(take)
  if (!hasFinding(take, body.finding)) invalid('finding', 'The judge’s answer to this take has no such finding.')
  const standing = await Waiver.findAll({ where: { takeId: take.id, liftedAt: null } })
  if (standing.some((waiver) => sameFinding(waiver.finding, body.finding))) fail(409, 'This finding is waived already.')
  const waiver = await Waiver.create({
    id: uuid(),
    clientId: body.clientId,
    takeId: take.id,
    finding: body.finding,
    reason: body.reason,
    personId: person.id,
    createdAt: now(),
  })
  await raiseVersion(shot)
  await appendEvent(production, { kind: 'waiver', shot, personId: person.id, take: take.number })
  return { made: true, answer: waiverWire(waiver, person) }
}

/** Lifts a waiver, whoever gave it. Lifting it twice is lifting it once. @throws 404, 409 once the take is ruled on */
export async function liftWaiver({ production, shot, take, person }: OnTake, id: string): Promise<void> {
  const waiver = (await Waiver.findOne({ where: { takeId: take.id, id } })) ?? notFound()
  if (waiver.liftedAt) return
  await requireUnruled(take)
  await waiver.update({ liftedAt: now(), liftedBy: person.id })
  await raiseVersion(shot)
  await appendEvent(production, { kind: 'waiver', shot, personId: person.id, take: take.number })
}

const waiverWire = (waiver: Waiver, by: OnTake['person']): WaiverWire => ({
  id: waiver.id,
  finding: waiver.finding,
  reason: waiver.reason,
  by: asker(by),
  at: waiver.createdAt,
})
