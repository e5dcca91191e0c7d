import { v7 as uuid } from 'uuid'
import type { z } from 'zod'
import { Flag } from '~/server/models'
import { invalid, notFound } from '~/server/utils/fail'
import { usedElsewhere } from '~/server/utils/made'
import type { Made } from '~/server/utils/made'
import type { Flag as FlagWire, newFlag } from '~/utils/contracts/take'
import { appendEvent } from './events'
import { raiseVersion } from './shots'
import { hasFinding, requireUnruled } from './takes'
import { asker, now } from './wire'
import type { OnTake } from './wire'

/** Flags a run of frames, with the reason. */
export async function putFlag({ production, shot, take, person }: OnTake, body: z.infer<typeof newFlag>): Promise<Made<FlagWire>> {
  const before = await Flag.findOne({ where: { personId: person.id, clientId: body.clientId } })
  if (before && before.takeId !== take.id) usedElsewhere()
  if (before) return { made: false, answer: flagWire(before, person) }

  await requireUnruled(take)
  const first = take.keys[0]!.frame
  const last = take.keys.at(-1)!.frame
  const outside = `Take ${take.number} runs from frame ${first} to ${last}.`
  if (body.fromFrame < first || body.fromFrame > last) invalid('fromFrame', outside)
  if (body.toFrame > last) invalid('toFrame', outside)
  if (body.finding && !hasFinding(take, body.finding)) invalid('finding', 'The judge’s answer to this take has no such finding.')
  const flag = await Flag.create({
    id: uuid(),
    clientId: body.clientId,
    takeId: take.id,
    fromFrame: body.fromFrame,
    toFrame: body.toFrame,
    reason: body.reason,
    finding: body.finding,
    personId: person.id,
    createdAt: now(),
  })
  await raiseVersion(shot)
  await appendEvent(production, { kind: 'flag', shot, personId: person.id, take: take.number })
  return { made: true, answer: flagWire(flag, person) }
}

/** Lifts a flag, whoever put it there. Lifting it twice is lifting it once. @throws 404, 409 once the take is ruled on */
export async function liftFlag({ production, shot, take, person }: OnTake, id: string): Promise<void> {
  const flag = (await Flag.findOne({ where: { takeId: take.id, id } })) ?? notFound()
  if (flag.liftedAt) return
  await requireUnruled(take)
  await flag.update({ liftedAt: now(), liftedBy: person.id })
  await raiseVersion(shot)
  await appendEvent(production, { kind: 'flag', shot, personId: person.id, take: take.number })
}

const flagWire = (flag: Flag, by: OnTake['person']): FlagWire => ({
  id: flag.id,
  fromFrame: flag.fromFrame,
  toFrame: flag.toFrame,
  reason: flag.reason,
  finding: flag.finding ?? null,
  by: asker(by),
  at: flag.createdAt,
})
