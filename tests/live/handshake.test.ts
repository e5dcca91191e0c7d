import { randomBytes } from 'node:crypto'
import { request } from 'node:http'
import type { Socket } from 'node:net'
import { beforeAll, describe, expect, it } from 'vitest'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'
import { House, sealedCookie } from './house'
import type { Person } from './house'
import { Line } from './line'
import type { Transport } from './line'

// ASVS 5.0.0 4.4.2: the handshake of a socket checks Origin and session.
let server: TestServer
let house: House
let person: Person

beforeAll(async () => {
  server = await startServer({ demo: 'off' })
  house = new House(server)
  person = await house.person('Ines Ferro')
  return () => house.close()
})

const refusal = (line: Line) => line.open().then(() => 'admitted', (problem: unknown) => problem)

describe.each<Transport>(['websocket', 'polling'])('over %s', (transport) => {
  it('admits a living session from our own page, on this very transport', async () => {
    const line = await new Line(server.url, { cookie: person.cookie, transport }).open()
    expect(line.transport).toBe(transport)
    expect(line.socket.connected).toBe(true)
  })

  it('refuses another site, whoever is signed in', async () => {
    const line = new Line(server.url, { cookie: person.cookie, transport, origin: 'https://elsewhere.example' })
    expect(await refusal(line)).toBeInstanceOf(Error)
    expect(line.socket.connected).toBe(false)
  })

  it.each(['http://127.0.0.1:1', 'null', 'http://localhost.elsewhere.example'])('refuses the origin %s', async (origin) => {
    expect(await refusal(new Line(server.url, { cookie: person.cookie, transport, origin }))).toBeInstanceOf(Error)
  })

  it('refuses who has no cookie', async () => {
    expect(await refusal(new Line(server.url, { transport }))).toMatchObject({ data: { ok: false, statusCode: 401 } })
  })

  it('refuses a cookie that is not sealed by this house, and one whose session it does not know', async () => {
    const forged = await sealedCookie('a'.repeat(43), 'another house seals with another secret')
    for (const cookie of ['tiltyard=nonsense', forged])
      expect(await refusal(new Line(server.url, { cookie, transport }))).toMatchObject({ data: { statusCode: 401 } })
  })

  it('refuses a session that has ended, grown old, or belongs to a disabled person', async () => {
    const ended = await house.session(person.id)
    await house.run('UPDATE sessions SET ended_at = ? WHERE id = ?', new Date().toISOString(), ended.sessionId)
    const days = (count: number) => new Date(Date.now() - count * 24 * 60 * 60 * 1000)
    const idle = await house.session(person.id, { seenAt: days(15) })
    const old = await house.session(person.id, { createdAt: days(31), seenAt: days(0) })
    const disabled = await house.person('Oda Brandt')
    await house.run('UPDATE people SET disabled_at = ? WHERE id = ?', new Date().toISOString(), disabled.id)
    for (const { cookie } of [ended, idle, old, disabled])
      expect(await refusal(new Line(server.url, { cookie, transport }))).toMatchObject({ data: { statusCode: 401 } })
  })
})

describe('at the door, before there is a socket', () => {
  const poll = (more: string, init: RequestInit = {}) => fetch(`${server.url}/socket.io/?EIO=4&transport=polling${more}`, init)

  it('answers a foreign Origin with 403 and no session id', async () => {
    const answer = await poll('', { headers: { cookie: person.cookie, origin: 'https://elsewhere.example' } })
    expect(answer.status).toBe(403)
    expect(await answer.text()).not.toContain('sid')
  })

  it.each(['&sid=__proto__', '&sid=nobody'])('does not know the session id %s', async (sid) => {
    expect((await poll(sid)).status).toBe(400)
    expect(await closeCode(sid)).toBe(1008)
  })

  it('closes a WebSocket that claims to be another transport, and stays in good health', async () => {
    expect(await closeCode('', 'constructor')).toBe(1008)
    expect(await closeCode('', 'polling')).toBe(NO_CODE)
    expect((await fetch(`${server.url}/api/health`)).status).toBe(200)
  })

  it('takes no message that is longer than any request could be', async () => {
    const line = await new Line(server.url, { cookie: person.cookie }).open()
    line.socket.emit('watch', { production: 'x'.repeat(100_000) }, () => {})
    expect(await line.ended()).toMatch(/transport/)
  })

  const NO_CODE = 1005
  /** Upgrades by hand and answers the code of the first frame, which must be the server's closing one. */
  function closeCode(more: string, transport = 'websocket'): Promise<number> {
    return new Promise((resolve, reject) => {
      const asked = request(`${server.url}/socket.io/?EIO=4&transport=${transport}${more}`, {
        headers: {
          connection: 'Upgrade',
          upgrade: 'websocket',
          'sec-websocket-version': '13',
          'sec-websocket-key': randomBytes(16).toString('base64'),
          origin: server.url,
          cookie: person.cookie,
        },
      })
      const read = (socket: Socket, [opcode = 0, length = 0, high = 0, low = 0]: Buffer) => {
        socket.destroy()
        if (opcode !== 0x88) reject(new Error(`The server went on, with a frame that begins with ${opcode}.`))
        else resolve(length === 0 ? NO_CODE : high * 256 + low)
      }
      asked.on('upgrade', (_answer, socket: Socket, head) => {
        if (head.length > 0) read(socket, head)
        else socket.once('data', (frame: Buffer) => read(socket, frame))
      })
      asked.on('response', ({ statusCode }) => reject(new Error(`No upgrade: ${statusCode}.`)))
      asked.on('error', reject)
      asked.setTimeout(3_000, () => reject(new Error('The server said nothing.')))
      asked.end()
    })
  }
})
