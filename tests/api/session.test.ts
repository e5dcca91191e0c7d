import { beforeAll, describe, expect, it } from 'vitest'
import { anonymous, signIn } from '../helpers/client'
import type { Client } from '../helpers/client'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'
import { inStore, KEEPER, newColleague } from '../helpers/studio'
import type { OwnSession, SessionAnswer } from '~/utils/contracts/people'

const DAY = 24 * 60 * 60 * 1000
const median = (times: number[]) => times.toSorted((a, b) => a - b)[Math.floor(times.length / 2)] ?? Number.NaN

describe('who is signed in', () => {
  let server: TestServer
  let keeper: Client
  beforeAll(async () => {
    server = await startServer({ demo: 'off' })
  })

  describe('an installation without a keeper (6.3.2)', () => {
    it('has no account that anybody could know, and says that it is empty', async () => {
      const nobody = anonymous(server.url)
      expect((await nobody.signIn('keeper@quayside.example', 'cranes walk at night')).status).toBe(401)
      expect((await nobody.get<SessionAnswer>('/api/session')).body).toEqual({ me: null, demo: false, empty: true, demoAccounts: [] })
      expect(await inStore(server.dataDir, ({ rows }) => rows('SELECT id FROM people'))).toEqual([])
    })

    it('refuses what is not whole, and stores nothing of it', async () => {
      const nobody = anonymous(server.url)
      for (const [wrong, path] of [
        [{ ...KEEPER, password: 'short' }, 'password'],
        [{ ...KEEPER, email: 'no address' }, 'email'],
        [{ ...KEEPER, name: 'two\r\nlines' }, 'name'],
        [{ ...KEEPER, keeper: true }, ''],
      ] as const) {
        const answer = await nobody.post<{ data: { issues: { path: string }[] } }>('/api/first-keeper', wrong)
        expect(answer.status).toBe(422)
        expect(answer.body.data.issues[0]?.path).toBe(path)
      }
      const foreign = await nobody.post('/api/first-keeper', KEEPER, { headers: { origin: 'https://elsewhere.example' } })
      expect(foreign.status).toBe(403)
      expect((await nobody.get<SessionAnswer>('/api/session')).body.empty).toBe(true)
    })

    it('makes one keeper only, however many ask at once', async () => {
      const asked = await Promise.all(
        Array.from({ length: 5 }, (_, i) =>
          anonymous(server.url).post('/api/first-keeper', { ...KEEPER, email: i === 0 ? KEEPER.email : `racer-${i}@harbour.example` }),
        ),
      )
      expect(asked.map(({ status }) => status).toSorted()).toEqual([201, 409, 409, 409, 409])
      const people = await inStore(server.dataDir, ({ rows }) => rows<{ keeper: number; hash: string }>('SELECT keeper, password_hash AS hash FROM people'))
      expect(people.map(({ keeper }) => keeper)).toEqual([1])
      // 11.4.2: the cost that an installation uses without being told.
      expect(people[0]?.hash).toMatch(/^\$scrypt\$n=131072,r=8,p=1\$/)
      expect((await anonymous(server.url).post('/api/first-keeper', KEEPER)).status).toBe(409)
    })
  })

  describe('signing in', () => {
    beforeAll(async () => {
      // Whoever won the race above is the keeper; from here on it has a known address.
      await inStore(server.dataDir, ({ run }) => run('UPDATE people SET email = :email', { email: KEEPER.email }))
      keeper = await signIn(server.url, KEEPER.email, KEEPER.password)
    })

    it('refuses a wrong password, a wrong address and a foreign page', async () => {
      const nobody = anonymous(server.url)
      expect((await nobody.signIn(KEEPER.email, `${KEEPER.password}.`)).status).toBe(401)
      expect((await nobody.signIn('nobody@harbour.example', KEEPER.password)).status).toBe(401)
      expect((await nobody.signIn(KEEPER.email, '')).status).toBe(422)
      expect((await nobody.post('/api/session', { ...KEEPER })).status).toBe(422)
      const foreign = await nobody.post(
        '/api/session',
        { email: KEEPER.email, password: KEEPER.password },
        { headers: { origin: 'https://elsewhere.example' } },
      )
      expect(foreign.status).toBe(403)
      expect((await nobody.get<SessionAnswer>('/api/session')).body.me).toBeNull()
      expect((await nobody.get('/api/me/sessions')).status).toBe(401)
    })

    it('6.3.8: answers alike, in about the same time, whether the account exists or not', async () => {
      const nobody = anonymous(server.url)
      const timed = async (email: string) => {
        const began = performance.now()
        const answer = await nobody.signIn(email, 'not the password at all')
        return { answer, ms: performance.now() - began }
      }
      const there: number[] = []
      const notThere: number[] = []
      for (let i = 0; i < 3; i += 1) {
        const real = await timed(KEEPER.email)
        const unreal = await timed(`nobody-${i}@harbour.example`)
        expect(unreal.answer.status).toBe(real.answer.status)
        expect(unreal.answer.body).toEqual(real.answer.body)
        there.push(real.ms)
        notThere.push(unreal.ms)
      }
      // Half a second of hashing either way. Leaving it out would make one side a hundred times faster.
      expect(median(notThere) / median(there)).toBeGreaterThan(0.4)
      expect(median(notThere) / median(there)).toBeLessThan(2.5)
    })

    it('7.2.4: gives a new session id, and ends the session that the browser had', async () => {
      const browser = await signIn(server.url, KEEPER.email, KEEPER.password)
      const before = browser.cookie
      await browser.signIn(KEEPER.email, KEEPER.password)
      expect(browser.cookie).not.toBe(before)
      expect((await anonymous(server.url, before).get('/api/me/sessions')).status).toBe(401)
      expect((await browser.get('/api/me/sessions')).status).toBe(200)
    })

    it('3.3.2, 3.3.4, 14.2.1: keeps the token in a cookie that scripts cannot read, and out of every answer', async () => {
      const answer = await anonymous(server.url).signIn(KEEPER.email, KEEPER.password)
      const cookies = answer.headers.getSetCookie().filter((line) => !/^[^=]+=;/.test(line))
      expect(cookies.map((line) => line.split('=')[0]).toSorted()).toEqual(['tiltyard', 'tiltyard-known'])
      for (const line of cookies) {
        expect(line).toMatch(/; HttpOnly/i)
        expect(line).toMatch(/; SameSite=Lax/i)
        expect(line).toMatch(/; Path=\/(;|$)/i)
      }
      expect(JSON.stringify(answer.body)).not.toMatch(/token|hash|session/i)
    })

    it('15.3.1: tells of the person only what is listed', async () => {
      const { me } = (await keeper.get<SessionAnswer>('/api/session')).body
      expect(Object.keys(me ?? {}).toSorted()).toEqual(['email', 'id', 'keeper', 'mailWish', 'memberships', 'name', 'version'])
    })

    it('16.3.1, 16.2.5: logs sign-ins and refusals, and no password, cookie or token', async () => {
      const browser = await signIn(server.url, KEEPER.email, KEEPER.password)
      await anonymous(server.url).signIn(KEEPER.email, 'wrong and never logged')
      const log = server.logs()
      expect(log).toContain('"what":"signed in"')
      expect(log).toContain('"what":"sign-in refused"')
      expect(log).not.toContain(KEEPER.password)
      expect(log).not.toContain('wrong and never logged')
      for (const pair of browser.cookie.split('; ')) expect(log).not.toContain(pair.split('=')[1])
    })
  })

  describe('the end of a session', () => {
    it('7.4.1: a copied cookie is dead after signing out', async () => {
      const browser = await signIn(server.url, KEEPER.email, KEEPER.password)
      const copy = browser.cookie
      expect((await anonymous(server.url, copy).get('/api/me/sessions')).status).toBe(200)
      expect((await browser.delete('/api/session')).status).toBe(200)
      expect(browser.cookie).not.toMatch(/(^|; )tiltyard=/)
      expect((await anonymous(server.url, copy).get('/api/me/sessions')).status).toBe(401)
    })

    it('a foreign page cannot sign anybody out, and a GET ends nothing', async () => {
      const browser = await signIn(server.url, KEEPER.email, KEEPER.password)
      const foreign = await browser.delete('/api/session', undefined, { headers: { origin: 'https://elsewhere.example' } })
      expect(foreign.status).toBe(403)
      expect((await browser.get('/api/session')).status).toBe(200)
      expect((await browser.get('/api/me/sessions')).status).toBe(200)
    })

    it.each([
      ['7.3.1: unused for 15 days', 'seen_at', 15],
      ['7.3.2: 31 days old, however much it was used', 'created_at', 31],
    ])('%s', async (_, column, days) => {
      const { client, id } = await newColleague(keeper)
      const sql = column === 'seen_at' ? 'UPDATE sessions SET seen_at = :at WHERE person_id = :id' : 'UPDATE sessions SET created_at = :at WHERE person_id = :id'
      const age = (count: number) =>
        inStore(server.dataDir, ({ run }) => run(sql, { id, at: new Date(Date.now() - count * DAY).toISOString() }))
      await age(days)
      expect((await client.get('/api/me/sessions')).status).toBe(401)
      await age(days - 2)
      expect((await client.get('/api/me/sessions')).status).toBe(200)
    })

    it('7.5.2: one ends one’s own sessions, never somebody else’s', async () => {
      const { client, email, password } = await newColleague(keeper)
      const other = await signIn(server.url, email, password)
      const listed = (await client.get<OwnSession[]>('/api/me/sessions')).body
      expect(listed.map(({ current }) => current).toSorted()).toEqual([false, true])
      const theOther = listed.find(({ current }) => !current)?.id ?? ''

      expect((await keeper.delete(`/api/me/sessions/${theOther}`)).status).toBe(404)
      expect((await anonymous(server.url).delete(`/api/me/sessions/${theOther}`)).status).toBe(401)
      expect((await other.get('/api/me/sessions')).status).toBe(200)

      expect((await client.delete(`/api/me/sessions/${theOther}`)).status).toBe(200)
      expect((await other.get('/api/me/sessions')).status).toBe(401)
      expect((await client.get<OwnSession[]>('/api/me/sessions')).body).toHaveLength(1)
      expect((await client.delete(`/api/me/sessions/${theOther}`)).status).toBe(404)
    })

    it('a tampered cookie is nobody', async () => {
      const browser = await signIn(server.url, KEEPER.email, KEEPER.password)
      const [, value = ''] = /(?:^|; )tiltyard=([^;]+)/.exec(browser.cookie) ?? []
      const bent = value.slice(0, -6) + (value.endsWith('AAAAAA') ? 'BBBBBB' : 'AAAAAA')
      expect((await anonymous(server.url, `tiltyard=${bent}`).get('/api/me/sessions')).status).toBe(401)
      expect((await anonymous(server.url, `tiltyard=${value}`).get('/api/me/sessions')).status).toBe(200)
    })
  })
})

describe('3.3.1, 3.3.3: behind https', () => {
  it('cookies are Secure and bound to this host by their prefix', async () => {
    const server = await startServer({ demo: 'off', env: { BASE_URL: 'https://board.harbour.example' } })
    const browser = anonymous(server.url)
    const wrongOrigin = await browser.post('/api/first-keeper', KEEPER, { headers: { origin: 'https://elsewhere.example' } })
    expect(wrongOrigin.status).toBe(403)
    const answer = await browser.post('/api/first-keeper', KEEPER, { headers: { origin: 'https://board.harbour.example' } })
    expect(answer.status).toBe(201)
    const set = answer.headers.getSetCookie().filter((line) => !/^[^=]+=;/.test(line))
    expect(set).toHaveLength(2)
    for (const line of set) {
      expect(line).toMatch(/^__Host-tiltyard/)
      expect(line).toMatch(/; Secure/i)
      expect(line).not.toMatch(/; Domain/i)
    }
  })
})

describe('a demo installation', () => {
  it('offers its five accounts, and is never empty', async () => {
    const server = await startServer({ demo: 'on' })
    const nobody = anonymous(server.url)
    const { demo, empty, demoAccounts, me } = (await nobody.get<SessionAnswer>('/api/session')).body
    expect({ demo, empty, me }).toEqual({ demo: true, empty: false, me: null })
    expect(demoAccounts.map(({ email }) => email)).toEqual(
      ['animator', 'supervisor', 'coordinator', 'guest', 'keeper'].map((name) => `${name}@quayside.example`),
    )
    expect((await nobody.post('/api/first-keeper', KEEPER)).status).toBe(409)
  })
})
