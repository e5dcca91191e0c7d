import { rows } from '~/server/models/database'
import { news } from '~/server/services/news'
import { hashSecret } from '~/server/utils/secret'
import { isOver } from '~/server/utils/sessionAge'
import type { PresenceBoard } from './presence'
import type { LiveServer, LiveSocket } from './types'

/** Everyone who follows a production. */
export const roomOf = (production: string): string => `production:${production}`

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
      // With another role, too: what is heard from here on is heard by who asks again.
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

/**
 * Sessions also end without news, by growing old or by going on under another token: cuts the sockets whose token opens
 * none any more.
 */
export async function sweep(sockets: Iterable<LiveSocket>): Promise<void> {
  const open = [...sockets].map((socket) => ({ socket, hash: hashSecret(socket.data.token) }))
  if (open.length === 0) return
  const alive = await rows<{ hash: string; createdAt: string; seenAt: string }>(
    `SELECT sessions.token_hash AS hash, sessions.created_at AS createdAt, sessions.seen_at AS seenAt
       FROM sessions JOIN people ON people.id = sessions.person_id
      WHERE sessions.token_hash IN (:hashes) AND sessions.ended_at IS NULL AND people.disabled_at IS NULL`,
    { hashes: [...new Set(open.map(({ hash }) => hash))] },
  )
  // Looking is no use of the session: askerOf would make it young again each time.
  const hashes = new Set(alive.filter((session) => !isOver(session, Date.now())).map(({ hash }) => hash))
  for (const { socket, hash } of open) if (!hashes.has(hash)) dismissSession(socket)
}
