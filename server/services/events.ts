import { Event } from '~/server/models'
import type { Production, Shot } from '~/server/models'
import { afterCommit, isWriting, row } from '~/server/models/database'
import type { EventKind } from '~/utils/contracts/event'
import { news } from './news'

interface Happening {
  kind: EventKind
  shot?: Pick<Shot, 'id'> | null
  personId: string
  take?: number
}

/**
 * Numbers a change and writes it down, in the transaction of the change itself; the sockets hear of it once that is
 * committed. `n` is taken first where a row must carry it (a comment), otherwise on the spot.
 * @returns the event's number.
 */
export async function appendEvent(production: Production, happening: Happening & { commentId?: string }, n?: number): Promise<number> {
  const number = n ?? (await takeNumber(production))
  await Event.create({
    productionId: production.id,
    n: number,
    kind: happening.kind,
    shotId: happening.shot?.id ?? null,
    personId: happening.personId,
    takeNumber: happening.take ?? null,
    commentId: happening.commentId ?? null,
    createdAt: new Date().toISOString(),
  })
  afterCommit(() => news.emit('event', { production: production.slug, n: number }))
  return number
}

/** The next number of the production. Only inside `write`: a number taken outside could be lost or doubled. */
export async function takeNumber(production: Production): Promise<number> {
  if (!isWriting()) throw new Error('An event number is taken inside a transaction only.')
  const taken = await row<{ n: number }>(
    'UPDATE productions SET event_number = event_number + 1 WHERE id = :id RETURNING event_number AS n',
    { id: production.id },
  )
  if (!taken) throw new Error('The production is gone.')
  return taken.n
}
