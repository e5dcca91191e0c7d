import { beforeAll, describe, expect, it } from 'vitest'
import { anonymous } from '../helpers/client'
import type { Client } from '../helpers/client'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'
import { CHEAP_HASH, inStore, KEEPER, makeFirstKeeper, newColleague, tokenOf } from '../helpers/studio'
import type { InvitationRow, LinkAnswer, MadeLink, Membership, SessionAnswer } from '~/utils/contracts/people'

const WEEK = 7 * 24 * 60 * 60 * 1000
const words = 'four winds in one sail'

describe('invitations', () => {
  let server: TestServer
  let keeper: Client
  let colleague: Client
  let count = 0
  const invite = (more: Record<string, unknown> = {}) => {
    count += 1
    return keeper.post<MadeLink>('/api/invitations', { email: `guest-${count}@harbour.example`, name: `Guest ${count}`, ...more })
  }
  const accept = (token: string, more: Record<string, unknown> = {}) => {
    const browser = anonymous(server.url)
    return browser.post<SessionAnswer>('/api/invitations/accept', { token, name: 'As I like it', password: words, ...more }).then((answer) => ({ browser, answer }))
  }
  const look = (token: string) => anonymous(server.url).post<LinkAnswer>('/api/invitations/look', { token })

  beforeAll(async () => {
    server = await startServer({ demo: 'off', env: CHEAP_HASH })
    keeper = await makeFirstKeeper(server.url)
    colleague = (await newColleague(keeper)).client
  })

  it('8.2.1: only a keeper makes, lists or withdraws them', async () => {
    const made = (await invite()).body
    for (const [who, status] of [
      [anonymous(server.url), 401],
      [colleague, 404],
    ] as const) {
      expect((await who.post('/api/invitations', { email: 'x@harbour.example', name: 'X' })).status).toBe(status)
      expect((await who.get('/api/invitations')).status).toBe(status)
      expect((await who.delete(`/api/invitations/${made.invitation.id}`)).status).toBe(status)
    }
    expect((await look(tokenOf(made))).status).toBe(200)
  })

  it('2.2.1, 2.2.2: refuses what is not well-formed', async () => {
    for (const wrong of [
      { email: 'nobody' },
      { name: '' },
      { name: 'x'.repeat(81) },
      { name: 'Bcc: everyone\r\nBcc: all' },
      { role: 'animator' },
      { production: 'quayside' },
      { production: 'quayside', role: 'keeper' },
      { id: 'mine' },
    ])
      expect((await invite(wrong)).status).toBe(422)
    expect((await invite({ email: KEEPER.email })).status).toBe(422)
    expect((await keeper.post('/api/invitations/accept', { token: 'short', name: 'X', password: words })).status).toBe(422)
  })

  it('6.4.1, 11.5.1, 14.2.1: the secret has 256 bits, stands behind the #, is hashed at rest and seen once', async () => {
    const { body: made, status } = await invite()
    expect(status).toBe(201)
    const url = new URL(made.link)
    expect([url.origin, url.pathname, url.search]).toEqual([server.url, '/invitation', ''])
    expect(Buffer.from(tokenOf(made), 'base64url')).toHaveLength(32)
    expect(Date.parse(made.invitation.expiresAt) - Date.parse(made.invitation.createdAt)).toBe(WEEK)
    const stored = await inStore(server.dataDir, async ({ rows }) => JSON.stringify([await rows('SELECT * FROM links'), await rows('SELECT * FROM letters')]))
    expect(stored).not.toContain(tokenOf(made))
    expect(JSON.stringify((await keeper.get('/api/invitations')).body)).not.toContain(tokenOf(made))
    expect(server.logs()).not.toContain(tokenOf(made))
  })

  it('2.3.3: owes a letter for each, in the same step', async () => {
    const { body: made } = await invite()
    const letters = await inStore(server.dataDir, ({ rows }) =>
      rows<{ kind: string; to: string }>('SELECT kind, to_address AS "to" FROM letters WHERE link_id = :id', { id: made.invitation.id }),
    )
    expect(letters).toEqual([{ kind: 'invitation', to: made.invitation.email }])
  })

  it('6.4.1: is used once, by whoever is first of many', async () => {
    const token = tokenOf((await invite()).body)
    const tries = await Promise.all(Array.from({ length: 4 }, () => accept(token)))
    expect(tries.map(({ answer }) => answer.status).toSorted()).toEqual([201, 410, 410, 410])
    expect((await look(token)).status).toBe(410)
    expect((await accept(token)).answer.status).toBe(410)
    const winner = tries.find(({ answer }) => answer.status === 201)
    expect(winner?.answer.body.me).toMatchObject({ name: 'As I like it', email: `guest-${count}@harbour.example`, keeper: false, memberships: [] })
    expect((await winner?.browser.get('/api/me/sessions'))?.status).toBe(200)
  })

  it('6.4.1: runs out after a week', async () => {
    const made = (await invite()).body
    await inStore(server.dataDir, ({ run }) =>
      run('UPDATE links SET expires_at = :at WHERE id = :id', { id: made.invitation.id, at: new Date(Date.now() - 1).toISOString() }),
    )
    expect((await look(tokenOf(made))).status).toBe(410)
    expect((await accept(tokenOf(made))).answer.status).toBe(410)
  })

  it('no longer works once it is withdrawn, or once a newer one went to the same address', async () => {
    const first = (await invite()).body
    const email = first.invitation.email
    const second = (await invite({ email })).body
    expect((await accept(tokenOf(first))).answer.status).toBe(410)

    const listed = (await keeper.get<InvitationRow[]>('/api/invitations')).body.filter((one) => one.email === email)
    expect(listed.map(({ id }) => id)).toEqual([second.invitation.id])
    expect((await keeper.delete(`/api/invitations/${second.invitation.id}`)).status).toBe(200)
    expect((await accept(tokenOf(second))).answer.status).toBe(410)
    expect((await keeper.delete(`/api/invitations/${second.invitation.id}`)).status).toBe(404)
  })

  it('15.3.3: tells whom it is for and nothing else, and its reader chooses neither address nor powers', async () => {
    const made = (await invite()).body
    expect((await look(tokenOf(made))).body).toEqual({ kind: 'invitation', email: made.invitation.email, name: made.invitation.name })
    for (const more of [{ email: 'other@harbour.example' }, { keeper: true }, { role: 'supervisor' }])
      expect((await accept(tokenOf(made), more)).answer.status).toBe(422)
    expect((await accept(tokenOf(made))).answer.body.me).toMatchObject({ email: made.invitation.email, keeper: false })
  })

  it('7.2.4: accepting in a browser where somebody else is signed in ends that session', async () => {
    const { client } = await newColleague(keeper)
    const before = client.cookie
    const token = tokenOf((await invite()).body)
    expect((await client.post('/api/invitations/accept', { token, name: 'Next one', password: words })).status).toBe(201)
    expect((await anonymous(server.url, before).get('/api/me/sessions')).status).toBe(401)
    expect((await client.get<SessionAnswer>('/api/session')).body.me?.name).toBe('Next one')
  })

  describe('8.2.2: with a role in a production', () => {
    beforeAll(async () => {
      expect((await colleague.post('/api/productions', { slug: 'harbour-lights', title: 'Harbour Lights' })).status).toBe(404)
      const made = await keeper.post<Membership>('/api/productions', { slug: 'harbour-lights', title: 'Harbour Lights' })
      expect(made.body).toEqual({ production: 'harbour-lights', title: 'Harbour Lights', role: 'supervisor' })
    })

    it('gives that role, and tells the production', async () => {
      const made = (await invite({ production: 'harbour-lights', role: 'animator' })).body
      const { browser, answer } = await accept(tokenOf(made))
      expect(answer.body.me?.memberships).toEqual([{ production: 'harbour-lights', title: 'Harbour Lights', role: 'animator' }])
      expect((await browser.get<Membership[]>('/api/productions')).body).toEqual(answer.body.me?.memberships)
      const events = await inStore(server.dataDir, ({ rows }) => rows<{ kind: string }>('SELECT kind FROM events ORDER BY n'))
      expect(events.map(({ kind }) => kind)).toEqual(['member', 'member'])
    })

    it('is not there for a keeper who is no member, and forbidden to one who only looks on', async () => {
      const second = await newColleague(keeper, { keeper: true })
      const wanted = { email: 'late@harbour.example', name: 'Late', production: 'harbour-lights', role: 'supervisor' }
      const unknown = await second.client.post('/api/invitations', { ...wanted, production: 'no-such-film' })
      const hidden = await second.client.post('/api/invitations', wanted)
      expect([hidden.status, hidden.body]).toEqual([404, unknown.body])

      const third = await newColleague(keeper, { keeper: true, production: 'harbour-lights', role: 'guest' })
      expect((await third.client.post('/api/invitations', wanted)).status).toBe(403)
      const stored = await inStore(server.dataDir, ({ rows }) => rows("SELECT id FROM links WHERE email = 'late@harbour.example'"))
      expect(stored).toEqual([])
    })

    it('lets nobody in once its maker may not any more: an account, and no production', async () => {
      const leaving = await newColleague(keeper, { keeper: true, production: 'harbour-lights', role: 'coordinator' })
      const sent = await Promise.all(['in-time', 'demoted', 'left'].map((who) =>
        leaving.client.post<MadeLink>('/api/invitations', { email: `${who}@harbour.example`, name: who, production: 'harbour-lights', role: 'supervisor' }),
      ))
      const [inTime, demoted, left] = sent.map(({ body }) => tokenOf(body)) as [string, string, string]
      const member = `/api/productions/harbour-lights/members/${leaving.id}`
      expect((await accept(inTime)).answer.body.me?.memberships).toHaveLength(1)
      expect((await keeper.patch(member, { role: 'animator', version: 1 })).status).toBe(200)
      expect((await accept(demoted)).answer).toMatchObject({ status: 201, body: { me: { memberships: [] } } })
      expect((await keeper.delete(member)).status).toBe(204)
      expect((await accept(left)).answer).toMatchObject({ status: 201, body: { me: { memberships: [] } } })
    })

    it('a production’s short name is its own, and well-formed', async () => {
      expect((await keeper.post('/api/productions', { slug: 'harbour-lights', title: 'Again' })).status).toBe(422)
      for (const slug of ['Harbour', '-a', 'a b', '../x', 'x'.repeat(41), ''])
        expect((await keeper.post('/api/productions', { slug, title: 'Again' })).status).toBe(422)
      expect((await keeper.get<Membership[]>('/api/productions')).body).toHaveLength(1)
    })
  })
})
