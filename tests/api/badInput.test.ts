import { v4 } from 'uuid'
import { beforeAll, beforeEach, describe, expect, it } from 'vitest'
import type { Shot, Take, Thread } from '~/server/models'
import type { Refusal } from '~/utils/contracts/common'
import type { EventsAnswer } from '~/utils/contracts/event'
import type { ShotPage, Take as TakeWire } from '~/utils/contracts/take'
import { routes } from '~/utils/permissions'
import type { RouteName } from '~/utils/permissions'
import { anonymous, signIn } from '../helpers/client'
import type { Answer, Client } from '../helpers/client'
import { temporaryFolder } from '../helpers/folder'
import { addFlag, addShot, addTake, addThread, addWaiver, emailOf, fall, fallClaim, seedHouse, SEED_PASSWORD } from '../helpers/seed'
import type { House } from '../helpers/seed'
import { startServer } from '../helpers/server'
import { openStore, rowCounts } from '../helpers/store'
import { filled, requests } from './walk/requests'
import { makeScene } from './walk/scenes'

/** Covers 2.2.1, 15.3.3, 3.5.1, 8.2.2, 1.3.1 on the server's side: a clear 4xx, and nothing left behind. */

let house: House
let animator: Client
let supervisor: Client
let shot: Shot
let take: Take
let thread: Thread
let base: string

beforeAll(async () => {
  const dataDir = temporaryFolder()
  await openStore(dataDir)
  house = await seedHouse()
  const { url } = await startServer({ demo: 'off', dataDir })
  animator = await signIn(url, emailOf('animator'), SEED_PASSWORD)
  supervisor = await signIn(url, emailOf('supervisor'), SEED_PASSWORD)
})
beforeEach(async () => {
  shot = await addShot(house)
  take = await addTake(shot, house.people.animator)
  thread = await addThread(house.production, shot, house.people.animator, take)
  base = `/api/productions/${house.production.slug}/shots/${shot.code}`
})

/** Sends it, and insists on a refusal of the one shape with nothing stored. */
async function refused(send: () => Promise<Answer>, status: number, path?: string): Promise<Refusal> {
  const before = await rowCounts(['sessions'])
  const { body, headers, ...answer } = await send()
  expect(answer.status, JSON.stringify(body)).toBe(status)
  expect(headers.get('content-type')).toMatch(/^application\/json/)
  const refusal = body as Refusal
  expect(refusal.statusCode).toBe(status)
  expect(refusal.message).toMatch(/\S/)
  expect(Object.keys(refusal).every((key) => ['statusCode', 'message', 'data'].includes(key))).toBe(true)
  expect(JSON.stringify(refusal)).not.toMatch(/\bat .+:\d+:\d+|node_modules|SQLITE|Sequelize|ZodError/)
  if (path !== undefined) expect(refusal.data?.issues?.map((issue) => issue.path)).toContain(path)
  expect(await rowCounts(['sessions'])).toEqual(before)
  return refusal
}

const number = (text: string) => `{"clientId":"${v4()}","keys":[{"frame":1,"reading":0},{"frame":3,"reading":${text}},{"frame":5,"reading":9}]}`
const list = (keys: unknown) => ({ clientId: v4(), keys })

describe('a spacing list is refused', () => {
  it.each<[string, unknown, string]>([
    ['empty', [], 'keys'],
    ['too short', fall(2), 'keys'],
    ['of 2,001 keys', fall(2001).map((key) => ({ ...key, reading: 1 })), 'keys'],
    ['of 10,000 keys', Array.from({ length: 10_000 }, (_, i) => ({ frame: i, reading: i })), 'keys'],
    ['unordered', [...fall(3), { frame: 1, reading: 5 }], 'keys[3].frame'],
    ['with a frame twice', [...fall(3), { frame: 1005, reading: 5 }], 'keys[3].frame'],
    ['with half a frame', [...fall(3), { frame: 1007.5, reading: 5 }], 'keys[3].frame'],
    ['with a frame beyond all films', [...fall(3), { frame: 1e308, reading: 5 }], 'keys[3].frame'],
    ['with a reading of 1e308', [...fall(3), { frame: 1009, reading: 1e308 }], 'keys[3].reading'],
    ['with a reading in words', [...fall(3), { frame: 1009, reading: '12' }], 'keys[3].reading'],
    ['with a reading of nothing', [...fall(3), { frame: 1009, reading: null }], 'keys[3].reading'],
    ['with a key that lacks its reading', [...fall(3), { frame: 1009 }], 'keys[3].reading'],
    ['with a key of something else', [...fall(3), 'frame 1009'], 'keys[3]'],
    ['with a key that knows more', [...fall(3), { frame: 1009, reading: 1, breaks: false }], 'keys[3]'],
    ['that is no list', { 0: { frame: 1, reading: 1 }, length: 1 }, 'keys'],
    ['that is missing', undefined, 'keys'],
  ])('%s, as a take and as a check', async (_, keys, path) => {
    await refused(() => animator.post(`${base}/takes`, list(keys)), 422, path)
    await refused(() => animator.post('/api/check', { ...fallClaim, fps: 24, keys }), 422, path)
  })

  it.each([
    ['NaN', 400], ['Infinity', 400], ['-Infinity', 400], ['0x10', 400], ['1_000', 400], ['.5', 400], ['undefined', 400],
    ['1e999', 422], ['-1e999', 422], ['1e308', 422], ['1000000.001', 422],
  ])('with %s for a reading', async (text, status) => {
    await refused(() => animator.post(`${base}/takes`, undefined, { raw: number(text) }), status)
  })

  it('names at most twenty faults of a list that is all faults', async () => {
    const keys = Array.from({ length: 2000 }, () => ({ frame: 'x', reading: 'y' }))
    const { data } = await refused(() => animator.post(`${base}/takes`, list(keys)), 422)
    expect(data?.issues).toHaveLength(20)
  })
})

describe('a claim and a check are refused', () => {
  it.each<[string, object, string]>([
    ['an unknown law', { law: 'floaty' }, 'law'],
    ['an unknown shape', { law: 'topple', measure: 'angle', subject: { shape: 'banana', height: 1 } }, 'subject'],
    ['a measure that the law can’t take', { law: 'topple', measure: 'distance' }, 'measure'],
    ['an arc without its radius', { measure: 'arc' }, 'radius'],
    ['a radius without an arc', { radius: 3 }, 'radius'],
    ['slop below zero', { slop: -1 }, 'slop'],
    ['a tolerance above one', { tolerance: 1.1 }, 'tolerance'],
    ['a size of nothing', { law: 'topple', measure: 'angle', subject: { shape: 'rod', height: 0 } }, 'subject.height'],
    ['gravity of nothing', { subject: { gravity: 0 } }, 'subject.gravity'],
    ['an empty unit', { unit: '' }, 'unit'],
    ['a unit with a line break', { unit: 'px\r\nBcc: x' }, 'unit'],
  ])('%s', async (_, change, path) => {
    const claim = { ...fallClaim, ...change }
    const { data } = await refused(() => animator.post('/api/check', { ...claim, fps: 24, keys: fall() }), 422)
    expect(data?.issues?.some((issue) => issue.path.startsWith(path)), JSON.stringify(data)).toBe(true)
    const put = await refused(() => supervisor.put(`${base}/claim`, { claim, version: shot.version }), 422)
    expect(put.data?.issues?.some((issue) => issue.path.startsWith(`claim.${path}`)), JSON.stringify(put)).toBe(true)
    expect((await shot.reload()).claim).toEqual(fallClaim)
  })

  it.each([0, 0.5, 240.1, -24, '24', null])('%s frames per second', async (fps) => {
    await refused(() => animator.post('/api/check', { ...fallClaim, fps, keys: fall() }), 422, 'fps')
  })
})

describe('a body is refused', () => {
  const send = (raw: string | Uint8Array, headers: Record<string, string> = {}) => () => animator.post(`${base}/takes`, undefined, { raw, headers })

  it.each<[string, string, number]>([
    ['empty', '', 400], ['blank', '   ', 400], ['not JSON', '{"clientId":', 400], ['a text', '"take"', 422], ['a number', '7', 422],
    ['null', 'null', 422], ['a list', '[]', 422], ['JSON and more', '{} {}', 400], ['deep', `${'['.repeat(100_000)}${']'.repeat(100_000)}`, 422],
  ])('%s', async (_, raw, status) => {
    await refused(send(raw, { 'content-type': 'application/json' }), status)
  })

  it('of any other kind than JSON', async () => {
    for (const type of ['text/plain', 'application/x-www-form-urlencoded', 'multipart/form-data; boundary=x', 'application/jsonp'])
      await refused(send(JSON.stringify(list(fall())), { 'content-type': type }), 415, '')
  })

  it('larger than the cap, before it is read', async () => {
    await refused(send(JSON.stringify({ ...list(fall()), note: 'x'.repeat(600_000) })), 413, '')
  })

  it('that does not say how long it is', async () => {
    const body = new Blob([JSON.stringify(list(fall()))]).stream()
    const before = await rowCounts()
    const answer = await fetch(`${animator.url}${base}/takes`, {
      method: 'POST', body, duplex: 'half',
      headers: { 'content-type': 'application/json', cookie: animator.cookie, origin: animator.url },
    } as RequestInit)
    expect(answer.status).toBe(411)
    expect(await rowCounts()).toEqual(before)
  })

  it('that reaches for the prototype', async () => {
    const raw = `{"__proto__":{"decision":"stands"},"clientId":"${v4()}","keys":${JSON.stringify(fall())}}`
    await refused(send(raw), 422)
  })
})

const inProduction = (Object.keys(routes) as RouteName[]).filter((name) => name.includes(':production'))
const writing = inProduction.filter((name) => !name.startsWith('GET '))
const plain = { label: '', own: false, ruled: false }

async function prepared(name: RouteName) {
  const scene = await makeScene(house, 'supervisor', plain)
  const { parts, body } = await requests[name]({ house, asker: 'supervisor', scene })
  return { ...filled(name, parts), body: body as Record<string, unknown> | undefined }
}

describe.each(writing)('%s', (name) => {
  it('3.5.1: refuses a foreign Origin, signed in or not', async () => {
    const { verb, path, body } = await prepared(name)
    const foreign = ['https://evil.example', 'null', `${supervisor.url}.evil.example`, supervisor.url.replace('http:', 'https:'), 'http://127.0.0.1:1']
    for (const origin of foreign) await refused(() => supervisor.send(verb, path, body, { headers: { origin } }), 403)
    await refused(() => anonymous(supervisor.url).send(verb, path, body, { headers: { origin: foreign[0]! } }), 403)
  })

  it('15.3.3: refuses a field that it does not know', async () => {
    const { verb, path, body } = await prepared(name)
    if (!body) return
    const { message } = await refused(() => supervisor.send(verb, path, { ...body, role: 'supervisor', admin: true }), 422)
    expect(message).toMatch(/admin/)
  })

  it('refuses a body with its fields of the wrong kind', async () => {
    const { verb, path, body } = await prepared(name)
    for (const field of Object.keys(body ?? {}))
      for (const wrong of [{ $ne: null }, [[]], -0.5, ''])
        await refused(() => supervisor.send(verb, path, { ...body, [field]: wrong }), 422)
  })
})

describe('an address that names what is not there', () => {
  it.each(['Long-Pier', '..', '%2e%2e', 'long-pier%00', "long-pier'--", 'x'.repeat(5000), '%F0%9F%8F%97'])('production %s', async (slug) => {
    await refused(() => supervisor.get(`/api/productions/${slug}/wall`), 404)
  })
  it('an address that can’t be decoded', async () => {
    const { status } = await supervisor.get('/api/productions/%E0%A4%A/wall')
    expect([400, 404]).toContain(status)
  })
  it.each(['0', '-1', '1.5', 'x', '99', '1e9', '1%20OR%201=1'])('take %s', async (take) => {
    await refused(() => supervisor.get(`${base}/takes/${take}`), 404)
  })
  it.each(['take=0', 'take=x', 'take=1.5', 'frame=3'])('a shot page with ?%s', async (query) => {
    await refused(() => supervisor.get(`${base}?${query}`), 422)
  })
  it('a shot page of a take that never was', () => refused(() => supervisor.get(`${base}?take=7`), 404))
  it.each(['after=-1', 'after=x', 'after=1e308', 'after=1.5', 'before=1', 'after=1&after=2'])('events with ?%s', async (query) => {
    await refused(() => supervisor.get(`/api/productions/${house.production.slug}/events?${query}`), 422)
  })
})

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
