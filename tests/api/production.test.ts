import { v4 } from 'uuid'
import { beforeAll, beforeEach, describe, expect, it } from 'vitest'
import type { Shot } from '~/server/models'
import { rows, run, write } from '~/server/models/database'
import type { Refusal } from '~/utils/contracts/common'
import type { EventsAnswer } from '~/utils/contracts/event'
import type { Member } from '~/utils/contracts/people'
import type { Production, Sequence, Sheet, Wall } from '~/utils/contracts/production'
import type { ShotFacts, ShotPage } from '~/utils/contracts/take'
import type { Comment, Thread } from '~/utils/contracts/thread'
import type { Client } from '../helpers/client'
import { ok, openPier } from '../helpers/pier'
import { addShot, emailOf, fall } from '../helpers/seed'
import type { Cast, House } from '../helpers/seed'

let house: House
let shot: Shot
let here: string
let base: string
let as: Record<Cast, Client>

beforeAll(async () => {
  ;({ house, as, here } = await openPier())
})
beforeEach(async () => {
  shot = await addShot(house)
  base = `${here}/shots/${shot.code}`
})

const page = (query = '', who: Cast = 'supervisor') => ok<ShotPage>(as[who].get(`${base}${query}`), 200)
const wallSheet = () => ok<Sheet>(as.guest.get(`${here}/wall/${shot.code}`), 200)
const events = async (after = 0) => (await ok<EventsAnswer>(as.guest.get(`${here}/events?after=${after}`), 200)).events
const lastNumber = async () => (await ok<Wall>(as.guest.get(`${here}/wall`), 200)).eventNumber

describe('a thread', () => {
  it('takes no answer while it is settled, and its starter can open it again', async () => {
    const thread = await ok<Thread>(as.guest.post(`${base}/threads`, { clientId: v4(), fromFrame: 1001, toFrame: 1009, comment: { clientId: v4(), body: '**Here**' } }), 201)
    expect(thread).toMatchObject({ take: null, fromFrame: 1001, toFrame: 1009, settledAt: null, comments: [{ body: '**Here**', thread: thread.id }] })
    const settled = await ok<Thread>(as.guest.patch(`${base}/threads/${thread.id}`, { settled: true }), 200)
    expect(settled.settledBy).toEqual({ id: house.people.guest.id, name: house.people.guest.name })
    expect((await wallSheet()).openThreads).toBe(0)
    const { message } = await ok<Refusal>(as.animator.post(`${base}/threads/${thread.id}/comments`, { clientId: v4(), body: 'x' }), 409)
    expect(message).toBe('This thread is settled; open it again to answer.')
    const begun = await lastNumber()
    expect(await ok(as.guest.patch(`${base}/threads/${thread.id}`, { settled: true }), 200)).toEqual(settled)
    expect(await events(begun)).toEqual([])
    await ok(as.guest.patch(`${base}/threads/${thread.id}`, { settled: false }), 200)
    await ok(as.animator.post(`${base}/threads/${thread.id}/comments`, { clientId: v4(), body: 'x' }), 201)
    expect((await events(begun)).map(({ kind }) => kind)).toEqual(['thread-settled', 'comment'])
  })

  it('arrives whole in the event that opened it, and so does each comment', async () => {
    const begun = await lastNumber()
    const thread = await ok<Thread>(as.guest.post(`${base}/threads`, { clientId: v4(), fromFrame: 1001, toFrame: 1001, comment: { clientId: v4(), body: 'one' } }), 201)
    const comment = await ok<Comment>(as.animator.post(`${base}/threads/${thread.id}/comments`, { clientId: v4(), body: 'two' }), 201)
    expect(await events(begun)).toEqual([
      { n: begun + 1, kind: 'thread', shot: shot.code, by: thread.by, at: expect.any(String), comment: thread.comments[0] },
      { n: begun + 2, kind: 'comment', shot: shot.code, by: comment.by, at: expect.any(String), comment },
    ])
    expect(thread.comments[0]!.n).toBe(begun + 1)
  })
})

describe('catching up', () => {
  it('hands out 500 events at once and says when there are more; nothing of another production', async () => {
    const start = await lastNumber()
    const at = new Date().toISOString()
    await write(async () => {
      for (let n = start + 1; n <= start + 620; n++)
        await run("INSERT INTO events (production_id, n, kind, created_at) VALUES (:id, :n, 'sequence', :at)", { id: house.production.id, n, at })
      await run('UPDATE productions SET event_number = :n WHERE id = :id', { n: start + 620, id: house.production.id })
      await run("INSERT INTO events (production_id, n, kind, created_at) VALUES (:id, :n, 'member', :at)", { id: house.elsewhere.id, n: start + 5, at })
    })
    const first = await ok<EventsAnswer>(as.guest.get(`${here}/events?after=${start}`), 200)
    expect(first.more).toBe(true)
    expect(first.events.map(({ n }) => n)).toEqual(Array.from({ length: 500 }, (_, i) => start + 1 + i))
    expect(new Set(first.events.map(({ kind }) => kind))).toEqual(new Set(['sequence']))
    const rest = await ok<EventsAnswer>(as.guest.get(`${here}/events?after=${start + 500}`), 200)
    expect(rest.more).toBe(false)
    expect(rest.events).toHaveLength(120)
    expect((await ok<EventsAnswer>(as.guest.get(`${here}/events?after=${start + 620}`), 200))).toEqual({ events: [], more: false })
  })
})

describe('shots and sequences', () => {
  it('stand in story order, new ones at the end', async () => {
    const code = () => v4().slice(0, 8).toUpperCase()
    const [early, late] = [code(), code()]
    await ok<Sequence>(as.coordinator.post(`${here}/sequences`, { code: late, title: 'Late' }), 201)
    await ok<Sequence>(as.coordinator.post(`${here}/sequences`, { code: early, title: 'Early' }), 201)
    await ok<Sequence>(as.coordinator.patch(`${here}/sequences/${early}`, { position: 0 }), 200)
    const make = (sequence: string, more = {}) => ok<ShotFacts>(as.coordinator.post(`${here}/shots`, { clientId: v4(), code: `S-${code()}`, title: 'x', sequence, firstFrame: 1, lastFrame: 2, fps: 24, ...more }), 201)
    const made = [await make(late), await make(late), await make(early), await make(late, { position: 15 }), await make(late)]
    expect(made.map(({ position }) => position)).toEqual([10, 20, 10, 15, 30])
    const wall = await ok<Wall>(as.guest.get(`${here}/wall`), 200)
    expect(wall.sequences.map((one) => one.code)).toEqual([early, 'PIR', late])
    expect(wall.sheets.filter((sheet) => [early, late].includes(sheet.sequence)).map((sheet) => sheet.code))
      .toEqual([made[2], made[0], made[3], made[1], made[4]].map((one) => one!.code))
    const places = wall.sheets.map((sheet) => wall.sequences.findIndex((one) => one.code === sheet.sequence))
    expect(places).toEqual([...places].sort((a, b) => a - b))
  })

  it('refuse a code that is taken, by its field', async () => {
    const taken = { clientId: v4(), code: shot.code, title: 'x', sequence: 'PIR', firstFrame: 1, lastFrame: 2, fps: 24 }
    expect((await ok<Refusal>(as.coordinator.post(`${here}/shots`, taken), 409)).data?.issues).toEqual([{ path: 'code', message: `There is a shot ${shot.code} already.` }])
    expect((await ok<Refusal>(as.coordinator.post(`${here}/sequences`, { code: 'PIR', title: 'x' }), 409)).data?.issues?.[0]?.path).toBe('code')
  })

  it('keep their frames in order when only one end is moved', async () => {
    expect((await ok<Refusal>(as.coordinator.patch(base, { firstFrame: 1101, version: 1 }), 422)).data?.issues?.[0]?.path).toBe('firstFrame')
    expect((await ok<Refusal>(as.coordinator.patch(base, { lastFrame: 1000, version: 1 }), 422)).data?.issues?.[0]?.path).toBe('lastFrame')
    expect(await ok(as.coordinator.patch(base, { firstFrame: 1101, lastFrame: 1200, version: 1 }), 200)).toMatchObject({ firstFrame: 1101, lastFrame: 1200, version: 2 })
  })

  it('change what is sent and nothing else; sending what stands already changes nothing', async () => {
    const before = await page()
    const changed = await ok<ShotFacts>(as.coordinator.patch(base, { dueOn: '2027-01-15', animator: house.people.otherAnimator.id, supervisor: null, version: 1 }), 200)
    const { takes, take, threads, production, letterCount, eventNumber, ...facts } = before
    expect([takes, take, threads, letterCount]).toEqual([[], null, [], 0])
    expect(production.slug).toBe('long-pier')
    expect(eventNumber).toBe(await lastNumber() - 1)
    expect(changed).toEqual({ ...facts, dueOn: '2027-01-15', animator: { id: house.people.otherAnimator.id, name: house.people.otherAnimator.name }, supervisor: null, version: 2 })
    const begun = await lastNumber()
    expect((await ok<ShotFacts>(as.coordinator.patch(base, { dueOn: '2027-01-15', version: 2 }), 200)).version).toBe(2)
    expect(await events(begun)).toEqual([])
  })
})

describe('members', () => {
  const members = (who: Cast) => ok<Member[]>(as[who].get(`${here}/members`), 200)

  it('see each other’s names and roles; addresses only who manages them (8.2.3, 15.3.1)', async () => {
    for (const who of ['guest', 'animator'] as const) for (const member of await members(who)) expect(member.email).toBeNull()
    for (const who of ['supervisor', 'coordinator'] as const)
      expect((await members(who)).find(({ id }) => id === house.people.guest.id)?.email).toBe(emailOf('guest'))
    const [first] = await members('coordinator')
    expect(Object.keys(first!).sort()).toEqual(['disabled', 'email', 'id', 'name', 'role', 'version'])
    const about = await ok<Production>(as.guest.get(here), 200)
    expect(about).toMatchObject({ slug: 'long-pier', title: 'The Long Pier', role: 'guest' })
    expect(Object.keys(about.members[0]!).sort()).toEqual(['id', 'name', 'role'])
    expect(JSON.stringify(about)).not.toContain('@pier.example')
  })

  it('come by the address of an account, change role by version, and go; each time an event says so', async () => {
    const begun = await lastNumber()
    const email = emailOf('outsider')
    const added = await ok<Member>(as.coordinator.post(`${here}/members`, { email: email.toUpperCase(), role: 'animator' }), 201)
    expect(added).toMatchObject({ id: house.people.outsider.id, email, role: 'animator', version: 1, disabled: false })
    expect((await ok<Refusal>(as.coordinator.post(`${here}/members`, { email, role: 'guest' }), 409)).data?.issues?.[0]?.path).toBe('email')
    expect(await ok<Member>(as.coordinator.patch(`${here}/members/${added.id}`, { role: 'guest', version: 1 }), 200)).toEqual({ ...added, role: 'guest', version: 2 })
    expect((await ok<Refusal>(as.coordinator.patch(`${here}/members/${added.id}`, { role: 'supervisor', version: 1 }), 409)).data?.current).toMatchObject({ role: 'guest', version: 2 })
    await ok(as.coordinator.delete(`${here}/members/${added.id}`), 204)
    expect((await events(begun)).map(({ kind }) => kind)).toEqual(['member', 'member', 'member'])
    expect((await ok<Refusal>(as.coordinator.post(`${here}/members`, { email: 'nobody@pier.example', role: 'guest' }), 422)).data?.issues)
      .toEqual([{ path: 'email', message: 'No account has this address: a keeper can invite them.' }])
  })

  it('who went keeps their words and their name on their shots, but is given no new one', async () => {
    const { outsider } = house.people
    await ok(as.coordinator.post(`${here}/members`, { email: emailOf('outsider'), role: 'animator' }), 201)
    await ok(as.coordinator.patch(base, { animator: outsider.id, version: 1 }), 200)
    await ok(as.outsider.post(`${base}/takes`, { clientId: v4(), keys: fall() }), 201)
    await ok(as.coordinator.delete(`${here}/members/${outsider.id}`), 204)
    const left = await page()
    expect(left).toMatchObject({ animator: { id: outsider.id, name: outsider.name }, takes: [{ by: { id: outsider.id } }] })
    // A form that sends back who stands there already is not refused for it.
    await ok(as.coordinator.patch(base, { animator: outsider.id, title: 'Same hands', version: left.version }), 200)
    const other = await addShot(house)
    await ok(as.coordinator.patch(`${here}/shots/${other.code}`, { animator: outsider.id, version: 1 }), 422)
    await ok(as.outsider.get(base), 404)
  })

  it('never lose the last who may manage them', async () => {
    const alone = house.people.outsider.id
    const far = `/api/productions/${house.elsewhere.slug}/members`
    const before = await rows('SELECT * FROM memberships ORDER BY person_id')
    await ok(as.outsider.delete(`${far}/${alone}`), 409)
    await ok(as.outsider.patch(`${far}/${alone}`, { role: 'animator', version: 1 }), 409)
    expect(await rows('SELECT * FROM memberships ORDER BY person_id')).toEqual(before)
    await ok(as.outsider.patch(`${far}/${alone}`, { role: 'coordinator', version: 1 }), 200)
    // Somebody who is only named, and never signs in, is nobody to leave the members to.
    await write(async () => {
      const named = { id: v4(), at: new Date().toISOString(), production: house.elsewhere.id }
      await run("INSERT INTO people (id, email, name, created_at) VALUES (:id, 'named@pier.example', 'Named Only', :at)", { id: named.id, at: named.at })
      await run("INSERT INTO memberships (production_id, person_id, role, created_at) VALUES (:production, :id, 'supervisor', :at)", named)
    })
    await ok(as.outsider.delete(`${far}/${alone}`), 409)
    await ok(as.outsider.post(far, { email: emailOf('guest'), role: 'supervisor' }), 201)
    await ok(as.outsider.patch(`${far}/${alone}`, { role: 'guest', version: 2 }), 200)
  })
})
