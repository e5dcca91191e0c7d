import { Failure, fail, forbidden } from '~/server/utils/fail'
import { log } from '~/server/utils/log'
import { parse } from '~/server/utils/parse'
import { loadScope } from '~/server/utils/scope'
import { askerOf } from '~/server/utils/session'
import type { Asker } from '~/server/utils/session'
import { lookRequest, watchRequest } from '~/utils/contracts/event'
import type { SocketAnswer } from '~/utils/contracts/event'
import { may, socketEvents } from '~/utils/permissions'
import type { SocketEvent } from '~/utils/permissions'
import type { PresenceBoard } from './presence'
import { dismissSession, leave, rightsEpoch, roomOf } from './rooms'
import type { LiveSocket } from './types'

const schemas = { watch: watchRequest, look: lookRequest } satisfies Record<SocketEvent, unknown>
interface Request {
  production: string
  shot?: string | null
}
type Act = (socket: LiveSocket, request: Request, presence: PresenceBoard, asker: Asker) => void

/** What each event does once it is granted. Nothing here waits: what was read is still true when it is acted on. */
const acts: Record<SocketEvent, Act> = {
  watch(socket, { production }, presence) {
    // A window shows one production: following another ends the first.
    if (socket.data.production !== production) leave(socket, presence)
    void socket.join(roomOf(production))
    socket.data.production = production
    socket.emit('presence', { production, lookers: presence.lookers(production) })
  },
  look(socket, { production, shot }, presence, { id, name }) {
    if (socket.data.production !== production) fail(422, 'Watch the production first.')
    presence.set(socket.id, shot ? { production, shot, person: { id, name } } : null)
  },
}

/** Every event of every socket comes through here, also those that nobody knows. */
export function receive(socket: LiveSocket, presence: PresenceBoard, name: string, args: unknown[]): void {
  const last = args.at(-1)
  const answer = typeof last === 'function' ? (result: SocketAnswer) => void last(result) : () => {}
  if (!Object.hasOwn(socketEvents, name)) return answer({ ok: false, statusCode: 404, message: 'There is nothing here.' })
  if (!socket.data.allowance.take())
    return answer({ ok: false, statusCode: 429, message: 'Too many at once: wait a moment.' })
  socket.data.turn = socket.data.turn.then(async () => {
    const result = await pass(socket, presence, name as SocketEvent, args[0])
    answer(result)
    if (!result.ok && result.statusCode === 401) dismissSession(socket)
  })
}

/** The gates in the order of every route: who (401), well-formed (422), may they see it (404), may they do it (403). */
async function pass(socket: LiveSocket, presence: PresenceBoard, name: SocketEvent, body: unknown): Promise<SocketAnswer> {
  try {
    for (;;) {
      const epoch = rightsEpoch()
      const asker = (await askerOf(socket.data.token)) ?? fail(401, 'Sign in first.')
      const request: Request = parse<Request>(schemas[name], body)
      const { role } = await loadScope(asker, { production: request.production, code: request.shot ?? undefined })
      if (!may(role, socketEvents[name])) forbidden()
      // Somebody's rights changed while we were reading: perhaps these.
      if (epoch !== rightsEpoch()) continue
      // A socket that has gone must not be put back into a room.
      if (!socket.connected) return { ok: false, statusCode: 401, message: 'Sign in first.' }
      socket.data.asker = asker
      acts[name](socket, request, presence, asker)
      return { ok: true }
    }
  } catch (problem) {
    if (problem instanceof Failure) {
      if (problem.statusCode === 403) log.warn('refused', { event: name, person: socket.data.asker.id })
      return { ok: false, statusCode: problem.statusCode, message: problem.message }
    }
    log.error('socket event failed', { event: name, problem: String(problem) })
    return { ok: false, statusCode: 500, message: 'Something went wrong on our side; try again.' }
  }
}
