import { v7 as uuid } from 'uuid'
import type { z } from 'zod'
import { Sequence } from '~/server/models'
import { row } from '~/server/models/database'
import { fail, notFound } from '~/server/utils/fail'
import type { newSequence, Sequence as SequenceWire, sequenceChange } from '~/utils/contracts/production'
import { appendEvent } from './events'
import { sequenceWire } from './wire'
import type { InProduction } from './wire'

const STEP = 10

/** Adds a sequence at the end of the story. @throws 409 for a code that is taken */
export async function createSequence({ production, person }: InProduction, body: z.infer<typeof newSequence>): Promise<SequenceWire> {
  if (await Sequence.count({ where: { productionId: production.id, code: body.code } })) {
    const message = `There is a sequence ${body.code} already.`
    fail(409, message, { issues: [{ path: 'code', message }] })
  }
  const last = await row<{ position: number | null }>('SELECT max(position) AS position FROM sequences WHERE production_id = :id', {
    id: production.id,
  })
  const sequence = await Sequence.create({
    id: uuid(),
    productionId: production.id,
    ...body,
    position: last?.position == null ? STEP : last.position + STEP,
  })
  await appendEvent(production, { kind: 'sequence', personId: person.id })
  return sequenceWire(sequence)
}

/** Gives a sequence another title or another place in the story. */
export async function changeSequence(
  { production, person }: InProduction,
  code: string,
  body: z.infer<typeof sequenceChange>,
): Promise<SequenceWire> {
  const sequence = (await Sequence.findOne({ where: { productionId: production.id, code } })) ?? notFound()
  sequence.set(body)
  if (sequence.changed()) {
    await sequence.save()
    await appendEvent(production, { kind: 'sequence', personId: person.id })
  }
  return sequenceWire(sequence)
}
