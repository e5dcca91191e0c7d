import { z } from 'zod'
import { shotCode, slug } from './common'
import type { Time } from './common'
import type { PersonName } from './people'
import type { Comment } from './thread'

/** What can happen in a production. */
export const eventKinds = [
  'comment',
  'thread',
  'thread-settled',
  'take',
  'take-back',
  'flag',
  'waiver',
  'ruling',
  'reopening',
  'claim',
  'shot',
  'sequence',
  'member',
] as const
export type EventKind = (typeof eventKinds)[number]

/** One numbered change. A comment travels whole; anything else says where to look again. */
export interface ProductionEvent {
  n: number
  kind: EventKind
  /** The shot's code, where a shot is concerned. */
  shot: string | null
  by: PersonName | null
  at: Time
  /** Kind `comment` and `thread`: the comment that came. */
  comment?: Comment
  /** Kinds about a take. */
  take?: number
}
export interface EventsAnswer {
  events: ProductionEvent[]
  /** Ask again from the last number while true: at most 500 events cross at once. */
  more: boolean
}
/** Socket event `watch`: follow a production. */
export const watchRequest = z.strictObject({ production: slug })
/** Socket event `look`: which shot is on my screen; null when none. */
export const lookRequest = z.strictObject({ production: slug, shot: shotCode.nullable() })

/** Who is looking at which shot right now. */
export interface Presence {
  production: string
  lookers: { person: PersonName; shot: string }[]
}

/** Socket, server to client. */
export interface ServerToClient {
  /** Event `n` of a production exists: fetch what is new over HTTP. */
  event: (news: { production: string; n: number }) => void
  presence: (presence: Presence) => void
  /** The session or the membership ended, or the role changed: load again. */
  dismissed: (news: { reason: 'session' | 'membership' | 'role'; production?: string }) => void
}
/** Socket, client to server; the acknowledgement says whether it was granted. */
export interface ClientToServer {
  watch: (request: unknown, answer: (result: SocketAnswer) => void) => void
  look: (request: unknown, answer: (result: SocketAnswer) => void) => void
}
export type SocketAnswer = { ok: true } | { ok: false; statusCode: number; message: string }
