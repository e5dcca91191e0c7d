import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { Letter } from '~/server/models'
import { oweRulingLetters } from '~/server/services/letters'
import { flag, joinHouse, rule, talk, tellStory } from '../helpers/rulingStory'
import type { Story } from '../helpers/rulingStory'
import { anonymous } from '../helpers/client'
import type { Client } from '../helpers/client'
import { startMailServer } from '../helpers/mail'
import type { MailServer } from '../helpers/mail'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'

/** A real mail server that takes letters, answers 4xx and 5xx, hangs, and drops the line. */

// The first wait between tries is 5 s give or take a second, a silent line is given up after about 3 s: slow enough that a
// busy machine is not mistaken for a mail server in trouble.
const PACE = '5'
let server: TestServer
let mail: MailServer
let keeper: Client
let leave: (() => Promise<void>) | undefined

beforeAll(async () => {
  mail = await startMailServer()
  server = await startServer({
    demo: 'off',
    env: { MAIL_URL: mail.url, MAIL_FROM: 'Tiltyard <board@board.example>', NUXT_MAIL_PACE_SECONDS: PACE },
  })
  leave = await joinHouse(server)
  keeper = anonymous(server.url)
  await keeper.post('/api/first-keeper', { name: 'Kit Keeper', email: 'kit@board.example', password: 'quite a long password' })
})
afterAll(() => leave?.())

async function oweOne(prepare: (story: Story) => Promise<unknown> = async () => null): Promise<{ letter: Letter; story: Story }> {
  const story = await tellStory()
  await prepare(story)
  const id = await rule(story.take, story.people.sam!, async (ruling) => {
    await oweRulingLetters(ruling)
    return (await Letter.findOne({ where: { rulingId: ruling.id, personId: story.people.ana!.id }, rejectOnEmpty: true })).id
  }, 'goes-back', 'The settle is too even.\nSee frame 1003.')
  return { letter: await Letter.findByPk(id, { rejectOnEmpty: true }), story }
}
const copiesOf = ({ messageId }: Letter) => mail.received.filter((one) => one.mail.messageId === messageId)

async function until(letter: Letter, what: Partial<Letter>, withinMs = 20_000): Promise<void> {
  const deadline = Date.now() + withinMs
  for (;;) {
    await letter.reload()
    if (Object.entries(what).every(([key, value]) => letter.get(key) === value)) return
    if (Date.now() > deadline)
      throw new Error(`Not ${JSON.stringify(what)} but ${JSON.stringify(letter.get())}. The server printed:\n${server.logs().slice(-2000)}`)
    await new Promise((resolve) => setTimeout(resolve, 25))
  }
}

describe('letters through a mail server', () => {
  it('arrive whole: address, subject, both parts, links, headers', async () => {
    mail.mode = 'accept'
    const { letter, story } = await oweOne(async ({ take, shot, people }) => {
      await flag(take, people.sam!, 1003, 1003, 'Move <it> back.')
      await talk(shot, take, [people.ana!])
    })
    await until(letter, { state: 'sent' })
    const [copy] = copiesOf(letter)
    expect(copy).toMatchObject({ from: 'board@board.example', to: [story.people.ana!.email] })
    expect(copy!.mail.subject).toBe('CLK-110 take 1 goes back')
    const link = `${server.url}/p/${story.production.slug}/shots/CLK-110?take=1&frame=1003`
    expect(copy!.mail.text).toContain(link)
    expect(copy!.mail.text).toContain('The settle is too even.\nSee frame 1003.')
    expect(copy!.mail.html).toContain(`href="${link.replace('&', '&amp;')}"`)
    expect(copy!.mail.html).toContain('Move &lt;it&gt; back.')
    expect(copy!.mail.inReplyTo).toBe(letter.threadMessageId)
    expect(copy!.mail.headers.get('auto-submitted')).toBe('auto-generated')
    expect(letter).toMatchObject({ attempts: 1, lastError: null, nextAt: null })
  })

  it('thread together by shot', async () => {
    mail.mode = 'accept'
    const first = await oweOne()
    const second = await oweOne()
    await until(first.letter, { state: 'sent' })
    await until(second.letter, { state: 'sent' })
    const referenceOf = (letter: Letter) => copiesOf(letter)[0]!.mail.references
    expect(referenceOf(first.letter)).toBe(`<shot.${first.story.shot.id}@board.example>`)
    expect(referenceOf(second.letter)).not.toBe(referenceOf(first.letter))
  })

  it('wait after a 4xx answer and go through at the next try', async () => {
    mail.mode = '4xx'
    const { letter } = await oweOne()
    await until(letter, { state: 'waiting', attempts: 1 })
    expect(letter.lastError).toMatch(/^451 .*Try again later/)
    const wait = Date.parse(letter.nextAt!) - Date.now()
    expect(wait).toBeGreaterThan(2_000)
    expect(wait).toBeLessThanOrEqual(6_000)
    mail.mode = 'accept'
    await until(letter, { state: 'sent' })
    expect(letter.attempts).toBe(2)
    expect(copiesOf(letter)).toHaveLength(1)
  })

  it('are parked at once by a 5xx answer, in the server’s own words, until a keeper sends them again', async () => {
    mail.mode = '5xx'
    const { letter } = await oweOne()
    await until(letter, { state: 'parked' })
    expect(letter).toMatchObject({ attempts: 1, nextAt: null, leaseUntil: null })
    expect(letter.lastError).toMatch(/^554 .*No such person here/)
    mail.mode = 'accept'
    // Longer than the first wait would have been.
    await new Promise((resolve) => setTimeout(resolve, 6_500))
    expect(copiesOf(letter)).toHaveLength(0)
    const answer = await keeper.post(`/api/letters/${letter.id}/send`)
    expect(answer.status).toBe(200)
    expect(answer.body).toMatchObject({ state: 'waiting', attempts: 0 })
    await until(letter, { state: 'sent' }, 5_000)
    expect(copiesOf(letter)).toHaveLength(1)
  })

  it('wait when the server hangs, and nothing else waits for long behind them', async () => {
    mail.mode = 'hang'
    const { letter } = await oweOne()
    await until(letter, { state: 'waiting', attempts: 1 })
    expect(letter.lastError).toBeTruthy()
    mail.mode = 'accept'
    const { letter: next } = await oweOne()
    await until(next, { state: 'sent' }, 10_000)
    await until(letter, { state: 'sent' })
    expect(copiesOf(letter)).toHaveLength(1)
  })

  it('wait when the line drops', async () => {
    mail.mode = 'drop'
    const { letter } = await oweOne()
    await until(letter, { state: 'waiting', attempts: 1 })
    expect(letter.lastError).toBeTruthy()
    mail.mode = 'accept'
    await until(letter, { state: 'sent' })
    expect(copiesOf(letter)).toHaveLength(1)
  })

  it('may come twice, never not at all, when the line drops before the yes', async () => {
    mail.mode = 'accept-then-drop'
    const { letter } = await oweOne()
    await until(letter, { state: 'waiting', attempts: 1 })
    expect(copiesOf(letter)).toHaveLength(1)
    mail.mode = 'accept'
    await until(letter, { state: 'sent' })
    expect(copiesOf(letter)).toHaveLength(2)
  })

  it('wait while nobody listens at the address', async () => {
    mail.mode = 'accept'
    const { letter } = await oweOne()
    await until(letter, { state: 'sent' })
    await server.restart({ MAIL_URL: 'smtp://127.0.0.1:9' })
    const { letter: unlucky } = await oweOne()
    await until(unlucky, { state: 'waiting', attempts: 1 })
    expect(unlucky.lastError).toMatch(/ECONNREFUSED|refused/i)
    await server.restart({ MAIL_URL: mail.url })
    await until(unlucky, { state: 'sent' })
    expect(copiesOf(unlucky)).toHaveLength(1)
  }, 90_000)

  it('are dropped when their reader has meanwhile left', async () => {
    mail.mode = '4xx'
    const { letter, story } = await oweOne()
    await until(letter, { state: 'waiting', attempts: 1 })
    await story.people.ana!.update({ mailWish: 'none' })
    mail.mode = 'accept'
    await until(letter, { state: 'dropped' })
    expect(letter.lastError).toBe('Does not want this letter any more.')
    expect(copiesOf(letter)).toHaveLength(0)
  })

  it('carry an invitation’s link to its reader and nowhere else', async () => {
    mail.mode = 'accept'
    const made = await keeper.post<{ link: string; invitation: { id: string } }>('/api/invitations', { name: 'New One', email: 'new.one@board.example' })
    expect(made.status).toBe(201)
    const letter = await Letter.findOne({ where: { linkId: made.body.invitation.id }, rejectOnEmpty: true })
    await until(letter, { state: 'sent', sealedLink: null })
    const [copy] = copiesOf(letter)
    expect(copy!.to).toEqual(['new.one@board.example'])
    expect(copy!.mail.text).toContain(made.body.link)
    const shown = await keeper.get(`/api/letters/${letter.id}`)
    expect(shown.status).toBe(200)
    const secret = made.body.link.split('#')[1]!
    expect(secret.length).toBeGreaterThan(20)
    expect(JSON.stringify(shown.body)).not.toContain(secret)
    expect(JSON.stringify(letter.get())).not.toContain(secret)
    expect(server.logs()).not.toContain(secret)
  })
})
