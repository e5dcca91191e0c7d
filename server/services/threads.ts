import { v7 as uuid } from 'uuid'
import type { z } from 'zod'
import { Comment, Take, Thread } from '~/server/models'
import type { Shot } from '~/server/models'
import { row, rows } from '~/server/models/database'
import { fail, invalid } from '~/server/utils/fail'
import { usedElsewhere } from '~/server/utils/made'
import type { Made } from '~/server/utils/made'
import type { Comment as CommentWire, newComment, newThread, Thread as ThreadWire, threadChange } from '~/utils/contracts/thread'
import { appendEvent, takeNumber } from './events'
import { asker, named, now, someone } from './wire'
import type { OnShot } from './wire'

interface InThread extends OnShot {
  readonly thread: Thread
}

/** Opens a thread with its first comment: both or neither, and one event that carries the comment. */
export async function openThread(place: OnShot, body: z.infer<typeof newThread>): Promise<Made<ThreadWire>> {
  const { production, shot, person } = place
  const before = await Thread.findOne({ where: { personId: person.id, clientId: body.clientId } })
  if (before && before.shotId !== shot.id) usedElsewhere()
  if (before) return { made: false, answer: await threadOf(before) }
  if (await Comment.count({ where: { personId: person.id, clientId: body.comment.clientId } })) usedElsewhere()

  const take = body.take === null ? null : await Take.findOne({ where: { shotId: shot.id, number: body.take } })
  if (body.take !== null && !take) invalid('take', `There is no take ${body.take} of ${shot.code}.`)
  requireWithin(shot, take, body)
  const thread = await Thread.create({
    id: uuid(),
    clientId: body.clientId,
    shotId: shot.id,
    takeId: take?.id ?? null,
    fromFrame: body.fromFrame,
    toFrame: body.toFrame,
    personId: person.id,
    createdAt: now(),
  })
  const n = await takeNumber(production)
  const comment = await store(thread, person.id, body.comment, n)
  await appendEvent(production, { kind: 'thread', shot, personId: person.id, take: take?.number, commentId: comment.id }, n)
  return { made: true, answer: await threadOf(thread) }
}

/** Adds to a thread. The comment's place in the thread is the number of its event. */
export async function addComment({ production, shot, thread, person }: InThread, body: z.infer<typeof newComment>): Promise<Made<CommentWire>> {
  const before = await Comment.findOne({ where: { personId: person.id, clientId: body.clientId } })
  if (before && before.threadId !== thread.id) usedElsewhere()
  if (before) return { made: false, answer: commentWire(before, person) }

  if (thread.settledAt) fail(409, 'This thread is settled; open it again to answer.')
  const n = await takeNumber(production)
  const comment = await store(thread, person.id, body, n)
  await appendEvent(production, { kind: 'comment', shot, personId: person.id, commentId: comment.id }, n)
  return { made: true, answer: commentWire(comment, person) }
}

/** Settles a thread, or opens it again. */
export async function settleThread({ production, shot, thread, person }: InThread, { settled }: z.infer<typeof threadChange>): Promise<ThreadWire> {
  if (settled !== Boolean(thread.settledAt)) {
    await thread.update(settled ? { settledAt: now(), settledBy: person.id } : { settledAt: null, settledBy: null })
    await appendEvent(production, { kind: 'thread-settled', shot, personId: person.id })
  }
  return threadOf(thread)
}

function store(thread: Thread, personId: string, { clientId, body }: z.infer<typeof newComment>, n: number): Promise<Comment> {
  return Comment.create({ id: uuid(), clientId, threadId: thread.id, eventNumber: n, body, personId, createdAt: now() })
}

/** Frames that neither the shot nor the take has are a slip of the hand. */
function requireWithin(shot: Shot, take: Take | null, { fromFrame, toFrame }: z.infer<typeof newThread>): void {
  if (fromFrame === null || toFrame === null) return
  const first = Math.min(shot.firstFrame, take?.keys[0]?.frame ?? shot.firstFrame)
  const last = Math.max(shot.lastFrame, take?.keys.at(-1)?.frame ?? shot.lastFrame)
  const outside = `${shot.code} runs from frame ${first} to ${last}.`
  if (fromFrame < first || fromFrame > last) invalid('fromFrame', outside)
  if (toFrame > last) invalid('toFrame', outside)
}

interface ThreadRow {
  id: string
  clientId: string
  take: number | null
  fromFrame: number | null
  toFrame: number | null
  at: string
  personId: string
  personName: string
  settledAt: string | null
  settlerId: string | null
  settlerName: string | null
}
interface CommentRow {
  id: string
  clientId: string
  thread: string
  n: number
  body: string
  at: string
  personId: string
  personName: string
}

const SELECT_THREADS = `
  SELECT threads.id, threads.client_id AS clientId, takes.number AS take, threads.from_frame AS fromFrame,
         threads.to_frame AS toFrame, threads.created_at AS at, starter.id AS personId, starter.name AS personName,
         threads.settled_at AS settledAt, settler.id AS settlerId, settler.name AS settlerName
    FROM threads
    JOIN people AS starter ON starter.id = threads.person_id
    LEFT JOIN takes ON takes.id = threads.take_id
    LEFT JOIN people AS settler ON settler.id = threads.settled_by`
const SELECT_COMMENTS = `
  SELECT comments.id, comments.client_id AS clientId, comments.thread_id AS thread, comments.event_number AS n,
         comments.body, comments.created_at AS at, people.id AS personId, people.name AS personName
    FROM comments
    JOIN threads ON threads.id = comments.thread_id
    JOIN people ON people.id = comments.person_id`

/** All threads of a shot with their comments, in the order they were opened. */
export async function threadsOf(shotId: string): Promise<ThreadWire[]> {
  const threads = await rows<ThreadRow>(`${SELECT_THREADS} WHERE threads.shot_id = :shotId ORDER BY threads.created_at, threads.id`, { shotId })
  const comments = await rows<CommentRow>(`${SELECT_COMMENTS} WHERE threads.shot_id = :shotId ORDER BY comments.event_number`, { shotId })
  const byThread = new Map<string, CommentRow[]>(threads.map(({ id }) => [id, []]))
  for (const comment of comments) byThread.get(comment.thread)?.push(comment)
  return threads.map((thread) => threadWire(thread, byThread.get(thread.id) ?? []))
}

async function threadOf({ id }: Thread): Promise<ThreadWire> {
  const thread = await row<ThreadRow>(`${SELECT_THREADS} WHERE threads.id = :id`, { id })
  if (!thread) throw new Error('The thread is gone.')
  return threadWire(thread, await rows<CommentRow>(`${SELECT_COMMENTS} WHERE threads.id = :id ORDER BY comments.event_number`, { id }))
}

const threadWire = (thread: ThreadRow, comments: CommentRow[]): ThreadWire => ({
  id: thread.id,
  clientId: thread.clientId,
  take: thread.take,
  fromFrame: thread.fromFrame,
  toFrame: thread.toFrame,
  by: someone(thread.personId, thread.personName),
  at: thread.at,
  settledAt: thread.settledAt,
  settledBy: named(thread.settlerId, thread.settlerName),
  comments: comments.map(({ personId, personName, ...comment }) => ({ ...comment, by: someone(personId, personName) })),
})

const commentWire = (comment: Comment, by: OnShot['person']): CommentWire => ({
  id: comment.id,
  clientId: comment.clientId,
  thread: comment.threadId,
  n: comment.eventNumber,
  body: comment.body,
  by: asker(by),
  at: comment.createdAt,
})
