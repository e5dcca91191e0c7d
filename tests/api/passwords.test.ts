import { beforeAll, describe, expect, it } from 'vitest'
import { anonymous, signIn } from '../helpers/client'
import type { Client } from '../helpers/client'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'
import { CHEAP_HASH, inStore, KEEPER, makeFirstKeeper, newColleague, tokenOf } from '../helpers/studio'
import type { Refusal } from '~/utils/contracts/common'
import type { MadeLink, Me, SessionAnswer } from '~/utils/contracts/people'

const pathsOf = (body: unknown) => ((body as Refusal).data?.issues ?? []).map(({ path }) => path)
const storedHash = async (server: TestServer, email: string) =>
  (await inStore(server.dataDir, ({ rows }) => rows<{ hash: string }>('SELECT password_hash AS hash FROM people WHERE email = :email', { email })))[0]?.hash ?? ''

describe('11.4.2: scrypt at today’s cost', () => {
  it('hashes an old one anew when its owner signs in, and only with the right password', async () => {
    const server = await startServer({ demo: 'off', env: CHEAP_HASH })
    await makeFirstKeeper(server.url)
    const old = await storedHash(server, KEEPER.email)
    expect(old).toMatch(/^\$scrypt\$n=16384,r=8,p=1\$/)

    await server.restart({ NUXT_HASH_SCRYPT_COST: '131072' })
    expect((await anonymous(server.url).signIn(KEEPER.email, 'not this one at all')).status).toBe(401)
    expect(await storedHash(server, KEEPER.email)).toBe(old)

    await signIn(server.url, KEEPER.email, KEEPER.password)
    const hash = await storedHash(server, KEEPER.email)
    expect(hash).toMatch(/^\$scrypt\$n=131072,r=8,p=1\$/)
    await signIn(server.url, KEEPER.email, KEEPER.password)
    expect(await storedHash(server, KEEPER.email)).toBe(hash)
  })
})

describe('passwords', () => {
  let server: TestServer
  let keeper: Client
  beforeAll(async () => {
    server = await startServer({ demo: 'off', env: CHEAP_HASH })
    keeper = await makeFirstKeeper(server.url)
  })

  it('6.2.1, 6.2.4: refuses short and common ones wherever a password is chosen', async () => {
    const { client, password } = await newColleague(keeper)
    const made = (await keeper.post<MadeLink>('/api/invitations', { email: 'weak@harbour.example', name: 'Weak' })).body
    const reset = (await keeper.post<MadeLink>(`/api/accounts/${client.me?.id ?? (await client.get<SessionAnswer>('/api/session')).body.me?.id}/reset`)).body
    for (const weak of ['shortish9', 'Password1234']) {
      const tries = [
        await client.post('/api/me/password', { currentPassword: password, password: weak, endOtherSessions: false }),
        await anonymous(server.url).post('/api/invitations/accept', { token: tokenOf(made), name: 'Weak', password: weak }),
        await anonymous(server.url).post('/api/resets/use', { token: tokenOf(reset), password: weak }),
      ]
      expect(tries.map(({ status }) => status)).toEqual([422, 422, 422])
      expect(tries.flatMap(({ body }) => pathsOf(body))).toEqual(['password', 'password', 'password'])
    }
    // A refused try uses no link up.
    expect((await anonymous(server.url).post('/api/invitations/look', { token: tokenOf(made) })).status).toBe(200)
    expect((await anonymous(server.url).post('/api/invitations/look', { token: tokenOf(reset) })).status).toBe(200)
  })

  it('6.2.5, 6.2.8, 6.2.9: takes any characters, long ones too, and checks them exactly as typed', async () => {
    const { client, email, password } = await newColleague(keeper)
    const chosen = ` ${'Żółte dźwigi idą nocą. '.repeat(8).slice(0, 140)}é `
    const set = await client.post('/api/me/password', { currentPassword: password, password: chosen })
    expect(set.status).toBe(200)
    for (const almost of [chosen.trim(), chosen.toLowerCase(), chosen.slice(0, -1), chosen.slice(0, 64), chosen.normalize('NFD')])
      expect((await anonymous(server.url).signIn(email, almost)).status).toBe(401)
    // Five bad ones are behind it: this one waits for nothing, the address has not been used from here before.
    expect((await client.signIn(email, chosen)).status).toBe(200)
  })

  it('6.2.3: needs the current password, at that field, and changes nothing without', async () => {
    const { client, email, password } = await newColleague(keeper)
    const before = await storedHash(server, email)
    const wrong = await client.post('/api/me/password', { currentPassword: 'some other words', password: 'quite new words here' })
    expect(wrong.status).toBe(422)
    expect(pathsOf(wrong.body)).toEqual(['currentPassword'])
    expect((await client.post('/api/me/password', { password: 'quite new words here' })).status).toBe(422)
    expect((await anonymous(server.url).post('/api/me/password', { currentPassword: password, password: 'quite new words here' })).status).toBe(401)
    expect(await storedHash(server, email)).toBe(before)
  })

  it('7.4.3: ends every other session when asked, none when not; this one goes on under a new token', async () => {
    const { client, email, password } = await newColleague(keeper)
    const other = await signIn(server.url, email, password)
    const copied = client.cookie

    const kept = await client.post('/api/me/password', { currentPassword: password, password: 'first new words here', endOtherSessions: false })
    expect(kept.status).toBe(200)
    expect((await other.get('/api/me/sessions')).status).toBe(200)
    expect((await anonymous(server.url, copied).get('/api/me/sessions')).status).toBe(401)

    // Ending them is what happens when nothing is said.
    expect((await client.post('/api/me/password', { currentPassword: 'first new words here', password: 'second new words here' })).status).toBe(200)
    expect((await other.get('/api/me/sessions')).status).toBe(401)
    expect((await client.get('/api/me/sessions')).status).toBe(200)
    expect((await anonymous(server.url).signIn(email, password)).status).toBe(401)
    expect((await anonymous(server.url).signIn(email, 'second new words here')).status).toBe(200)
  })

  it('7.5.1: needs the current password for another address, which nobody else may have', async () => {
    const { client, email, password } = await newColleague(keeper)
    const wanted = 'new-address@harbour.example'
    const wrong = await client.post('/api/me/email', { email: wanted, currentPassword: 'some other words' })
    expect([wrong.status, pathsOf(wrong.body)]).toEqual([422, ['currentPassword']])
    const taken = await client.post('/api/me/email', { email: KEEPER.email.toUpperCase(), currentPassword: password })
    expect([taken.status, pathsOf(taken.body)]).toEqual([422, ['email']])
    expect((await anonymous(server.url).signIn(wanted, password)).status).toBe(401)

    const changed = await client.post<Me>('/api/me/email', { email: wanted, currentPassword: password })
    expect([changed.status, changed.body.email]).toEqual([200, wanted])
    expect((await anonymous(server.url).signIn(email, password)).status).toBe(401)
    expect((await anonymous(server.url).signIn(wanted, password)).status).toBe(200)
  })

  describe('a forgotten one', () => {
    it('6.3.8: asking answers alike, in about the same time, and writes to accounts only', async () => {
      const { email } = await newColleague(keeper)
      const ask = async (address: string) => {
        const began = performance.now()
        const answer = await anonymous(server.url).post('/api/resets', { email: address })
        return { status: answer.status, body: answer.body, ms: performance.now() - began }
      }
      const real = await ask(email)
      const unreal = await ask('nobody-at-all@harbour.example')
      expect([unreal.status, unreal.body]).toEqual([real.status, real.body])
      expect(real.status).toBe(202)
      // Far wider than the difference that matters, so that a busy machine fails nothing; sending itself takes no part in the answer.
      expect(Math.abs(unreal.ms - real.ms)).toBeLessThan(3_000)
      const letters = await inStore(server.dataDir, ({ rows }) => rows<{ email: string }>("SELECT to_address AS email FROM letters WHERE kind = 'reset'"))
      expect(letters.filter((one) => one.email === email)).toHaveLength(1)
      expect(letters.filter((one) => one.email.startsWith('nobody'))).toHaveLength(0)
    })

    it('6.3.1: at most three letters an hour, and asking on is never refused for it', async () => {
      const { email } = await newColleague(keeper)
      const statuses = await Promise.all(Array.from({ length: 5 }, () => anonymous(server.url).post('/api/resets', { email })))
      expect(statuses.map(({ status }) => status)).toEqual([202, 202, 202, 202, 202])
      const letters = await inStore(server.dataDir, ({ rows }) => rows('SELECT id FROM letters WHERE to_address = :email AND kind = \'reset\'', { email }))
      expect(letters).toHaveLength(3)
    })

    it('6.4.1, 6.4.3, 11.5.1: a link works once, ends every session, and only its hash is kept', async () => {
      const { client, email, password, id } = await newColleague(keeper)
      const made = (await keeper.post<MadeLink>(`/api/accounts/${id}/reset`)).body
      const second = (await keeper.post<MadeLink>(`/api/accounts/${id}/reset`)).body
      const token = tokenOf(made)
      expect(made.link).toBe(`${server.url}/reset#${token}`)
      expect(Buffer.from(token, 'base64url')).toHaveLength(32)
      expect(token).not.toBe(tokenOf(second))
      const stored = JSON.stringify(await inStore(server.dataDir, ({ rows }) => rows('SELECT * FROM links')))
      expect(stored).not.toContain(token)

      // Somebody else's link is not an invitation, and a bent one is nothing.
      expect((await anonymous(server.url).post('/api/invitations/accept', { token, name: 'X', password: 'words for nobody here' })).status).toBe(410)
      const bent = (token[0] === 'A' ? 'B' : 'A') + token.slice(1)
      expect((await anonymous(server.url).post('/api/resets/use', { token: bent, password: 'words for nobody here' })).status).toBe(410)

      const browser = anonymous(server.url)
      const used = await browser.post<SessionAnswer>('/api/resets/use', { token, password: 'remembered this time' })
      expect([used.status, used.body.me?.email]).toEqual([200, email])
      expect((await client.get('/api/me/sessions')).status).toBe(401)
      expect((await browser.get('/api/me/sessions')).status).toBe(200)
      expect((await anonymous(server.url).signIn(email, password)).status).toBe(401)
      for (const spent of [token, tokenOf(second)])
        expect((await anonymous(server.url).post('/api/resets/use', { token: spent, password: 'another set of words' })).status).toBe(410)
    })

    it('6.4.1: a link runs out after two hours', async () => {
      const { email, password, id } = await newColleague(keeper)
      const made = (await keeper.post<MadeLink>(`/api/accounts/${id}/reset`)).body
      expect(Date.parse(made.invitation.expiresAt) - Date.parse(made.invitation.createdAt)).toBe(2 * 60 * 60 * 1000)
      await inStore(server.dataDir, ({ run }) =>
        run('UPDATE links SET expires_at = :at WHERE id = :id', { id: made.invitation.id, at: new Date(Date.now() - 1000).toISOString() }),
      )
      expect((await anonymous(server.url).post('/api/resets/use', { token: tokenOf(made), password: 'too late for these' })).status).toBe(410)
      expect((await anonymous(server.url).signIn(email, password)).status).toBe(200)
    })
  })
})

describe('15.3.3, 2.2.2: one’s own page', () => {
  it('changes the named fields only, and keeps both sides of a stale change', async () => {
    const server = await startServer({ demo: 'off', env: CHEAP_HASH })
    const keeper = await makeFirstKeeper(server.url)
    const { client, id } = await newColleague(keeper)
    const { version } = (await client.get<SessionAnswer>('/api/session')).body.me ?? { version: 0 }
    for (const wrong of [
      { name: 'Mine', version, keeper: true },
      { name: 'Mine', version, id },
      { name: '', version },
      { name: 'a\u0000b', version },
      { mailWish: 'everything', version },
      { name: 'Mine' },
    ])
      expect((await client.patch('/api/me', wrong)).status).toBe(422)
    expect((await anonymous(server.url).patch('/api/me', { name: 'Mine', version })).status).toBe(401)

    const changed = await client.patch<Me>('/api/me', { name: '汐見 なぎ', mailWish: 'own-takes', version })
    expect(changed.body).toMatchObject({ name: '汐見 なぎ', mailWish: 'own-takes', version: version + 1, keeper: false })
    const stale = await client.patch<Refusal>('/api/me', { name: 'From another window', version })
    expect(stale.status).toBe(409)
    expect(stale.body.data?.current).toMatchObject({ name: '汐見 なぎ', version: version + 1 })
    expect((await client.get<SessionAnswer>('/api/session')).body.me?.name).toBe('汐見 なぎ')
  })
})
