import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { anonymous } from '../helpers/client'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'

let server: TestServer
beforeAll(async () => {
  server = await startServer({ demo: 'off' })
})
afterAll(async () => {
  await server.stop()
})

describe('who is not signed in', () => {
  it.each(['/favicon.svg', '/api/health', '/api/session', '/sign-in', '/no-such-page'])('%s sets no session cookie', async (path) => {
    const answer = await fetch(server.url + path, { redirect: 'manual' })
    expect(answer.headers.getSetCookie().filter((cookie) => /tiltyard/.test(cookie))).toEqual([])
  })

  it('finds no second way to a session beside our own routes', async () => {
    const visitor = anonymous(server.url)
    for (const method of ['GET', 'DELETE']) expect((await visitor.send(method, '/api/_auth/session')).status).toBe(404)
  })
})

describe('headers (ASVS 3.4.3, 3.4.4, 3.4.6)', () => {
  it('a page carries a policy with a fresh nonce, and nothing inline without it', async () => {
    const [one, two] = await Promise.all([fetch(`${server.url}/first-keeper`), fetch(`${server.url}/first-keeper`)])
    const policies = [one, two].map((answer) => answer.headers.get('content-security-policy') ?? '')
    const nonces = policies.map((policy) => /'nonce-([^']+)'/.exec(policy)?.[1])
    expect(nonces[0]).toBeTruthy()
    expect(nonces[0]).not.toBe(nonces[1])
    for (const part of ["object-src 'none'", "base-uri 'none'", "frame-ancestors 'none'"]) expect(policies[0]).toContain(part)
    expect(policies[0]).not.toContain('unsafe-eval')
    const html = await one.text()
    const tags = html.match(/<(script|style)(?=[\s>])[^>]*>/g) ?? []
    expect(tags.length).toBeGreaterThan(0)
    expect(tags.filter((tag) => !tag.includes(`nonce="${nonces[0]}"`))).toEqual([])
  })

  it('every other answer may do nothing at all, and is never sniffed', async () => {
    for (const path of ['/api/health', '/api/no-such-route', '/favicon.svg']) {
      const { headers } = await fetch(server.url + path)
      expect(headers.get('x-content-type-options')).toBe('nosniff')
      expect(headers.get('content-security-policy')).toContain("frame-ancestors 'none'")
    }
  })

  it('says HSTS only where the address is https (3.4.1)', async () => {
    expect((await fetch(`${server.url}/api/health`)).headers.get('strict-transport-security')).toBeNull()
    const secure = await startServer({ demo: 'off', env: { BASE_URL: 'https://board.example' } })
    try {
      expect((await fetch(`${secure.url}/api/health`)).headers.get('strict-transport-security')).toMatch(/^max-age=\d{8,}/)
    } finally {
      await secure.stop()
    }
  })
})
