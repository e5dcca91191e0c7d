import { createServer } from 'node:net'
import type { AddressInfo, Socket } from 'node:net'
import { SMTPServer } from 'smtp-server'

/** Mail servers that go quiet at a chosen moment: what a crash of ours in that moment looks like from outside. */
export interface SilentServer {
  url: string
  /** Message-IDs that were taken whole, in the order they came. */
  taken: string[]
  /** Connections so far. */
  readonly calls: number
  stop(): Promise<void>
}

/** Takes the call and never says a word: the letter has not left us. */
export async function startMuteServer(): Promise<SilentServer> {
  const sockets = new Set<Socket>()
  let calls = 0
  const server = createServer((socket) => {
    calls += 1
    sockets.add(socket)
    socket.on('error', () => undefined)
  })
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', () => resolve()))
  return {
    url: `smtp://127.0.0.1:${(server.address() as AddressInfo).port}`,
    taken: [],
    get calls() {
      return calls
    },
    stop: () =>
      new Promise((resolve) => {
        sockets.forEach((socket) => socket.destroy())
        server.close(() => resolve())
      }),
  }
}

/** Takes every letter, and never says that it has: the letter has left us, and we cannot know. */
export async function startForgetfulServer(): Promise<SilentServer> {
  const taken: string[] = []
  let calls = 0
  const smtp = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS', 'AUTH'],
    disableReverseLookup: true,
    closeTimeout: 200,
    logger: false,
    onConnect: (_session, callback) => {
      calls += 1
      callback()
    },
    onData: (stream) => {
      let source = ''
      stream.on('data', (chunk: Buffer) => (source += chunk.toString('utf8')))
      stream.on('end', () => taken.push(/^Message-ID: (.+)\r$/im.exec(source)?.[1] ?? ''))
    },
  })
  smtp.on('error', () => undefined)
  await new Promise<void>((resolve) => smtp.listen(0, '127.0.0.1', () => resolve()))
  return {
    url: `smtp://127.0.0.1:${(smtp.server.address() as AddressInfo).port}`,
    taken,
    get calls() {
      return calls
    },
    stop: () => new Promise((resolve) => smtp.close(() => resolve())),
  }
}
