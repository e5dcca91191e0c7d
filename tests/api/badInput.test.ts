import { v4 } from 'uuid'
import { beforeAll, beforeEach, describe, expect, it } from 'vitest'
import type { Shot } from '~/server/models'
import { routes } from '~/utils/permissions'
import type { RouteName } from '~/utils/permissions'
import { anonymous } from '../helpers/client'
import type { Client } from '../helpers/client'
import { openPier } from '../helpers/pier'
import { refused } from '../helpers/refused'
import { addShot, addTake, fall, fallClaim } from '../helpers/seed'
import type { House } from '../helpers/seed'
import { rowCounts } from '../helpers/store'
import { filled, requests } from './walk/requests'
import { makeScene } from './walk/scenes'

/** Covers 2.2.1, 15.3.3, 3.5.1 on the server’s side: a clear 4xx, and nothing left behind. */

let house: House
let animator: Client
let supervisor: Client
let shot: Shot
let base: string

beforeAll(async () => {
  const pier = await openPier(['animator', 'supervisor'])
  house = pier.house
  ;({ animator, supervisor } = pier.as)
})
beforeEach(async () => {
  shot = await addShot(house)
  await addTake(shot, house.people.animator)
  base = `/api/productions/${house.production.slug}/shots/${shot.code}`
})


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
    ['an unknown measure', { measure: 'smell' }, 'measure'],
    ['a path under readings', { path: 'circle' }, 'path'],
    ['a pivot under readings', { pivot: { x: 1, y: 2 } }, 'pivot'],
    ['a radius under points', { measure: 'point', radius: 3 }, 'radius'],
    ['a path that is none', { measure: 'point', path: 'spiral' }, 'path'],
    ['half a pivot', { measure: 'point', pivot: { x: 1 } }, 'pivot.y'],
    ['a flight of readings', { law: 'flight' }, 'measure'],
    ['one span', { spans: [{ from: 1001, to: 1023, law: 'odd-rule' }] }, 'spans'],
    ['five spans', { spans: [1001, 1003, 1005, 1007, 1009].map((from) => ({ from, to: from + 2, law: 'odd-rule' })) }, 'spans'],
    ['spans that don’t join', { spans: [{ from: 1001, to: 1009, law: 'odd-rule' }, { from: 1011, to: 1023, law: 'steady' }] }, 'spans[1].from'],
    ['a span that ends before it begins', { spans: [{ from: 1001, to: 1001, law: 'odd-rule' }, { from: 1001, to: 1023, law: 'steady' }] }, 'spans[0].to'],
    ['a law beside another first span’s', { law: 'steady', spans: [{ from: 1001, to: 1009, law: 'odd-rule' }, { from: 1009, to: 1023, law: 'steady' }] }, 'law'],
    ['a span whose law takes no distance', { spans: [{ from: 1001, to: 1009, law: 'odd-rule' }, { from: 1009, to: 1023, law: 'topple' }] }, 'spans[1].law'],
    ['a start from rest of what never rests', { spans: [{ from: 1001, to: 1009, law: 'odd-rule' }, { from: 1009, to: 1023, law: 'steady', start: 'rest' }] }, 'spans[1].start'],
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
