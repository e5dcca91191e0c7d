import { io } from 'socket.io-client'
import type { Socket } from 'socket.io-client'
import { onTestFinished } from 'vitest'
import type { ClientToServer, Presence, ServerToClient, SocketAnswer } from '~/utils/contracts/event'

export type Transport = 'websocket' | 'polling'
type Dismissal = Parameters<ServerToClient['dismissed']>[0]

export interface LineOptions {
  /** `Cookie` header; left out: nobody. */
  cookie?: string
  transport?: Transport
  /** Origin as a browser would send it. Default: the server's own. */
  origin?: string
  reconnection?: boolean
}

/** One socket of a client, with everything it was ever told. Closes with the test. */
export class Line {
  readonly socket: Socket<ServerToClient, ClientToServer>
  readonly heard: { production: string; n: number }[] = []
  readonly presences: Presence[] = []
  readonly dismissals: Dismissal[] = []

  constructor(url: string, { cookie, transport = 'websocket', origin = url, reconnection = false }: LineOptions = {}) {
    this.socket = io(url, {
      transports: [transport],
      forceNew: true,
      reconnection,
      reconnectionDelay: 50,
      reconnectionDelayMax: 300,
      autoConnect: false,
      extraHeaders: { origin, ...(cookie ? { cookie } : {}) },
    })
    this.socket.on('event', (news) => this.heard.push(news))
    this.socket.on('presence', (presence) => this.presences.push(presence))
    this.socket.on('dismissed', (news) => this.dismissals.push(news))
    onTestFinished(() => void this.socket.disconnect())
  }

  /** @throws the refusal, as the client sees it */
  open(): Promise<this> {
    return new Promise((resolve, reject) => {
      this.socket.once('connect', () => resolve(this))
      this.socket.once('connect_error', reject)
      this.socket.connect()
    })
  }

  /** The name that engine.io itself gives to what carries the line now. */
  get transport(): string {
    return this.socket.io.engine.transport.name
  }

  ask(event: string, request: unknown): Promise<SocketAnswer> {
    return this.socket.timeout(5_000).emitWithAck(event as 'watch', request)
  }
  watch(production: string): Promise<SocketAnswer> {
    return this.ask('watch', { production })
  }
  look(production: string, shot: string | null): Promise<SocketAnswer> {
    return this.ask('look', { production, shot })
  }

  /** Cuts the connection as a pulled plug would: no goodbye on either side. */
  cut(): void {
    this.socket.io.engine.close()
  }
  /** Waits until the server ended the line. */
  async ended(withinMs = 3_000): Promise<string> {
    if (!this.socket.connected) return 'already'
    return new Promise((resolve, reject) => {
      const timer = setTimeout(() => reject(new Error(`The line still stood after ${withinMs} ms.`)), withinMs)
      this.socket.once('disconnect', (reason) => {
        clearTimeout(timer)
        resolve(reason)
      })
    })
  }
}

/** Waits until something is so. @throws after `withinMs` */
export async function until<T>(look: () => T | Promise<T>, what: string, withinMs = 5_000): Promise<NonNullable<T>> {
  const deadline = Date.now() + withinMs
  for (;;) {
    const found = await look()
    if (found) return found
    if (Date.now() > deadline) throw new Error(`Waited ${withinMs} ms in vain for ${what}.`)
    await new Promise((resolve) => setTimeout(resolve, 20))
  }
}

export const pause = (ms: number) => new Promise<void>((resolve) => setTimeout(resolve, ms))
