import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { Letter } from '~/server/models'
import { oweRulingLetters } from '~/server/services/letters'
import { joinHouse, rule, tellStory } from '../helpers/rulingStory'
import { startMailServer } from '../helpers/mail'
import type { MailServer } from '../helpers/mail'
import { startForgetfulServer, startMuteServer } from '../helpers/silentMail'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'

/** The worker is killed before and after a letter has left, and asked to stop while one is on its way. */

// Everything the worker waits for is counted in this: a lease lasts 8 s, a delivery 6 s.
const PACE = '4'
let server: TestServer
let mail: MailServer
let leave: (() => Promise<void>) | undefined

beforeAll(async () => {
  mail = await startMailServer()
  server = await startServer({ demo: 'off', env: { MAIL_URL: mail.url, NUXT_MAIL_PACE_SECONDS: PACE } })
  leave = await joinHouse(server)
})
afterAll(() => leave?.())

/** Owes `count` letters for one ruling, while the server is down or up. @returns their ids */
async function owe(count: number): Promise<string[]> {
  const others = Object.fromEntries(Array.from({ length: count - 1 }, (_, i) => [`cora${i}`, { role: 'coordinator' as const }]))
  const { take, people } = await tellStory(others)
  return rule(take, people.sam!, async (ruling) => {
    expect(await oweRulingLetters(ruling)).toBe(count)
    return (await Letter.findAll({ where: { rulingId: ruling.id } })).map(({ id }) => id)
  })
}
const lettersOf = (ids: string[]) => Letter.findAll({ where: { id: ids }, order: ['createdAt', 'id'] })
const receivedOf = (letters: Letter[]) => {
  const ids = letters.map(({ messageId }) => messageId)
  return mail.received.map(({ mail: { messageId } }) => messageId ?? '').filter((id) => ids.includes(id))
}

async function until(what: string, holds: () => boolean | Promise<boolean>, withinMs = 20_000): Promise<void> {
  const deadline = Date.now() + withinMs
  while (!(await holds())) {
    if (Date.now() > deadline) throw new Error(`Not within ${withinMs} ms: ${what}. The server printed:\n${server.logs().slice(-3000)}`)
    await new Promise((resolve) => setTimeout(resolve, 25))
  }
}
const allSent = async (ids: string[]) => (await lettersOf(ids)).every(({ state }) => state === 'sent')

describe('a worker that is killed', () => {
  it('before the letter has left sends it after the restart, once', async () => {
    const mute = await startMuteServer()
    await server.restart({ MAIL_URL: mute.url })
    const ids = await owe(1)
    await until('the mail server is called', () => mute.calls > 0)
    const [held] = await lettersOf(ids)
    expect(held).toMatchObject({ state: 'sending', attempts: 1 })
    await server.kill()
    await mute.stop()

    await server.restart({ MAIL_URL: mail.url })
    await until('the letter is sent', () => allSent(ids))
    const [sent] = await lettersOf(ids)
    expect(sent).toMatchObject({ state: 'sent', attempts: 2, leaseBy: null, leaseUntil: null, lastError: null })
    expect(receivedOf([sent!])).toEqual([sent!.messageId])
  }, 90_000)

  it('between the sending and the mark sends once more, under the same Message-ID', async () => {
    const forgetful = await startForgetfulServer()
    await server.restart({ MAIL_URL: forgetful.url })
    const ids = await owe(1)
    await until('the letter is taken', () => forgetful.taken.length > 0)
    await server.kill()
    const [held] = await lettersOf(ids)
    expect(held).toMatchObject({ state: 'sending', attempts: 1 })
    expect(forgetful.taken).toEqual([held!.messageId])
    await forgetful.stop()

    await server.restart({ MAIL_URL: mail.url })
    await until('the letter is sent', () => allSent(ids))
    const [sent] = await lettersOf(ids)
    expect(sent).toMatchObject({ state: 'sent', attempts: 2, messageId: held!.messageId })
    expect([...forgetful.taken, ...receivedOf([sent!])]).toEqual([sent!.messageId, sent!.messageId])
  }, 90_000)

  it('again and again, at any moment, loses none of twelve letters', async () => {
    await server.restart({ MAIL_URL: mail.url })
    const before = mail.received.length
    const ids = await owe(12)
    const kills = 3
    for (let kill = 1; kill <= kills; kill++) {
      // Somewhere in the middle of its work: each time a few letters further.
      await until('a few more letters came', () => mail.received.length >= before + kill * 2)
      await server.kill()
      await server.restart({ MAIL_URL: mail.url })
    }
    await until('all are sent', () => allSent(ids), 40_000)
    const letters = await lettersOf(ids)
    const received = receivedOf(letters)
    for (const { messageId } of letters) {
      const copies = received.filter((id) => id === messageId).length
      expect(copies, messageId).toBeGreaterThanOrEqual(1)
      expect(copies, messageId).toBeLessThanOrEqual(2)
    }
    // A kill falls into at most one delivery.
    expect(received.length).toBeLessThanOrEqual(12 + kills)
  }, 120_000)
})

describe('a server that is asked to stop', () => {
  it('ends in good order while a letter hangs, and sends it after the restart', async () => {
    const mute = await startMuteServer()
    await server.stop()
    const ids = await owe(1)
    await server.restart({ MAIL_URL: mute.url, NUXT_MAIL_PACE_SECONDS: '9' })
    await until('the mail server is called', () => mute.calls > 0)
    const ended = await server.stop()
    expect(ended).toMatchObject({ code: 0, forced: false })
    const [kept] = await lettersOf(ids)
    expect(kept).toMatchObject({ state: 'waiting', attempts: 1, leaseBy: null })
    expect(kept!.lastError).not.toBe('')
    await mute.stop()

    await server.restart({ MAIL_URL: mail.url, NUXT_MAIL_PACE_SECONDS: PACE })
    await until('the letter is sent', () => allSent(ids))
    expect(receivedOf(await lettersOf(ids))).toHaveLength(1)
  }, 90_000)

  it('finishes a letter that is being taken right now', async () => {
    await server.restart({ MAIL_URL: mail.url })
    const ids = await owe(5)
    const letters = await lettersOf(ids)
    await until('the first came', () => receivedOf(letters).length > 0)
    await server.stop()
    // Whatever was in hand is marked: nothing is left under a lease.
    for (const { state } of await lettersOf(ids)) expect(['waiting', 'sent']).toContain(state)
    await server.restart({ MAIL_URL: mail.url })
    await until('all are sent', () => allSent(ids))
    expect(receivedOf(await lettersOf(ids)).sort()).toEqual((await lettersOf(ids)).map(({ messageId }) => messageId).sort())
  }, 90_000)
})
