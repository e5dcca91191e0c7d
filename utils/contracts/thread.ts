import { z } from 'zod'
import { clientId, frame, LIMITS, prose, serverId, shotCode, slug } from './common'
import type { Time } from './common'
import type { PersonName } from './people'

export const threadParams = z.strictObject({ production: slug, code: shotCode, thread: serverId })
export const newComment = z.strictObject({ clientId, body: prose(LIMITS.commentChars, 1) })
/** A thread opens with its first comment; it is pinned to a take, a frame or a run of frames. */
export const newThread = z
  .strictObject({
    clientId,
    take: z.number().int().min(1).nullable().default(null),
    fromFrame: frame.nullable().default(null),
    toFrame: frame.nullable().default(null),
    comment: newComment,
  })
  .superRefine((thread, context) => {
    const { take, fromFrame, toFrame } = thread
    if ((fromFrame === null) !== (toFrame === null))
      context.addIssue({ code: 'custom', path: ['toFrame'], message: 'A run has a first and a last frame.' })
    else if (fromFrame !== null && toFrame !== null && toFrame < fromFrame)
      context.addIssue({ code: 'custom', path: ['toFrame'], message: 'The run ends before it begins.' })
    else if (take === null && fromFrame === null)
      context.addIssue({ code: 'custom', path: ['take'], message: 'Pin the thread to a take or to frames.' })
  })
export const threadChange = z.strictObject({ settled: z.boolean() })

export interface Comment {
  id: string
  clientId: string
  thread: string
  /** Number of the event that brought it: comments are shown in this order. */
  n: number
  /** Markdown source, as written. */
  body: string
  by: PersonName
  at: Time
}
export interface Thread {
  id: string
  clientId: string
  take: number | null
  fromFrame: number | null
  toFrame: number | null
  by: PersonName
  at: Time
  settledAt: Time | null
  settledBy: PersonName | null
  comments: Comment[]
}
