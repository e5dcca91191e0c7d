import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { v7 as uuid } from 'uuid'
import { Letter, Link, Membership } from '~/server/models'
import { run, write } from '~/server/models/database'
import { oweLinkLetter, oweRulingLetters } from '~/server/services/letters'
import type { Carrier } from '~/server/services/letters/carriers'
import { deliver, outcomeOf } from '~/server/services/letters/deliver'
import { sendAgain, showLetter } from '~/server/services/letters/mailRoom'
import { MOST_ATTEMPTS, paceOf } from '~/server/services/letters/pace'
import { claimLetter, nextDue, settleLetter } from '~/server/services/letters/queue'
import { openHouse, rule, SECRET, tellStory } from '../../helpers/rulingStory'
import type { Story } from '../../helpers/rulingStory'

const pace = paceOf(30)
const never = new AbortController().signal
let close: () => Promise<void>
let story: Story
beforeAll(async () => {
  close = await openHouse()
})
afterAll(() => close())
beforeEach(() => run('DELETE FROM letters'))

async function oweOne(): Promise<Letter> {
  story = await tellStory()
  const ruling = await rule(story.take, story.people.sam!, async (made) => {
    expect(await oweRulingLetters(made)).toBe(1)
    return made
  })
  return Letter.findOne({ where: { rulingId: ruling.id }, rejectOnEmpty: true })
}

/** A carrier that keeps what it takes, or throws `problem`. */
function recording(problem?: unknown) {
  const taken: Parameters<Carrier['carry']>[1][] = []
  const carrier: Carrier = {
    place: 'a list',
    carry: async (_id, message) => {
      if (problem) throw problem
      taken.push(message)
    },
  }
  return { taken, means: { carrier, from: 'Tiltyard <board@board.example>', baseUrl: 'https://board.example', sessionSecret: SECRET, signal: never } }
}

describe('claiming', () => {
  it('gives a letter to one of many who ask at once', async () => {
    const letter = await oweOne()
    const claims = await Promise.all(Array.from({ length: 10 }, () => claimLetter(pace)))
    const got = claims.filter((claim) => claim !== null)
    expect(got.map(({ id, state, attempts }) => ({ id, state, attempts }))).toEqual([{ id: letter.id, state: 'sending', attempts: 1 }])
  })

  it('takes no letter before its time', async () => {
    const letter = await oweOne()
    const later = Date.now() + 60_000
    await letter.update({ nextAt: new Date(later).toISOString() })
    expect(await claimLetter(pace)).toBeNull()
    expect(await nextDue()).toBe(later)
    expect((await claimLetter(pace, later))?.id).toBe(letter.id)
  })

  it('takes a letter back once its lease has run out, and the late word of the first no longer counts', async () => {
    await oweOne()
    const start = Date.now()
    const first = (await claimLetter(pace, start))!
    expect(await claimLetter(pace, start + pace.lease - 1)).toBeNull()
    const second = (await claimLetter(pace, start + pace.lease))!
    expect(second).toMatchObject({ id: first.id, messageId: first.messageId, attempts: 2 })
    expect(await settleLetter(first, { state: 'parked', why: 'too late' }, pace)).toBeNull()
    expect(await settleLetter(second, { state: 'sent' }, pace)).toBe('sent')
    expect(await Letter.findByPk(first.id)).toMatchObject({ state: 'sent', lastError: null, leaseBy: null, leaseUntil: null })
    expect(await nextDue()).toBeNull()
  })
})

describe('settling', () => {
  it('keeps a letter that may go later, with the reason and a growing wait', async () => {
    const { id } = await oweOne()
    let now = Date.now()
    let before = 0
    for (let attempt = 1; attempt < MOST_ATTEMPTS; attempt++) {
      const claimed = (await claimLetter(pace, now))!
      expect(claimed.attempts).toBe(attempt)
      expect(await settleLetter(claimed, { state: 'waiting', why: '451 later' }, pace, now)).toBe('waiting')
      const stored = (await Letter.findByPk(id))!
      const wait = Date.parse(stored.nextAt!) - now
      expect(stored.lastError).toBe('451 later')
      if (attempt <= 6) expect(wait).toBeGreaterThan(before)
      before = wait
      now += wait
    }
    const last = (await claimLetter(pace, now))!
    expect(await settleLetter(last, { state: 'waiting', why: '451 later' }, pace, now)).toBe('parked')
    expect((await Letter.findByPk(id))!.lastError).toBe('Given up after 8 tries. 451 later')
    expect(await claimLetter(pace, now + 10 * 24 * 3600 * 1000)).toBeNull()
  })
})

describe('an answer of the mail server', () => {
  it.each([
    [Object.assign(new Error('Message failed'), { responseCode: 554, response: '554 5.7.1 No such person here' }), 'parked', '554 5.7.1 No such person here'],
    [Object.assign(new Error('x'), { responseCode: 500, response: '500 No' }), 'parked', '500 No'],
    // A wrong mail password must not park every letter that is owed: RFC 4954, section 6.
    [Object.assign(new Error('Invalid login'), { responseCode: 535, response: '535 5.7.8 Authentication failed' }), 'waiting', '535 5.7.8 Authentication failed'],
    [Object.assign(new Error('x'), { responseCode: 451, response: '451 4.3.0 Try\r\nagain' }), 'waiting', '451 4.3.0 Try again'],
    [Object.assign(new Error('Connection closed unexpectedly'), { code: 'ECONNECTION' }), 'waiting', 'Connection closed unexpectedly'],
    [Object.assign(new Error('Timeout'), { code: 'ETIMEDOUT' }), 'waiting', 'Timeout'],
    ['odd', 'waiting', 'odd'],
    [null, 'waiting', 'null'],
    [undefined, 'waiting', 'undefined'],
  ])('%o is %s', (problem, state, why) => expect(outcomeOf(problem)).toEqual({ state, why }))
})

describe('right before sending', () => {
  it('a letter goes to the address and name that the account has now', async () => {
    const letter = await oweOne()
    await story.people.ana!.update({ email: `moved.${uuid()}@board.example`, name: 'Ana Moved' })
    const { taken, means } = recording()
    expect(await deliver(letter, means)).toEqual({ state: 'sent' })
    expect(taken.map(({ to, subject }) => ({ to, subject }))).toEqual([
      { to: { name: 'Ana Moved', address: story.people.ana!.email }, subject: 'CLK-110 take 1 goes back' },
    ])
  })

  it.each([
    ['the account is disabled', () => story.people.ana!.update({ disabledAt: new Date().toISOString() }), 'The account is disabled.'],
    ['the membership ended', () => Membership.destroy({ where: { personId: story.people.ana!.id } }), 'No longer a member of Quayside Giants.'],
    ['no letters are wanted any more', () => story.people.ana!.update({ mailWish: 'none' }), 'Does not want this letter any more.'],
    ['the address is none', () => run('UPDATE people SET email = :email WHERE id = :id', { email: `a@b, ${uuid()}@d`, id: story.people.ana!.id }), 'The address is not a mail address.'],
  ])('it is dropped when %s', async (_what, change, why) => {
    const letter = await oweOne()
    await change()
    const { taken, means } = recording()
    expect(await deliver(letter, means)).toEqual({ state: 'dropped', why })
    expect(taken).toEqual([])
  })

  it('who wants own takes only still gets the letter on an own take', async () => {
    const letter = await oweOne()
    await story.people.ana!.update({ mailWish: 'own-takes' })
    expect(await deliver(letter, recording().means)).toEqual({ state: 'sent' })
  })
})

describe('a letter with a one-use link', () => {
  const url = 'https://board.example/invitation#secret-of-the-link'
  async function oweLink(expiresAt = new Date(Date.now() + 3_600_000).toISOString()): Promise<Letter> {
    const link = await Link.create({
      id: uuid(), kind: 'invitation', tokenHash: uuid(), email: 'new@board.example', name: 'New One', createdAt: new Date().toISOString(), expiresAt,
    })
    await write(() => oweLinkLetter({ linkId: link.id, kind: 'invitation', toAddress: link.email, toName: link.name, personId: null, url }))
    return Letter.findOne({ where: { linkId: link.id }, rejectOnEmpty: true })
  }

  it('lies sealed in the outbox, carries the link when sent, and holds it no longer afterwards', async () => {
    const stored = await oweLink()
    expect(JSON.stringify(stored)).not.toContain('secret-of-the-link')
    const claimed = (await claimLetter(pace))!
    const { taken, means } = recording()
    const outcome = await deliver(claimed, means)
    expect(taken[0]!.text).toContain(url)
    expect(taken[0]!.html).toContain(`href="${url}"`)
    await settleLetter(claimed, outcome, pace)
    expect(await Letter.findByPk(stored.id)).toMatchObject({ state: 'sent', sealedLink: null })
    expect(await showLetter(stored.id)).toMatchObject({ sendable: false })
    expect(JSON.stringify(await showLetter(stored.id))).not.toMatch(/secret-of-the-link|sealed/)
    await expect(sendAgain(stored.id)).rejects.toMatchObject({ statusCode: 409 })
  })

  it('keeps the link while it waits for another try, and loses it when parked', async () => {
    const stored = await oweLink()
    const claimed = (await claimLetter(pace))!
    await settleLetter(claimed, { state: 'waiting', why: '451' }, pace)
    expect((await Letter.findByPk(stored.id))!.sealedLink).not.toBeNull()
    const again = (await claimLetter(pace, Date.now() + 60_000))!
    await settleLetter(again, { state: 'parked', why: '554' }, pace)
    expect((await Letter.findByPk(stored.id))!.sealedLink).toBeNull()
  })

  it.each([
    ['used', { usedAt: '2026-01-01T00:00:00.000Z' }, 'The link has been used.'],
    ['run out', { expiresAt: '2026-01-01T00:00:00.000Z' }, 'The link has run out.'],
  ])('is dropped when the link has %s', async (_what, change, why) => {
    const letter = await oweLink()
    await Link.update(change, { where: { id: letter.linkId! } })
    const { taken, means } = recording()
    expect(await deliver(letter, means)).toEqual({ state: 'dropped', why })
    expect(taken).toEqual([])
  })

  it('is parked when the session secret has changed', async () => {
    const letter = await oweLink()
    const { taken, means } = recording()
    const outcome = await deliver(letter, { ...means, sessionSecret: 'quite another secret, just as long' })
    expect(outcome).toMatchObject({ state: 'parked' })
    expect(taken).toEqual([])
  })
})

describe('sending again', () => {
  it('starts a parked letter over under the same Message-ID', async () => {
    const letter = await oweOne()
    const claimed = (await claimLetter(pace))!
    await settleLetter(claimed, { state: 'parked', why: '554 no' }, pace)
    const answer = await write(() => sendAgain(letter.id))
    expect(answer).toMatchObject({ state: 'waiting', attempts: 0, lastError: null, messageId: letter.messageId, sendable: true })
    expect((await claimLetter(pace))?.id).toBe(letter.id)
  })

  it('brings a waiting letter forward and keeps count of its tries', async () => {
    const letter = await oweOne()
    await settleLetter((await claimLetter(pace))!, { state: 'waiting', why: '451' }, pace)
    expect(await claimLetter(pace)).toBeNull()
    expect(await write(() => sendAgain(letter.id))).toMatchObject({ state: 'waiting', attempts: 1, lastError: '451' })
    expect((await claimLetter(pace))?.attempts).toBe(2)
  })

  it('leaves a letter alone that is on its way', async () => {
    const letter = await oweOne()
    await claimLetter(pace)
    await expect(write(() => sendAgain(letter.id))).rejects.toMatchObject({ statusCode: 409 })
    await expect(sendAgain(uuid())).rejects.toMatchObject({ statusCode: 404 })
  })
})
