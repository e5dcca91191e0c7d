import { Server } from 'socket.io'
import { defineNitroPlugin } from '#imports'
import { makeEngine, SOCKET_PATH, socketHandler, webSocketOptions } from '~/server/services/live/bridge'
import { receive } from '~/server/services/live/gate'
import { admit } from '~/server/services/live/handshake'
import { PresenceBoard } from '~/server/services/live/presence'
import { carryNews, roomOf, sweep } from '~/server/services/live/rooms'
import type { LiveServer } from '~/server/services/live/types'
import { log } from '~/server/utils/log'

const SWEEP_EVERY = 60_000
const SIGNALS = ['SIGTERM', 'SIGINT'] as const
/** Whoever opened a connection says who they are within this time. Milliseconds. */
const CONNECT_WITHIN = 10_000

/**
 * The live connection, on the port of everything else. It carries numbers, never the record: what happened is in the
 * events table and is fetched over HTTP, so that a lost message loses nothing. For the same reason connection state
 * recovery stays off: it would let a client back in past `admit`.
 */
export default defineNitroPlugin((nitro) => {
  const engine = makeEngine()
  const io: LiveServer = new Server({ serveClient: false, connectTimeout: CONNECT_WITHIN })
  io.bind(engine)

  const presence = new PresenceBoard((list) => io.to(roomOf(list.production)).emit('presence', list))
  io.use((socket, next) => void admit(socket, next))
  io.on('connection', (socket) => {
    socket.onAny((name: string, ...args: unknown[]) => receive(socket, presence, name, args))
    socket.on('disconnect', () => presence.set(socket.id, null))
  })

  const stopCarrying = carryNews(io, presence)
  const sweeping = setInterval(() => {
    sweep(io.sockets.sockets.values()).catch((problem: unknown) => log.error('socket sweep failed', { problem: String(problem) }))
  }, SWEEP_EVERY)
  sweeping.unref()

  // Read once, when Nitro's server begins to listen for upgrades, which is after its plugins.
  Object.assign(nitro.h3App.options, { websocket: webSocketOptions })
  nitro.router.use(SOCKET_PATH, socketHandler(engine))
  function hangUp() {
    for (const signal of SIGNALS) process.off(signal, hangUp)
    clearInterval(sweeping)
    stopCarrying()
    presence.close()
    engine.close()
  }
  // Nitro's own `close` comes only after every connection is gone, and a long poll stays for as long as nobody answers it.
  for (const signal of SIGNALS) process.once(signal, hangUp)
  nitro.hooks.hook('close', hangUp)
})
