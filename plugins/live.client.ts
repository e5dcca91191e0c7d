import type { Socket } from 'socket.io-client'
import type { ClientToServer, ServerToClient } from '~/utils/contracts/event'

export type LiveSocket = Socket<ServerToClient, ClientToServer>

/**
 * The browser's one socket, made when a page first follows a production; its code is loaded then, too.
 * stores/live.ts is its only user.
 */
export default defineNuxtPlugin(() => {
  let socket: Promise<LiveSocket> | null = null

  async function make(): Promise<LiveSocket> {
    const { io } = await import('socket.io-client')
    return io({
      autoConnect: false,
      withCredentials: true,
      // Where a proxy lets no WebSocket through, long polling does the same more slowly.
      transports: ['websocket', 'polling'],
      tryAllTransports: true,
      reconnectionDelay: 500,
      reconnectionDelayMax: 5_000,
    })
  }
  function liveSocket(): Promise<LiveSocket> {
    socket ??= make().catch((problem: unknown) => {
      socket = null
      throw problem
    })
    return socket
  }
  return { provide: { liveSocket } }
})
