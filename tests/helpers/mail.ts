import type { AddressInfo, Socket } from 'node:net'
import { simpleParser } from 'mailparser'
import type { ParsedMail } from 'mailparser'
import { SMTPServer } from 'smtp-server'
import type { SMTPServerDataStream, SMTPServerSession } from 'smtp-server'

/**
 * What the server does with the next letter: takes it, answers 451 or 554, never answers, drops the line, or takes it
 * and drops the line before it has said so (the sender cannot know).
 */
export type MailMode = 'accept' | '4xx' | '5xx' | 'hang' | 'drop' | 'accept-then-drop'

export interface Received {
  from: string
  to: string[]
  /** The whole message as it came over the wire. */
  source: string
  /** The same, taken apart: subject, text, html, headers, messageId, … */
  mail: ParsedMail
  /** When it was complete, in milliseconds since 1970. */
  at: number
}

export interface MailServer {
  /** Fits MAIL_URL. */
  url: string
  port: number
  mode: MailMode
  /** Everything taken so far, oldest first. */
  received: Received[]
  /** How many messages have arrived whole, taken or not. */
  readonly attempts: number
  /** Waits until `count` letters have been taken. @throws after `withinMs` */
  waitFor(count: number, withinMs?: number): Promise<Received[]>
  stop(): Promise<void>
}

const open = new Set<MailServer>()

/** A real SMTP server on a free port of 127.0.0.1. Stops by itself at the end of the test file. */
export async function startMailServer(mode: MailMode = 'accept'): Promise<MailServer> {
  const sockets = new Map<string, Socket>()
  let attempts = 0

  const smtp = new SMTPServer({
    authOptional: true,
    // Its certificate is nobody's: a sender that upgrades when it can would refuse it.
    disabledCommands: ['STARTTLS', 'AUTH'],
    disableReverseLookup: true,
    closeTimeout: 500,
    logger: false,
    onData: (stream, session, callback) => void take(stream, session, callback),
  })
  // A line that this server or the sender drops is what some tests are about.
  smtp.on('error', () => undefined)
  smtp.server.on('connection', (socket: Socket) => {
    const key = `${socket.remoteAddress}:${socket.remotePort}`
    sockets.set(key, socket)
    socket.on('error', () => undefined)
    socket.on('close', () => sockets.delete(key))
  })

  async function take(stream: SMTPServerDataStream, session: SMTPServerSession, callback: (problem?: Error | null) => void) {
    const { mode: now } = server
    const drop = () => sockets.get(`${session.remoteAddress}:${session.remotePort}`)?.destroy()
    if (now === 'drop') {
      drop()
      return
    }
    const chunks: Buffer[] = []
    for await (const chunk of stream) chunks.push(chunk as Buffer)
    attempts += 1
    if (now === '4xx') callback(answer(451, 'Try again later'))
    else if (now === '5xx') callback(answer(554, 'No such person here'))
    else if (now !== 'hang') {
      const source = Buffer.concat(chunks)
      server.received.push({
        from: session.envelope.mailFrom ? session.envelope.mailFrom.address : '',
        to: session.envelope.rcptTo.map(({ address }) => address),
        source: source.toString('utf8'),
        mail: await simpleParser(source),
        at: Date.now(),
      })
      if (now === 'accept-then-drop') drop()
      else callback()
    }
  }

  await new Promise<void>((resolve, reject) => {
    smtp.server.once('error', reject)
    smtp.listen(0, '127.0.0.1', () => resolve())
  })
  const { port } = smtp.server.address() as AddressInfo

  const server: MailServer = {
    url: `smtp://127.0.0.1:${port}`,
    port,
    mode,
    received: [],
    get attempts() {
      return attempts
    },
    waitFor: async (count, withinMs = 20_000) => {
      const deadline = Date.now() + withinMs
      while (server.received.length < count && Date.now() < deadline) {
        await new Promise((resolve) => setTimeout(resolve, 25))
      }
      if (server.received.length >= count) return server.received
      throw new Error(`Of ${count} letters, ${server.received.length} came within ${withinMs} ms.`)
    },
    stop: () =>
      new Promise((resolve) => {
        open.delete(server)
        for (const socket of sockets.values()) socket.destroy()
        smtp.close(() => resolve())
      }),
  }
  open.add(server)
  return server
}

function answer(responseCode: number, text: string): Error {
  return Object.assign(new Error(text), { responseCode })
}

if (process.env.VITEST) {
  const { afterAll } = await import('vitest')
  afterAll(() => Promise.all([...open].map((server) => server.stop())))
}
