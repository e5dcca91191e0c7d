import type { IncomingMessage } from 'node:http'
import { Server as Engine } from 'engine.io'
import { defineEventHandler } from 'h3'
import type { EventHandler } from 'h3'
import { Failure } from '~/server/utils/fail'
import { isOwnOrigin } from '~/server/utils/origin'
import { refusal } from '~/server/utils/route'

/** Where the socket lives, on the same port as everything else. */
export const SOCKET_PATH = '/socket.io/'
/** Requests of a client are a slug and a shot's code: nobody needs more. Bytes. */
export const MAX_MESSAGE = 4 * 1024

/** What the WebSocket layer is told. Compression of short messages only costs memory. */
export const webSocketOptions = { serverOptions: { maxPayload: MAX_MESSAGE, perMessageDeflate: false } }

export function makeEngine(): Engine {
  return new Engine({
    transports: ['polling', 'websocket'],
    maxHttpBufferSize: MAX_MESSAGE,
    perMessageDeflate: false,
    httpCompression: false,
  })
}

// Nitro owns the HTTP server and has already answered the upgrade when it tells us of a WebSocket, so that engine.io
// cannot be attached in the public way. What follows reaches into two packages, and is the only place that does:
// crossws keeps Node's request in `peer._internal`, and engine.io marks the three steps of its own upgrade as private.
interface PeerInside {
  _internal: { nodeReq: IncomingMessage; ws: { close: (code: number) => void; terminate: () => void } }
}
interface EngineInside {
  prepare: (request: IncomingMessage) => void
  verify: (request: IncomingMessage, upgrade: boolean, answer: (problem?: number) => void) => void
  onWebSocket: (request: IncomingMessage, socket: IncomingMessage['socket'], webSocket: unknown) => void
}
const POLICY_VIOLATION = 1008

function takeOver(engine: EngineInside, peer: PeerInside): void {
  const { nodeReq, ws } = peer._internal
  engine.prepare(nodeReq)
  // Nobody else verifies on this path: a made-up session id or transport must end here, not inside the engine.
  engine.verify(nodeReq, true, (problem) => {
    if (problem === undefined) engine.onWebSocket(nodeReq, nodeReq.socket, ws)
    else ws.close(POLICY_VIOLATION)
  })
}

/** The handler of SOCKET_PATH: long polling and WebSocket, refused at the door when another site asks. */
export function socketHandler(engine: Engine): EventHandler {
  return defineEventHandler({
    handler(event) {
      const { req, res } = event.node
      if (!isOwnOrigin(req.headers)) return refusal(event, new Failure(403, 'This request comes from another site.'))
      engine.handleRequest(req as Parameters<Engine['handleRequest']>[0], res)
      event._handled = true
    },
    websocket: {
      upgrade(request) {
        const header = (name: string) => request.headers.get(name) ?? undefined
        const headers = { origin: header('origin'), host: header('host'), 'sec-fetch-site': header('sec-fetch-site') }
        if (!isOwnOrigin(headers)) return new Response(null, { status: 403, statusText: 'Forbidden' })
      },
      open(peer) {
        takeOver(engine as unknown as EngineInside, peer as unknown as PeerInside)
      },
    },
  })
}
