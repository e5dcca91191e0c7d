import { EventEmitter } from 'node:events'

/** What the rest of the server tells the live connection. Nothing here is stored: the events table is the record. */
interface News {
  /** Event `n` of the production was committed. */
  event: [{ production: string; n: number }]
  /** This session ended: its sockets go at once. */
  sessionEnded: [{ sessionId: string }]
  /** Every session of this person ended, or the account was disabled. */
  personOut: [{ personId: string; exceptSessionId?: string }]
  /** A membership was removed (`role` null) or its role changed. */
  membership: [{ production: string; personId: string; role: string | null }]
}

export const news = new EventEmitter<News>()
