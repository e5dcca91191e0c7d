import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'
import { createTransport } from 'nodemailer'
import { afterEach, describe, expect, it } from 'vitest'
import { anonymous } from '../../helpers/client'
import { startMailServer } from '../../helpers/mail'

const closing: (() => void)[] = []
afterEach(() => closing.splice(0).forEach((close) => close()))

describe('the API client', () => {
  it('holds the cookie until it is taken back, and sends its Origin with what changes something', async () => {
    const seen: Record<string, unknown>[] = []
    const server = createServer(({ method, url, headers }, response) => {
      seen.push({ method, url, origin: headers.origin, cookie: headers.cookie, type: headers['content-type'] })
      if (url === '/in') response.setHeader('set-cookie', 'tiltyard=a=b; Path=/; HttpOnly; Max-Age=60')
      if (url === '/out') response.setHeader('set-cookie', 'tiltyard=; Path=/; Max-Age=0')
      response.setHeader('content-type', 'application/json').end('{"ok":true}')
    }).listen(0, '127.0.0.1')
    closing.push(() => server.close())
    await new Promise((resolve) => server.once('listening', resolve))
    const url = `http://127.0.0.1:${(server.address() as AddressInfo).port}`

    const client = anonymous(url)
    expect((await client.post('/in', { a: 1 })).body).toEqual({ ok: true })
    expect(client.cookie).toBe('tiltyard=a=b')
    await client.get('/look')
    await client.delete('/out')
    expect(client.cookie).toBe('')
    expect(seen).toEqual([
      { method: 'POST', url: '/in', origin: url, cookie: undefined, type: 'application/json' },
      { method: 'GET', url: '/look', origin: undefined, cookie: 'tiltyard=a=b', type: undefined },
      { method: 'DELETE', url: '/out', origin: url, cookie: 'tiltyard=a=b', type: undefined },
    ])
  })
})

describe('the mail server', () => {
  const letter = { from: 'board@x.example', to: 'ann@x.example', subject: 'Take 1', text: 'It stands.' }
  const send = (url: string) =>
    createTransport({ url, socketTimeout: 700, greetingTimeout: 700 } as never).sendMail(letter) as Promise<unknown>

  it('takes letters, refuses them for now or for good, hangs and drops the line', async () => {
    const mail = await startMailServer()
    await send(mail.url)
    const [received] = await mail.waitFor(1)
    expect(received?.to).toEqual(['ann@x.example'])
    expect(received?.mail.subject).toBe('Take 1')
    expect(received?.mail.text?.trim()).toBe('It stands.')

    mail.mode = '4xx'
    await expect(send(mail.url)).rejects.toMatchObject({ responseCode: 451 })
    mail.mode = '5xx'
    await expect(send(mail.url)).rejects.toMatchObject({ responseCode: 554 })
    mail.mode = 'hang'
    await expect(send(mail.url)).rejects.toMatchObject({ code: 'ETIMEDOUT' })
    mail.mode = 'drop'
    await expect(send(mail.url)).rejects.toThrow()
    expect(mail.received).toHaveLength(1)
    mail.mode = 'accept-then-drop'
    await expect(send(mail.url)).rejects.toThrow()
    expect(mail.received).toHaveLength(2)
    expect(mail.attempts).toBe(5)

    await mail.stop()
    await expect(send(mail.url)).rejects.toMatchObject({ code: 'ESOCKET' })
  })
})
