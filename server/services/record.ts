import type { Production } from '~/server/models'
import { rows } from '~/server/models/database'
import type { EventKind, EventsAnswer, ProductionEvent } from '~/utils/contracts/event'
import { named, someone } from './wire'

/** How many events cross at once. */
export const EVENTS_AT_ONCE = 500

interface EventRow {
  n: number
  kind: EventKind
  shot: string | null
  take: number | null
  at: string
  personId: string | null
  personName: string | null
  commentId: string | null
  clientId: string
  thread: string
  commentN: number
  body: string
  commentAt: string
  authorId: string
  authorName: string
}

/** What happened in a production after number `after`, oldest first. A comment travels whole. */
export async function eventsAfter(production: Production, after: number): Promise<EventsAnswer> {
  const found = await rows<EventRow>(
    `SELECT events.n, events.kind, shots.code AS shot, events.take_number AS take, events.created_at AS at,
            doer.id AS personId, doer.name AS personName,
            comments.id AS commentId, comments.client_id AS clientId, comments.thread_id AS thread,
            comments.event_number AS commentN, comments.body, comments.created_at AS commentAt,
            author.id AS authorId, author.name AS authorName
       FROM events
       LEFT JOIN shots ON shots.id = events.shot_id
       LEFT JOIN people AS doer ON doer.id = events.person_id
       LEFT JOIN comments ON comments.id = events.comment_id
       LEFT JOIN people AS author ON author.id = comments.person_id
      WHERE events.production_id = :production AND events.n > :after
      ORDER BY events.n LIMIT :limit`,
    { production: production.id, after, limit: EVENTS_AT_ONCE + 1 },
  )
  return { events: found.slice(0, EVENTS_AT_ONCE).map(eventWire), more: found.length > EVENTS_AT_ONCE }
}

function eventWire(event: EventRow): ProductionEvent {
  const wire: ProductionEvent = {
    n: event.n,
    kind: event.kind,
    shot: event.shot,
    by: named(event.personId, event.personName),
    at: event.at,
  }
  if (event.take !== null) wire.take = event.take
  if (event.commentId !== null)
    wire.comment = {
      id: event.commentId,
      clientId: event.clientId,
      thread: event.thread,
      n: event.commentN,
      body: event.body,
      by: someone(event.authorId, event.authorName),
      at: event.commentAt,
    }
  return wire
}
