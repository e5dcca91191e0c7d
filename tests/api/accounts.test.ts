import { beforeAll, describe, expect, it } from 'vitest'
import { anonymous, signIn } from '../helpers/client'
import type { Client } from '../helpers/client'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'
import { CHEAP_HASH, KEEPER, makeFirstKeeper, newColleague, tokenOf } from '../helpers/studio'
import type { Refusal } from '~/utils/contracts/common'
import type { Account, MadeLink, SessionAnswer } from '~/utils/contracts/people'

describe('accounts', () => {
  let server: TestServer
  let keeper: Client
  const all = async (who: Client = keeper) => (await who.get<Account[]>('/api/accounts')).body
  const account = async (id: string) => (await all()).find((one) => one.id === id) as Account
  const change = async (id: string, what: { disabled?: boolean; keeper?: boolean }, who: Client = keeper) =>
    who.patch<Account & Refusal>(`/api/accounts/${id}`, { ...what, version: (await account(id)).version })

  beforeAll(async () => {
    server = await startServer({ demo: 'off', env: CHEAP_HASH })
    keeper = await makeFirstKeeper(server.url)
  })

  it('8.2.1: are there for keepers only', async () => {
    const { client, id } = await newColleague(keeper)
    for (const [who, status] of [
      [anonymous(server.url), 401],
      [client, 404],
    ] as const) {
      expect((await who.get('/api/accounts')).status).toBe(status)
      expect((await who.patch(`/api/accounts/${id}`, { keeper: true, version: 1 })).status).toBe(status)
      expect((await who.delete(`/api/accounts/${id}/sessions`)).status).toBe(status)
      expect((await who.post(`/api/accounts/${id}/reset`)).status).toBe(status)
    }
    expect((await account(id)).keeper).toBe(false)
    expect((await client.get('/api/me/sessions')).status).toBe(200)
  })

  it('15.3.1: tell listed fields only, and of productions those that the keeper belongs to', async () => {
    const other = await newColleague(keeper, { keeper: true })
    expect((await other.client.post('/api/productions', { slug: 'secret-film', title: 'Secret Film' })).status).toBe(201)
    const seen = await all()
    expect(JSON.stringify(seen)).not.toMatch(/secret|hash|token/i)
    for (const one of seen)
      expect(Object.keys(one).toSorted()).toEqual(['createdAt', 'disabled', 'email', 'id', 'keeper', 'memberships', 'name', 'seenAt', 'version'])
    const own = (await all(other.client)).find(({ id }) => id === other.id)
    expect(own?.memberships).toEqual([{ production: 'secret-film', title: 'Secret Film', role: 'supervisor' }])
  })

  it('15.3.3: refuse other fields, other people’s ids and a stale version', async () => {
    const { id } = await newColleague(keeper)
    const { version } = await account(id)
    for (const wrong of [{ version, email: 'x@harbour.example' }, { version, passwordHash: '' }, { keeper: 'yes', version }, { keeper: true }])
      expect((await keeper.patch(`/api/accounts/${id}`, wrong)).status).toBe(422)
    expect((await keeper.patch('/api/accounts/nobody', { keeper: true, version })).status).toBe(404)
    expect((await keeper.patch('/api/accounts/01a23168-81a5-703f-9fdf-f9b760ed73ae', { keeper: true, version })).status).toBe(404)
    const stale = await keeper.patch<Refusal>(`/api/accounts/${id}`, { keeper: true, version: version + 1 })
    expect(stale.status).toBe(409)
    expect(stale.body.data?.current).toMatchObject({ id, version, keeper: false })
    expect((await account(id)).keeper).toBe(false)
  })

  it('7.4.2: a closed account’s sessions end at once, and it opens to nothing until it is opened again', async () => {
    const { client, email, password, id } = await newColleague(keeper)
    const second = await signIn(server.url, email, password)
    const reset = (await keeper.post<MadeLink>(`/api/accounts/${id}/reset`)).body
    const closed = await change(id, { disabled: true })
    expect([closed.status, closed.body.disabled]).toEqual([200, true])

    for (const browser of [client, second]) expect((await browser.get('/api/me/sessions')).status).toBe(401)
    const refused = await anonymous(server.url).signIn(email, password)
    const unknown = await anonymous(server.url).signIn('nobody@harbour.example', password)
    expect([refused.status, refused.body]).toEqual([401, unknown.body])
    expect((await anonymous(server.url).post('/api/resets/use', { token: tokenOf(reset), password: 'words of the closed' })).status).toBe(410)
    expect((await keeper.post(`/api/accounts/${id}/reset`)).status).toBe(409)
    expect((await keeper.post('/api/invitations', { email, name: 'Back door' })).status).toBe(422)

    expect((await change(id, { disabled: false })).status).toBe(200)
    for (const browser of [client, second]) expect((await browser.get('/api/me/sessions')).status).toBe(401)
    expect((await anonymous(server.url).signIn(email, password)).status).toBe(200)
  })

  it('7.4.5: a keeper ends all of somebody’s sessions', async () => {
    const { client, email, password, id } = await newColleague(keeper)
    const second = await signIn(server.url, email, password)
    const ended = await keeper.delete<{ ended: number }>(`/api/accounts/${id}/sessions`)
    expect(ended.body).toEqual({ ended: 2 })
    for (const browser of [client, second]) expect((await browser.get('/api/me/sessions')).status).toBe(401)
    expect((await keeper.get('/api/me/sessions')).status).toBe(200)
    expect((await keeper.delete('/api/accounts/01a23168-81a5-703f-9fdf-f9b760ed73ae/sessions')).status).toBe(404)
  })

  it('8.3.2: being a keeper begins and ends at once, and links made as keeper end with it', async () => {
    const { client, id } = await newColleague(keeper)
    expect((await client.get('/api/accounts')).status).toBe(404)
    expect((await change(id, { keeper: true })).body.keeper).toBe(true)
    expect((await client.get('/api/accounts')).status).toBe(200)
    const made = (await client.post<MadeLink>('/api/invitations', { email: 'friend@harbour.example', name: 'Friend', keeper: true })).body

    expect((await change(id, { keeper: false })).body.keeper).toBe(false)
    expect((await client.get('/api/accounts')).status).toBe(404)
    const accepted = await anonymous(server.url).post('/api/invitations/accept', { token: tokenOf(made), name: 'Friend', password: 'friend of a keeper' })
    expect(accepted.status).toBe(410)
  })

  it('the last keeper stays one and stays open, whoever asks', async () => {
    const me = (await keeper.get<SessionAnswer>('/api/session')).body.me
    const id = me?.id ?? ''
    // Every other keeper of the tests above goes first.
    for (const other of (await all()).filter((one) => one.keeper && one.id !== id)) expect((await change(other.id, { keeper: false })).status).toBe(200)

    for (const [what, path] of [
      [{ keeper: false }, 'keeper'],
      [{ disabled: true }, 'disabled'],
      [{ disabled: true, keeper: false }, 'disabled'],
    ] as const) {
      const refused = await change(id, what)
      expect([refused.status, refused.body.data?.issues?.[0]?.path]).toEqual([422, path])
    }
    expect(await account(id)).toMatchObject({ keeper: true, disabled: false })

    // Of two keepers who let go of the other at the same moment, one stays.
    const second = await newColleague(keeper, { keeper: true })
    const versions = { own: (await account(id)).version, other: (await account(second.id)).version }
    await Promise.all([
      keeper.patch(`/api/accounts/${second.id}`, { keeper: false, version: versions.other }),
      second.client.patch(`/api/accounts/${id}`, { keeper: false, version: versions.own }),
    ])
    const nowKeepers = await Promise.all([keeper, second.client].map(async (who) => (await who.get<SessionAnswer>('/api/session')).body.me?.keeper))
    expect(nowKeepers.filter(Boolean)).toHaveLength(1)
    expect((await anonymous(server.url).post('/api/first-keeper', { ...KEEPER, email: 'again@harbour.example' })).status).toBe(409)
  })
})
