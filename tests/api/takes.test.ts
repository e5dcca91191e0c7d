import { v4 } from 'uuid'
import { beforeAll, beforeEach, describe, expect, it } from 'vitest'
import type { Shot } from '~/server/models'
import type { Refusal } from '~/utils/contracts/common'
import type { EventsAnswer } from '~/utils/contracts/event'
import type { Sheet, Wall } from '~/utils/contracts/production'
import type { Flag, Ruling, ShotFacts, ShotPage, Take, TakeLine, Waiver } from '~/utils/contracts/take'
import type { Comment, Thread } from '~/utils/contracts/thread'
import type { Client } from '../helpers/client'
import { ok, openPier } from '../helpers/pier'
import { addShot, brokenFall, fall, fallClaim } from '../helpers/seed'
import type { Cast, House } from '../helpers/seed'
import { rowCounts } from '../helpers/store'

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
const post = (keys = brokenFall(), clientId = v4()) => ok<Take>(as.animator.post(`${base}/takes`, { clientId, keys }), 201)
const events = async (after = 0) => (await ok<EventsAnswer>(as.guest.get(`${here}/events?after=${after}`), 200)).events
const lastNumber = async () => (await ok<Wall>(as.guest.get(`${here}/wall`), 200)).eventNumber

describe('a shot’s life', () => {
  it('goes over the desks as takes and rulings come, and the wall says the same as the shot page', async () => {
    const begun = await lastNumber()
    expect(await wallSheet()).toMatchObject({ desk: 'not-started', stamp: null, sketch: null, openThreads: 0, claim: fallClaim, deskSince: shot.createdAt })

    const first = await post()
    expect(first).toMatchObject({ number: 1, verdict: 'breaks', claim: fallClaim, fps: 24, note: '', withdrawnAt: null, ruling: null, flags: [], waivers: [] })
    expect(first.answer.findings[0]).toMatchObject({ kind: 'misplaced', frames: [1015] })
    expect(await wallSheet()).toMatchObject({ desk: 'supervisor', deskSince: first.at, sketch: { number: 1, verdict: 'breaks', drawings: 12 } })

    const finding = { kind: 'misplaced', frames: [1015] }
    const flag = await ok<Flag>(as.supervisor.post(`${base}/takes/1/flags`, { clientId: v4(), fromFrame: 1015, toFrame: 1015, reason: 'Too far.', finding }), 201)
    const waiver = await ok<Waiver>(as.supervisor.post(`${base}/takes/1/waivers`, { clientId: v4(), finding, reason: 'Meant.' }), 201)
    const thread = await ok<Thread>(as.guest.post(`${base}/threads`, { clientId: v4(), take: 1, fromFrame: 1015, toFrame: 1015, comment: { clientId: v4(), body: 'Why?' } }), 201)
    const seen = await page()
    expect(seen).toMatchObject({
      production: { slug: 'long-pier', title: 'The Long Pier' }, sequence: { code: 'PIR' }, desk: 'supervisor', version: 4,
      // The animator, the coordinator and the guest of the thread; not who would rule.
      letterCount: 3,
      take: { number: 1, flags: [flag], waivers: [waiver] }, threads: [thread],
    })
    expect((await page('', 'animator')).letterCount).toBe(0)
    expect((await wallSheet()).openThreads).toBe(1)

    const ruling = await ok<Ruling>(as.supervisor.post(`${base}/takes/1/rulings`, { clientId: v4(), decision: 'goes-back', note: 'Again.', version: seen.version }), 201)
    expect(await wallSheet()).toMatchObject({ desk: 'animator', deskSince: ruling.at, stamp: { take: 1, decision: 'goes-back', at: ruling.at } })

    const second = await post(fall())
    expect(second).toMatchObject({ number: 2, verdict: 'holds' })
    const { version } = await page()
    await ok(as.supervisor.post(`${base}/takes/2/rulings`, { clientId: v4(), decision: 'stands', version }), 201)
    expect(await wallSheet()).toMatchObject({ desk: 'settled', stamp: { take: 2, decision: 'stands' }, sketch: { number: 2 } })
    expect((await page()).takes.map(({ number, ruling }) => [number, ruling?.decision])).toEqual([[1, 'goes-back'], [2, 'stands']])
    expect(await page('?take=1')).toMatchObject({ take: { number: 1, flags: [{ id: flag.id }] }, desk: 'settled', letterCount: 0 })

    const told = (await events(begun)).filter((event) => event.shot === shot.code)
    expect(told.map(({ kind, take }) => [kind, take])).toEqual([['take', 1], ['flag', 1], ['waiver', 1], ['thread', 1], ['ruling', 1], ['take', 2], ['ruling', 2]])
  })

  it('keeps a take that was taken back as a line of the history', async () => {
    await post()
    const line = await ok<TakeLine>(as.animator.delete(`${base}/takes/1`), 200)
    expect(line).toMatchObject({ number: 1, withdrawnAt: expect.stringMatching(/Z$/) })
    expect(await ok<TakeLine>(as.animator.delete(`${base}/takes/1`), 200)).toEqual(line)
    expect(await page()).toMatchObject({ desk: 'not-started', deskSince: line.withdrawnAt, take: null, takes: [line] })
    expect((await page('?take=1')).take).toMatchObject({ number: 1, withdrawnAt: line.withdrawnAt })
    expect((await wallSheet()).sketch).toBeNull()
    expect((await post()).number).toBe(2)
  })

  it('judges by the claim as it stands; takes posted before keep theirs', async () => {
    await post(fall())
    const steady = { ...fallClaim, law: 'steady' }
    const facts = await ok<ShotFacts>(as.supervisor.put(`${base}/claim`, { claim: steady, version: (await page()).version }), 200)
    expect(facts.claim).toEqual(steady)
    expect(await post(fall())).toMatchObject({ number: 2, claim: steady, verdict: 'breaks' })
    expect((await page('?take=1')).take).toMatchObject({ claim: fallClaim, verdict: 'holds' })
  })

  it('takes no take before it claims anything, and says so', async () => {
    const bare = await addShot(house, { claim: null })
    const { message } = await ok<Refusal>(as.animator.post(`${here}/shots/${bare.code}/takes`, { clientId: v4(), keys: fall() }), 409)
    expect(message).toBe('Say what this shot claims first: without a law there is nothing to judge a list by.')
  })
})

describe('sent twice', () => {
  it('is stored once and answered alike: takes, flags, waivers, threads, comments, rulings, shots', async () => {
    const keys = brokenFall()
    const finding = { kind: 'misplaced', frames: [1015] }
    const newShot = { clientId: v4(), code: `TWO-${v4().slice(0, 8).toUpperCase()}`, title: 'Twice', sequence: 'PIR', firstFrame: 1, lastFrame: 9, fps: 24 }
    const twice = async (who: Cast, path: string, body: object) => {
      const first = await ok(as[who].post(path, body), 201)
      const counts = await rowCounts(['sessions'])
      expect(await ok(as[who].post(path, body), 200)).toEqual(first)
      expect(await rowCounts(['sessions'])).toEqual(counts)
      return first
    }
    await twice('coordinator', `${here}/shots`, newShot)
    await twice('animator', `${base}/takes`, { clientId: v4(), keys })
    await twice('supervisor', `${base}/takes/1/flags`, { clientId: v4(), fromFrame: 1001, toFrame: 1003, reason: 'x', finding })
    await twice('supervisor', `${base}/takes/1/waivers`, { clientId: v4(), finding, reason: 'x' })
    const opening = { clientId: v4(), take: 1, comment: { clientId: v4(), body: 'x' } }
    const thread = (await twice('guest', `${base}/threads`, opening)) as Thread
    await twice('animator', `${base}/threads/${thread.id}/comments`, { clientId: v4(), body: 'y' })
    await twice('supervisor', `${base}/takes/1/rulings`, { clientId: v4(), decision: 'goes-back', version: (await page()).version })
  })

  it('holds when the repeats arrive together', async () => {
    const body = { clientId: v4(), keys: fall() }
    const answers = await Promise.all(Array.from({ length: 8 }, () => as.animator.post<Take>(`${base}/takes`, body)))
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 200, 200, 200, 200, 200, 200, 201])
    expect(new Set(answers.map((answer) => answer.body.number))).toEqual(new Set([1]))
    expect((await page()).takes).toHaveLength(1)
  })
})

describe('two people at once', () => {
  it('a stale write gets what stands now, and loses nothing of it', async () => {
    await ok(as.coordinator.patch(base, { title: 'Hers', version: 1 }), 200)
    const { data } = await ok<Refusal>(as.supervisor.patch(base, { title: 'His', brief: 'His too.', version: 1 }), 409)
    expect(data?.current).toMatchObject({ title: 'Hers', version: 2, brief: 'It has weight.' })
    expect(await page()).toMatchObject({ title: 'Hers', brief: 'It has weight.', version: 2 })
    const claim = await ok<Refusal>(as.supervisor.put(`${base}/claim`, { claim: { ...fallClaim, slop: 2 }, version: 1 }), 409)
    expect(claim.data?.current).toMatchObject({ claim: fallClaim, version: 2 })
  })

  it('a ruling that looked at less is refused: whatever the ruler should have seen raises the version', async () => {
    await post()
    const finding = { kind: 'misplaced', frames: [1015] }
    const note = { clientId: v4(), fromFrame: 1001, toFrame: 1003, reason: 'x' }
    const steps: [string, () => Promise<unknown>][] = [
      ['flag', () => as.otherSupervisor.post(`${base}/takes/1/flags`, note)],
      ['flag lifted', async () => as.otherSupervisor.delete(`${base}/takes/1/flags/${(await page()).take?.flags[0]?.id}`)],
      ['waiver', () => as.otherSupervisor.post(`${base}/takes/1/waivers`, { clientId: v4(), finding, reason: 'x' })],
      ['waiver lifted', async () => as.otherSupervisor.delete(`${base}/takes/1/waivers/${(await page()).take?.waivers[0]?.id}`)],
      ['claim', async () => as.otherSupervisor.put(`${base}/claim`, { claim: fallClaim, version: (await page()).version })],
      ['brief', async () => as.otherSupervisor.patch(base, { brief: v4(), version: (await page()).version })],
    ]
    for (const [what, step] of steps) {
      const { version } = await page()
      await step()
      const { data } = await ok<Refusal>(as.supervisor.post(`${base}/takes/1/rulings`, { clientId: v4(), decision: 'stands', version }), 409)
      expect(data?.current, what).toMatchObject({ version: version + 1, desk: 'supervisor' })
    }
  })

  it('a comment raises no version: talking on does not stop the ruling', async () => {
    await post()
    const { version } = await page()
    const thread = await ok<Thread>(as.guest.post(`${base}/threads`, { clientId: v4(), take: 1, comment: { clientId: v4(), body: 'x' } }), 201)
    await ok(as.animator.post(`${base}/threads/${thread.id}/comments`, { clientId: v4(), body: 'y' }), 201)
    await ok(as.guest.patch(`${base}/threads/${thread.id}`, { settled: true }), 200)
    await ok(as.supervisor.post(`${base}/takes/1/rulings`, { clientId: v4(), decision: 'stands', version }), 201)
  })

  it('50 writers over HTTP lose nothing: every comment is there once, numbered in order', async () => {
    const thread = await ok<Thread>(as.guest.post(`${base}/threads`, { clientId: v4(), fromFrame: 1001, toFrame: 1001, comment: { clientId: v4(), body: 'start' } }), 201)
    const writers: Cast[] = ['guest', 'animator', 'otherAnimator', 'supervisor', 'coordinator']
    const comments = await Promise.all(
      Array.from({ length: 50 }, (_, i) => ok<Comment>(as[writers[i % 5]!].post(`${base}/threads/${thread.id}/comments`, { clientId: v4(), body: `comment ${i}` }), 201)),
    )
    const stored = (await page()).threads[0]!.comments.slice(1)
    expect(stored).toEqual([...comments].sort((a, b) => a.n - b.n))
    expect(new Set(stored.map(({ body }) => body)).size).toBe(50)
    expect(new Set(stored.map(({ n }) => n)).size).toBe(50)
  })
})

describe('once a take is ruled on', () => {
  it('its record stays as it was', async () => {
    await post()
    const flag = await ok<Flag>(as.supervisor.post(`${base}/takes/1/flags`, { clientId: v4(), fromFrame: 1001, toFrame: 1003, reason: 'x' }), 201)
    const finding = { kind: 'misplaced', frames: [1015] }
    const waiver = await ok<Waiver>(as.supervisor.post(`${base}/takes/1/waivers`, { clientId: v4(), finding, reason: 'x' }), 201)
    await ok(as.supervisor.post(`${base}/takes/1/rulings`, { clientId: v4(), decision: 'goes-back', version: (await page()).version }), 201)
    const before = await page()
    await ok(as.supervisor.post(`${base}/takes/1/flags`, { clientId: v4(), fromFrame: 1001, toFrame: 1003, reason: 'y' }), 409)
    await ok(as.supervisor.delete(`${base}/takes/1/flags/${flag.id}`), 409)
    await ok(as.supervisor.post(`${base}/takes/1/waivers`, { clientId: v4(), finding, reason: 'y' }), 409)
    await ok(as.supervisor.delete(`${base}/takes/1/waivers/${waiver.id}`), 409)
    await ok(as.animator.delete(`${base}/takes/1`), 403)
    await ok(as.animator.put(`${base}/claim`, { claim: fallClaim, version: before.version }), 403)
    expect(await page()).toEqual(before)
  })
})
