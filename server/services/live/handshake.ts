import { ServerResponse } from 'node:http'
import type { IncomingMessage } from 'node:http'
import { createEvent } from 'h3'
import type { H3Event } from 'h3'
import { remoteAddress } from '~/server/utils/address'
import { log } from '~/server/utils/log'
import { isOwnOrigin } from '~/server/utils/origin'
import { ready } from '~/server/utils/ready'
import { askerOf, sessionToken } from '~/server/utils/session'
import type { SocketAnswer } from '~/utils/contracts/event'
import { Allowance } from './allowance'
import type { LiveSocket } from './types'

/** What a refused client finds in `connect_error`'s `data`. */
type Refused = Extract<SocketAnswer, { ok: false }>

/**
 * A socket is admitted from our own pages and with a living session only. engine.io's own check never sees a WebSocket
 * here (bridge.ts), so this is the check, for both transports.
 */
export async function admit(socket: LiveSocket, next: (problem?: Error) => void): Promise<void> {
  try {
    const refused = await refusalOf(socket)
    if (!refused) return next()
    log.warn('socket refused', { status: refused.statusCode, address: remoteAddress(socket.request) })
    next(Object.assign(new Error(refused.message), { data: refused }))
  } catch (problem) {
    log.error('socket handshake failed', { problem: String(problem) })
    const data: Refused = { ok: false, statusCode: 500, message: 'Something went wrong on our side; try again.' }
    next(Object.assign(new Error(data.message), { data }))
  }
}

async function refusalOf(socket: LiveSocket): Promise<Refused | null> {
  await ready()
  if (!isOwnOrigin(socket.handshake.headers))
    return { ok: false, statusCode: 403, message: 'This request comes from another site.' }
  const token = await sessionToken(eventOf(socket.request))
  const asker = await askerOf(token)
  if (!token || !asker) return { ok: false, statusCode: 401, message: 'Sign in first.' }
  socket.data = { token, asker, allowance: new Allowance(), turn: Promise.resolve() }
  return null
}

/** The sealed cookie is read by helpers that want an event of h3; its response is never sent. */
function eventOf(request: IncomingMessage): H3Event {
  const event = createEvent(request, new ServerResponse(request))
  event.context.nitro = { errors: [] }
  return event
}
