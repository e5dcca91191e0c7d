import { beforeAll, describe, expect, it } from 'vitest'
import { anonymous } from '../helpers/client'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'
import { CHEAP_HASH, KEEPER, makeFirstKeeper, newColleague } from '../helpers/studio'
import type { Client } from '../helpers/client'
import type { MadeLink } from '~/utils/contracts/people'

/** As if behind a proxy of one's own that says where a request came from. */
const from = (address: string) => ({ headers: { 'x-forwarded-for': address } })

describe('6.3.1, 6.1.1, 2.4.1: limits', () => {
  let server: TestServer
  let keeper: Client
  beforeAll(async () => {
    // The cheap hash makes the waits themselves visible; they do not depend on it.
    server = await startServer({ demo: 'off', env: { TRUST_PROXY: 'on', ...CHEAP_HASH } })
    keeper = await makeFirstKeeper(server.url)
  })
  const tryIn = (email: string, password: string, address: string, who = anonymous(server.url)) =>
    who.post('/api/session', { email, password }, from(address))

  it('from the sixth bad try on, an account’s tries wait longer each time; the eleventh from one address is refused', async () => {
    const { email, password } = await newColleague(keeper)
    const waits: number[] = []
    for (let i = 0; i < 8; i += 1) {
      const began = performance.now()
      expect((await tryIn(email, 'wrong every time', '203.0.113.1')).status).toBe(401)
      waits.push(performance.now() - began)
    }
    // That the first five do not wait is a unit test's business (waitBefore): a busy machine is slow without waiting.
    expect(waits[5]).toBeGreaterThanOrEqual(495)
    expect(waits[6]).toBeGreaterThanOrEqual(995)
    expect(waits[7]).toBeGreaterThanOrEqual(1995)
    // Two more use up the allowance; all at once they are counted before any is looked at.
    await Promise.all([1, 2].map(() => tryIn(email, 'wrong every time', '203.0.113.1')))
    const refused = await tryIn(email, password, '203.0.113.1')
    expect(refused.status).toBe(429)
    expect(Number(refused.headers.get('retry-after'))).toBeGreaterThan(60)
    expect(Number(refused.headers.get('retry-after'))).toBeLessThanOrEqual(15 * 60)
    // The right password from another address waits, and is let in: nobody can lock somebody else out.
    expect((await tryIn(email, password, '203.0.113.2')).status).toBe(200)
  }, 60_000)

  it('does so for an address without an account alike', async () => {
    const email = 'never-was@harbour.example'
    const answers = await Promise.all(Array.from({ length: 11 }, () => tryIn(email, 'wrong every time', '203.0.113.9')))
    expect(answers.map(({ status }) => status).toSorted()).toEqual([...Array<number>(10).fill(401), 429])
  }, 60_000)

  it('a browser that has signed in before is not counted with strangers, not even at its own address', async () => {
    const office = '198.51.100.4'
    const { client, email, password } = await newColleague(keeper)
    const strangers = await Promise.all(Array.from({ length: 12 }, () => tryIn(email, 'wrong every time', office)))
    expect(strangers.filter(({ status }) => status === 429)).toHaveLength(2)
    expect((await tryIn(email, password, office)).status).toBe(429)
    expect((await tryIn(email, password, office, client)).status).toBe(200)
    // What it remembers is good for this account only.
    const other = await newColleague(keeper)
    await Promise.all(Array.from({ length: 10 }, () => tryIn(other.email, 'wrong every time', office)))
    expect((await tryIn(other.email, other.password, office, client)).status).toBe(429)
  }, 60_000)

  it('one address may be wrong a hundred times, whatever accounts it tries; good ones do not count', async () => {
    const address = '2001:db8:77:1::5'
    for (let i = 0; i < 12; i += 1) expect((await tryIn(KEEPER.email, KEEPER.password, address)).status).toBe(200)
    const statuses: number[] = []
    for (let i = 0; i < 100; i += 1) statuses.push((await tryIn(`made-up-${i}@harbour.example`, 'wrong every time', address)).status)
    expect(statuses.every((status) => status === 401)).toBe(true)
    // The same customer's network, another address in it.
    expect((await tryIn('made-up-again@harbour.example', 'wrong every time', '2001:db8:77:1:9::1')).status).toBe(429)
    expect((await tryIn('made-up-again@harbour.example', 'wrong every time', '2001:db8:77:2::1')).status).toBe(401)
  }, 120_000)

  it('only the entry that the proxy added counts as the address', async () => {
    const email = 'forger@harbour.example'
    const forged = await Promise.all(
      Array.from({ length: 11 }, (_, i) => anonymous(server.url).post('/api/session', { email, password: 'wrong every time' }, from(`192.0.2.${i}, 203.0.113.77`))),
    )
    expect(forged.filter(({ status }) => status === 429)).toHaveLength(1)
  }, 60_000)

  it('looking at links, using them and asking for new passwords are counted per address', async () => {
    const token = 'A'.repeat(43)
    const count = async (times: number, send: (i: number) => Promise<{ status: number }>) => {
      const statuses: number[] = []
      for (let i = 0; i < times; i += 1) statuses.push((await send(i)).status)
      return statuses
    }
    const post = (path: string, body: unknown, address: string) => anonymous(server.url).post(path, body, from(address))
    expect((await count(61, () => post('/api/invitations/look', { token }, '192.0.2.10'))).indexOf(429)).toBe(60)
    expect((await count(31, () => post('/api/resets/use', { token, password: 'any long words here' }, '192.0.2.11'))).indexOf(429)).toBe(30)
    expect((await count(11, () => post('/api/first-keeper', { ...KEEPER }, '192.0.2.12'))).indexOf(429)).toBe(10)
    const asked = await Promise.all(Array.from({ length: 21 }, () => post('/api/resets', { email: 'nobody@harbour.example' }, '192.0.2.13')))
    expect(asked.filter(({ status }) => status === 429)).toHaveLength(1)
    // Another address is not touched by any of it.
    expect((await post('/api/invitations/look', { token }, '192.0.2.99')).status).toBe(410)
  }, 60_000)

  it('trying current passwords in somebody’s open session is counted, and locks out that session only', async () => {
    const { client, email, password } = await newColleague(keeper)
    const other = anonymous(server.url)
    expect((await tryIn(email, password, '203.0.113.50', other)).status).toBe(200)
    const body = (currentPassword: string) => ({ currentPassword, password: 'brand new words here' })
    for (let i = 0; i < 10; i += 1) expect((await client.post('/api/me/password', body(`guess number ${i}`))).status).toBe(422)
    expect((await client.post('/api/me/password', body(password))).status).toBe(429)
    expect((await other.post('/api/me/password', body(password))).status).toBe(200)
  })

  it('a keeper’s invitations are counted', async () => {
    const { client } = await newColleague(keeper, { keeper: true })
    const statuses: number[] = []
    for (let i = 0; i < 61; i += 1)
      statuses.push((await client.post<MadeLink>('/api/invitations', { email: `many-${i}@harbour.example`, name: 'Many' })).status)
    expect(statuses.indexOf(429)).toBe(60)
  }, 60_000)
})

describe('2.4.1: passwords hashed at once', () => {
  it('are few; a crowd beyond what can wait is sent away with the time to come back, and the rest is served', async () => {
    const server = await startServer({ demo: 'off', env: { TRUST_PROXY: 'on', ...CHEAP_HASH } })
    const crowd = await Promise.all(
      Array.from({ length: 60 }, (_, i) =>
        anonymous(server.url).post('/api/session', { email: `crowd-${i}@harbour.example`, password: 'wrong every time' }, from(`198.51.100.${i}`)),
      ),
    )
    const away = crowd.filter(({ status }) => status === 429)
    expect(crowd.filter(({ status }) => status === 401).length).toBeGreaterThanOrEqual(32)
    expect(away.length).toBeGreaterThan(0)
    expect(away.length + crowd.filter(({ status }) => status === 401).length).toBe(60)
    expect(away[0]?.headers.get('retry-after')).toBe('10')
  })
})
