import type { Server, Socket } from 'socket.io'
import type { ClientToServer, ServerToClient } from '~/utils/contracts/event'
import type { Asker } from '~/server/utils/session'
import type { Allowance } from './allowance'

/** What the server remembers of one open socket. */
export interface SocketData {
  /** Read again before every event: a session can end while its socket is open. */
  token: string
  /** Who it was at the last look. */
  asker: Asker
  allowance: Allowance
  /** Slug of the production that the socket follows. */
  production?: string
  /** The end of the queue of its own events: they are answered in the order they came. */
  turn: Promise<void>
}
type Nothing = Record<string, never>
export type LiveServer = Server<ClientToServer, ServerToClient, Nothing, SocketData>
export type LiveSocket = Socket<ClientToServer, ServerToClient, Nothing, SocketData>
