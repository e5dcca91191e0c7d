import { readdirSync, readFileSync, statSync } from 'node:fs'
import { join } from 'node:path'
import { simpleParser } from 'mailparser'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { v7 as uuid } from 'uuid'
import { Letter } from '~/server/models'
import { oweRulingLetters } from '~/server/services/letters'
import type { LettersAnswer } from '~/utils/contracts/letter'
import { anonymous } from '../helpers/client'
import type { Client } from '../helpers/client'
import { joinHouse, rule, tellStory } from '../helpers/rulingStory'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'

/** Without a mail server, and what a keeper sees of it. */

let server: TestServer
let keeper: Client
let leave: (() => Promise<void>) | undefined

beforeAll(async () => {
  server = await startServer({ demo: 'off', env: { NUXT_MAIL_PACE_SECONDS: '1' } })
  leave = await joinHouse(server)
  keeper = anonymous(server.url)
  await keeper.post('/api/first-keeper', { name: 'Kit Keeper', email: 'kit@board.example', password: 'quite a long password' })
})
afterAll(() => leave?.())

async function owe(readers: number): Promise<Letter[]> {
  const others = Object.fromEntries(Array.from({ length: readers - 1 }, (_, i) => [`cora${i}`, { role: 'coordinator' as const }]))
  const { take, people } = await tellStory(others)
  return rule(take, people.sam!, async (ruling) => {
    await oweRulingLetters(ruling)
    return Letter.findAll({ where: { rulingId: ruling.id } })
  })
}
async function untilSent(letters: Letter[]): Promise<void> {
  const deadline = Date.now() + 20_000
  for (const letter of letters)
    while ((await letter.reload()).state !== 'sent') {
      if (Date.now() > deadline) throw new Error(`Not sent: ${JSON.stringify(letter.get())}`)
      await new Promise((resolve) => setTimeout(resolve, 50))
    }
}

describe('without a mail server', () => {
  it('letters become whole .eml files that only the server can read', async () => {
    const letters = await owe(2)
    await untilSent(letters)
    const folder = join(server.dataDir, 'mail')
    expect(readdirSync(folder).filter((name) => name.endsWith('.part'))).toEqual([])
    for (const letter of letters) {
      const file = join(folder, `${letter.id}.eml`)
      const mail = await simpleParser(readFileSync(file))
      expect(mail.messageId).toBe(letter.messageId)
      expect(mail.subject).toBe('CLK-110 take 1 goes back')
      expect(mail.text).toContain(`${server.url}/p/`)
      expect(statSync(file).mode & 0o077).toBe(0)
    }
  })
})

describe('the mail room', () => {
  it('is nobody’s but a keeper’s', async () => {
    const [letter] = await owe(1)
    const stranger = anonymous(server.url)
    for (const [method, path] of [['GET', '/api/letters'], ['GET', `/api/letters/${letter!.id}`], ['POST', `/api/letters/${letter!.id}/send`]] as const) {
      expect((await stranger.send(method, path)).status, `${method} ${path}`).toBe(401)
    }
    const made = await keeper.post<{ link: string }>('/api/invitations', { name: 'Plain Person', email: 'plain@board.example' })
    const plain = anonymous(server.url)
    const token = made.body.link.split('#')[1]
    expect((await plain.post('/api/invitations/accept', { token, name: 'Plain Person', password: 'another long password' })).status).toBeLessThan(300)
    for (const [method, path] of [['GET', '/api/letters'], ['GET', `/api/letters/${letter!.id}`], ['POST', `/api/letters/${letter!.id}/send`]] as const) {
      expect((await plain.send(method, path)).status, `${method} ${path}`).toBe(404)
    }
  })

  it('refuses what it does not know, and another site', async () => {
    expect((await keeper.get('/api/letters?state=lost')).status).toBe(422)
    expect((await keeper.get('/api/letters?more=1')).status).toBe(422)
    expect((await keeper.get('/api/letters?after=x')).status).toBe(422)
    expect((await keeper.get(`/api/letters/${uuid()}`)).status).toBe(404)
    expect((await keeper.get('/api/letters/1')).status).toBe(404)
    expect((await keeper.post(`/api/letters/${uuid()}/send`)).status).toBe(404)
    const [letter] = await owe(1)
    await untilSent([letter!])
    const foreign = await keeper.post(`/api/letters/${letter!.id}/send`, undefined, { headers: { origin: 'https://evil.example' } })
    expect(foreign.status).toBe(403)
    expect((await letter!.reload()).state).toBe('sent')
  })

  it('lists listed fields only, newest first, by state, with counts and where letters go', async () => {
    const letters = await owe(2)
    await untilSent(letters)
    const { body } = await keeper.get<LettersAnswer>('/api/letters?state=sent')
    expect(Object.keys(body).sort()).toEqual(['carrier', 'counts', 'letters', 'more'])
    expect(Object.keys(body.letters[0]!).sort()).toEqual(
      ['attempts', 'createdAt', 'id', 'kind', 'lastError', 'nextAt', 'sentAt', 'state', 'subject', 'to', 'toName'],
    )
    const times = body.letters.map(({ createdAt }) => createdAt)
    expect(times).toEqual([...times].sort().reverse())
    expect(body.letters.every(({ state }) => state === 'sent')).toBe(true)
    expect(body.counts.sent).toBe(await Letter.count({ where: { state: 'sent' } }))
    expect(body.carrier).toContain('.eml')
    expect((await keeper.get<LettersAnswer>('/api/letters?state=parked')).body.letters).toEqual([])
  })

  it('pages through everything, each letter once', async () => {
    await untilSent(await owe(60))
    const all = await Letter.count()
    const seen: string[] = []
    let after = ''
    for (let page = 0; page < 20; page++) {
      const { body } = await keeper.get<LettersAnswer>(`/api/letters${after}`)
      seen.push(...body.letters.map(({ id }) => id))
      if (!body.more) break
      expect(body.letters).toHaveLength(50)
      after = `?after=${body.letters.at(-1)!.id}`
    }
    expect(seen).toHaveLength(all)
    expect(new Set(seen).size).toBe(all)
  }, 60_000)

  it('shows one letter and sends it again', async () => {
    const [letter] = await owe(1)
    await untilSent([letter!])
    const { body } = await keeper.get<Record<string, unknown>>(`/api/letters/${letter!.id}`)
    expect(Object.keys(body).sort()).toEqual(
      ['attempts', 'createdAt', 'html', 'id', 'kind', 'lastError', 'messageId', 'nextAt', 'sendable', 'sentAt', 'state', 'subject', 'text', 'to', 'toName'],
    )
    expect(body).toMatchObject({ html: letter!.html, text: letter!.text, sendable: true, state: 'sent' })
    const again = await keeper.post(`/api/letters/${letter!.id}/send`)
    expect(again.status).toBe(200)
    await untilSent([letter!])
    expect(letter!.attempts).toBe(1)
  })
})
