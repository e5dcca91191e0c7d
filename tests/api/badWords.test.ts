import { v4 } from 'uuid'
import { beforeAll, beforeEach, describe, expect, it } from 'vitest'
import type { Shot, Take, Thread } from '~/server/models'
import type { EventsAnswer } from '~/utils/contracts/event'
import type { ShotPage, Take as TakeWire } from '~/utils/contracts/take'
import type { Answer, Client } from '../helpers/client'
import { openPier } from '../helpers/pier'
import { refused } from '../helpers/refused'
import { addFlag, addShot, addTake, addThread, addWaiver, fall } from '../helpers/seed'
import type { House } from '../helpers/seed'

/** Covers 8.2.2, 1.3.1 on the server’s side: ids and words that are somebody else’s, or not what they look like. */

let house: House
let animator: Client
let supervisor: Client
let shot: Shot
let take: Take
let thread: Thread
let base: string

beforeAll(async () => {
  const pier = await openPier(['animator', 'supervisor'])
  house = pier.house
  ;({ animator, supervisor } = pier.as)
})
beforeEach(async () => {
  shot = await addShot(house)
  take = await addTake(shot, house.people.animator)
  thread = await addThread(house.production, shot, house.people.animator, take)
  base = `/api/productions/${house.production.slug}/shots/${shot.code}`
})

const list = (keys: unknown) => ({ clientId: v4(), keys })

describe('somebody else’s ids', () => {
  it('8.2.2: a thread, flag or waiver of another shot or take is not here', async () => {
    const other = await addShot(house)
    const otherTake = await addTake(other, house.people.animator)
    const otherThread = await addThread(house.production, other, house.people.supervisor)
    const flag = await addFlag(otherTake, house.people.supervisor)
    const waiver = await addWaiver(otherTake, house.people.supervisor)
    await refused(() => supervisor.post(`${base}/threads/${otherThread.id}/comments`, { clientId: v4(), body: 'x' }), 404)
    await refused(() => supervisor.patch(`${base}/threads/${otherThread.id}`, { settled: true }), 404)
    await refused(() => supervisor.delete(`${base}/takes/1/flags/${flag.id}`), 404)
    await refused(() => supervisor.delete(`${base}/takes/1/waivers/${waiver.id}`), 404)
    expect((await flag.reload()).liftedAt).toBeNull()
  })

  it('8.2.2: a shot of another production is not here, and that production is not there', async () => {
    const far = `/api/productions/${house.elsewhere.slug}`
    await refused(() => supervisor.get(far), 404)
    await refused(() => supervisor.get(`${far}/shots/${shot.code}`), 404)
    await refused(() => supervisor.post(`${far}/shots/${shot.code}/takes`, list(fall())), 404)
  })

  it('a stranger, a guest or a person who never was can’t be given a shot', async () => {
    const { outsider, guest, coordinator, animator: ana } = house.people
    for (const id of [outsider.id, guest.id, coordinator.id, v4()])
      await refused(() => supervisor.patch(base, { animator: id, version: 1 }), 422, 'animator')
    for (const id of [outsider.id, guest.id, coordinator.id, ana.id, v4()])
      await refused(() => supervisor.patch(base, { supervisor: id, version: 1 }), 422, 'supervisor')
    await refused(() => supervisor.patch(base, { sequence: 'FAR', version: 1 }), 422, 'sequence')
  })

  it('a member who is none is not found, whoever they are elsewhere', async () => {
    const members = `/api/productions/${house.production.slug}/members`
    await refused(() => supervisor.patch(`${members}/${house.people.outsider.id}`, { role: 'guest', version: 1 }), 404)
    await refused(() => supervisor.delete(`${members}/${house.people.outsider.id}`), 404)
    await refused(() => supervisor.post(members, { email: 'no.account@pier.example', role: 'guest' }), 422, 'email')
  })

  it('an id that another person made first is no key to their words', async () => {
    const clientId = v4()
    const mine = await animator.post(`${base}/threads/${thread.id}/comments`, { clientId, body: 'Mine.' })
    const theirs = await supervisor.post(`${base}/threads/${thread.id}/comments`, { clientId, body: 'Theirs.' })
    expect([mine.status, theirs.status]).toEqual([201, 201])
    expect(theirs.body).toMatchObject({ body: 'Theirs.', by: { id: house.people.supervisor.id } })
  })

  it('one’s own id can’t stand for two things', async () => {
    const other = await addShot(house)
    const elsewhere = `/api/productions/${house.production.slug}/shots/${other.code}`
    const body = list(fall())
    expect((await animator.post(`${base}/takes`, body)).status).toBe(201)
    await refused(() => animator.post(`${elsewhere}/takes`, body), 409)
    const opening = { clientId: v4(), fromFrame: 1001, toFrame: 1001, comment: { clientId: v4(), body: 'x' } }
    expect((await animator.post(`${base}/threads`, opening)).status).toBe(201)
    await refused(() => animator.post(`${elsewhere}/threads`, opening), 409)
    await refused(() => animator.post(`${base}/threads`, { ...opening, clientId: v4() }), 409)
    await refused(() => animator.post(`${base}/threads/${thread.id}/comments`, opening.comment), 409)
  })
})

const attacks = [
  '<script>alert(1)</script>',
  '"><img src=x onerror=alert(1)>',
  "' onmouseover='alert(1)",
  '<svg/onload=alert(1)>',
  '[x](javascript:alert(1)) ![y](https://evil.example/p.png)',
  '<a href="jav&#x09;ascript:alert(1)">x</a>',
  '&lt;script&gt; &amp;amp;',
  '{{constructor.constructor("alert(1)")()}} ${7*7}',
  "'; DROP TABLE takes; -- :id $id ?",
  '=HYPERLINK("https://evil.example")',
  '</textarea></title></style>',
  'שלום ‮abc‬ 王小明 👩‍👩‍👧‍👦 ﷽',
]

describe('1.3.1: words are kept as they were written and come back as they were', () => {
  it.each(attacks)('%s', async (text) => {
    const isJson = (answer: Answer) => {
      expect(answer.headers.get('content-type')).toMatch(/^application\/json/)
      expect(answer.headers.get('x-content-type-options')).toBe('nosniff')
      return answer
    }
    const many = `${text}\n\n* one\n* two`
    // A line takes no marks that turn what stands after it; prose keeps them.
    const inOneLine = text.replace(/[\u202C\u202E]/g, '')
    const page = async () => isJson(await supervisor.get<ShotPage>(base)).body as ShotPage

    expect((await supervisor.patch(base, { title: inOneLine, brief: many, version: 1 })).status).toBe(200)
    expect((await supervisor.post(`${base}/takes/1/flags`, { clientId: v4(), fromFrame: 1001, toFrame: 1003, reason: many })).status).toBe(201)
    expect((await supervisor.post(`${base}/takes/1/waivers`, { clientId: v4(), finding: { kind: 'misplaced', frames: [1015] }, reason: many })).status).toBe(201)
    expect((await animator.post(`${base}/threads/${thread.id}/comments`, { clientId: v4(), body: many })).status).toBe(201)
    expect((await animator.post(`${base}/takes`, { ...list(fall()), note: many })).status).toBe(201)
    expect((await supervisor.post(`${base}/takes/2/rulings`, { clientId: v4(), decision: 'stands', note: many, version: (await page()).version })).status).toBe(201)
    expect((await supervisor.post(`${base}/reopen`, { reason: many, version: (await page()).version })).status).toBe(200)

    const { title, brief, takes, threads } = await page()
    expect({ title, brief }).toEqual({ title: inOneLine, brief: many })
    expect(takes[1]).toMatchObject({ note: many, ruling: { note: many, reopened: { reason: many } } })
    expect(threads[0]?.comments.at(-1)?.body).toBe(many)
    const first = isJson(await supervisor.get<TakeWire>(`${base}/takes/1`)).body as TakeWire
    expect(first.flags[0]?.reason).toBe(many)
    expect(first.waivers[0]?.reason).toBe(many)
    const { events } = isJson(await supervisor.get(`/api/productions/${house.production.slug}/events?after=0`)).body as EventsAnswer
    expect(events.some(({ comment }) => comment?.body === many)).toBe(true)
  })

  it('1.3.11: control characters and line breaks can’t enter a line, control characters no prose', async () => {
    for (const title of ['a\r\nBcc: x@evil.example', 'a\nb', 'a\u0000b', 'a\u2028b', '\u001b[2J', 'a\u202eb', '\u2067a', 'a\ud83d', '\u200b'])
      await refused(() => supervisor.patch(base, { title, version: 1 }), 422, 'title')
    for (const body of ['a\u0000b', '\u0007', 'a\u009bb', '', '   ', 'a\udc00', '\u2060'])
      await refused(() => animator.post(`${base}/threads/${thread.id}/comments`, { clientId: v4(), body }), 422, 'body')
    await refused(() => animator.post(`${base}/threads/${thread.id}/comments`, { clientId: v4(), body: 'x'.repeat(4001) }), 422, 'body')
  })
})

describe('flags, waivers and threads are pinned to what is there', () => {
  const flag = (fromFrame: number, toFrame: number, finding?: object) => ({ clientId: v4(), fromFrame, toFrame, reason: 'x', finding })
  it('frames outside of the list, or the wrong way round', async () => {
    await refused(() => supervisor.post(`${base}/takes/1/flags`, flag(1000, 1003)), 422, 'fromFrame')
    await refused(() => supervisor.post(`${base}/takes/1/flags`, flag(1001, 1024)), 422, 'toFrame')
    await refused(() => supervisor.post(`${base}/takes/1/flags`, flag(1009, 1003)), 422, 'toFrame')
  })
  it('a finding that the judge did not make', async () => {
    for (const finding of [{ kind: 'misplaced', frames: [1001] }, { kind: 'held', frames: [1015] }, { kind: 'misplaced', frames: [] }]) {
      await refused(() => supervisor.post(`${base}/takes/1/flags`, flag(1001, 1003, finding)), 422, 'finding')
      await refused(() => supervisor.post(`${base}/takes/1/waivers`, { clientId: v4(), finding, reason: 'x' }), 422, 'finding')
    }
  })
  it('a thread on no take, no frames, half a run, or a take that never was', async () => {
    const thread = (pin: object) => ({ clientId: v4(), ...pin, comment: { clientId: v4(), body: 'x' } })
    await refused(() => animator.post(`${base}/threads`, thread({})), 422, 'take')
    await refused(() => animator.post(`${base}/threads`, thread({ take: 2 })), 422, 'take')
    await refused(() => animator.post(`${base}/threads`, thread({ fromFrame: 1001 })), 422, 'toFrame')
    await refused(() => animator.post(`${base}/threads`, thread({ fromFrame: 1009, toFrame: 1001 })), 422, 'toFrame')
    await refused(() => animator.post(`${base}/threads`, thread({ fromFrame: 5, toFrame: 6 })), 422, 'fromFrame')
  })
})
