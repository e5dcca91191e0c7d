import { ABSOLUTE_DAYS, IDLE_DAYS } from '~/server/utils/session'
import { rows } from '~/server/models/database'
import { news } from '~/server/services/news'
import type { PresenceBoard } from './presence'
import type { LiveServer, LiveSocket } from './types'

/** Everyone who follows a production. */
export const roomOf = (production: string): string => `production:${production}`

const DAY = 24 * 60 * 60 * 1000
let changes = 0
/**
 * Rises with every ended session and changed membership. What was read from the database before a rise may no longer
 * be true: whoever grants something on the strength of it compares, and reads again.
 */
export const rightsEpoch = (): number => changes

/** The session is over: nothing more is heard or said on this socket. */
export function dismissSession(socket: LiveSocket): void {
  socket.emit('dismissed', { reason: 'session' })
  socket.disconnect(true)
}

/** Carries the house's news to the sockets concerned. @returns a function that stops it. */
export function carryNews(io: LiveServer, presence: PresenceBoard): () => void {
  const all = () => [...io.sockets.sockets.values()] as LiveSocket[]

  const event = ({ production, n }: { production: string; n: number }) => {
    io.to(roomOf(production)).emit('event', { production, n })
  }
  const sessionEnded = ({ sessionId }: { sessionId: string }) => {
    changes += 1
    all().filter((socket) => socket.data.asker.sessionId === sessionId).forEach(dismissSession)
  }
  const personOut = ({ personId, exceptSessionId }: { personId: string; exceptSessionId?: string }) => {
    changes += 1
    all()
      .filter(({ data }) => data.asker.id === personId && data.asker.sessionId !== exceptSessionId)
      .forEach(dismissSession)
  }
  const membership = ({ production, personId, role }: { production: string; personId: string; role: string | null }) => {
    changes += 1
    for (const socket of all()) {
      if (socket.data.asker.id !== personId || socket.data.production !== production) continue
      socket.emit('dismissed', { reason: role === null ? 'membership' : 'role', production })
      if (role !== null) continue
      leave(socket, presence)
    }
  }

  news.on('event', event).on('sessionEnded', sessionEnded).on('personOut', personOut).on('membership', membership)
  return () => {
    news.off('event', event).off('sessionEnded', sessionEnded).off('personOut', personOut).off('membership', membership)
  }
}

/** The socket follows no production any more and looks at nothing. */
export function leave(socket: LiveSocket, presence: PresenceBoard): void {
  if (socket.data.production !== undefined) void socket.leave(roomOf(socket.data.production))
  socket.data.production = undefined
  presence.set(socket.id, null)
}

/** Sessions also end by growing old, of which there is no news: cuts the sockets of those that did. */
export async function sweep(io: LiveServer): Promise<void> {
  const open = [...io.sockets.sockets.values()] as LiveSocket[]
  if (open.length === 0) return
  const before = (days: number) => new Date(Date.now() - days * DAY).toISOString()
  const alive = await rows<{ id: string }>(
    `SELECT sessions.id FROM sessions JOIN people ON people.id = sessions.person_id
      WHERE sessions.id IN (:ids) AND sessions.ended_at IS NULL AND people.disabled_at IS NULL
        AND sessions.seen_at >= :idle AND sessions.created_at >= :absolute`,
    { ids: open.map((socket) => socket.data.asker.sessionId), idle: before(IDLE_DAYS), absolute: before(ABSOLUTE_DAYS) },
  )
  const ids = new Set(alive.map((session) => session.id))
  open.filter((socket) => !ids.has(socket.data.asker.sessionId)).forEach(dismissSession)
}
