import { beforeAll, beforeEach, describe, expect, it } from 'vitest'
import type { Member } from '~/utils/contracts/people'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'
import { House } from './house'
import type { Person } from './house'
import { Line, pause, until } from './line'
import type { Transport } from './line'
import { Reader } from './reader'

let server: TestServer
let house: House
let pier: string
let harbour: string
let keeper: Person
let supervisor: Person
let person: Person

beforeAll(async () => {
  server = await startServer({ demo: 'off' })
  house = new House(server)
  pier = await house.production('pier', ['PIR-010'])
  harbour = await house.production('harbour', ['HAR-010'])
  keeper = await house.person('Kit Keeper', {}, true)
  supervisor = await house.person('Sam Supervisor', { [pier]: 'supervisor', [harbour]: 'supervisor' })
  return () => house.close()
})
beforeEach(async () => {
  person = await house.person('Ada Lund', { [pier]: 'animator', [harbour]: 'animator' })
})

async function follow(cookie = person.cookie, production = 'pier', transport: Transport = 'websocket') {
  const line = await new Line(server.url, { cookie, transport }).open()
  expect(await line.watch(production)).toEqual({ ok: true })
  return line
}
/** Something happens on the pier that every follower hears of. */
async function somethingHappens() {
  const reader = await new Reader(supervisor, { production: 'pier', shot: 'PIR-010' }).open()
  await reader.startThread('Something happens.')
  await until(() => reader.line.heard.length > 0, 'the news')
}

describe.each<Transport>(['websocket', 'polling'])('over %s', (transport) => {
  // ASVS 5.0.0 7.4.1
  it('ends with the sign-out, and with that session only', async () => {
    const elsewhere = await house.session(person.id)
    const [here, there] = [await follow(person.cookie, 'pier', transport), await follow(elsewhere.cookie, 'pier', transport)]
    const ended = here.ended()
    expect((await person.client.delete('/api/session')).status).toBe(200)
    await ended
    expect(here.dismissals).toEqual([{ reason: 'session' }])
    expect(there.socket.connected).toBe(true)
    await somethingHappens()
    await until(() => there.heard.length > 0, 'the news in the other window')
    expect(here.heard).toEqual([])
    await expect(new Line(server.url, { cookie: person.cookie, transport }).open()).rejects.toMatchObject({ data: { statusCode: 401 } })
  })

  // ASVS 5.0.0 7.4.2
  it('ends at once with the account', async () => {
    const lines = [await follow(person.cookie, 'pier', transport), await follow((await house.session(person.id)).cookie, 'harbour', transport)]
    const ended = Promise.all(lines.map((line) => line.ended()))
    const answer = await keeper.client.patch(`/api/accounts/${person.id}`, { disabled: true, version: 1 })
    expect(answer.status).toBe(200)
    await ended
    expect(lines.map(({ dismissals }) => dismissals)).toEqual([[{ reason: 'session' }], [{ reason: 'session' }]])
    await somethingHappens()
    expect(lines.flatMap(({ heard }) => heard)).toEqual([])
  })
})

// ASVS 5.0.0 7.4.5
it('ends when a keeper ends the sessions of a person', async () => {
  const line = await follow()
  const ended = line.ended()
  expect((await keeper.client.delete(`/api/accounts/${person.id}/sessions`)).status).toBeLessThan(300)
  await ended
  expect(line.dismissals).toEqual([{ reason: 'session' }])
})

// ASVS 5.0.0 7.5.2
it('ends when the person ends one session from another', async () => {
  const elsewhere = await house.session(person.id)
  const [here, there] = [await follow(), await follow(elsewhere.cookie)]
  const ended = there.ended()
  expect((await person.client.delete(`/api/me/sessions/${elsewhere.sessionId}`)).status).toBeLessThan(300)
  await ended
  expect(there.dismissals).toEqual([{ reason: 'session' }])
  expect(here.socket.connected).toBe(true)
})

// ASVS 5.0.0 7.3.1: a session can end without any news of it.
it('answers no event of a session that has grown old meanwhile', async () => {
  const line = await follow()
  const longAgo = new Date(Date.now() - 15 * 24 * 60 * 60 * 1000).toISOString()
  await house.run('UPDATE sessions SET seen_at = ? WHERE id = ?', longAgo, person.sessionId)
  const ended = line.ended()
  expect(await line.watch('pier')).toMatchObject({ ok: false, statusCode: 401 })
  await ended
  expect(line.dismissals).toEqual([{ reason: 'session' }])
})

describe('a membership', () => {
  const path = () => `/api/productions/pier/members/${person.id}`

  it('that is removed takes the person out of the room at once, and out of sight', async () => {
    const watcher = await follow(supervisor.cookie)
    const [onPier, inHarbour] = [await follow(), await follow(person.cookie, 'harbour')]
    await onPier.look('pier', 'PIR-010')
    await until(() => watcher.presences.at(-1)?.lookers.length === 1, 'the person to be seen')
    expect((await supervisor.client.delete(path())).status).toBeLessThan(300)
    await until(() => onPier.dismissals.length > 0, 'the dismissal')
    expect(onPier.dismissals).toEqual([{ reason: 'membership', production: 'pier' }])
    await until(() => watcher.presences.at(-1)?.lookers.length === 0, 'the person to be gone')
    const before = onPier.heard.length
    // Not even of their own going: the page would ask for it, and be refused.
    expect(before).toBe(watcher.heard.length - 1)
    await somethingHappens()
    await until(() => watcher.heard.length > 1, 'the news for the others')
    expect(onPier.heard.length).toBe(before)
    for (const ask of [() => onPier.watch('pier'), () => onPier.look('pier', 'PIR-010')])
      expect(await ask()).toMatchObject({ ok: false, statusCode: 404 })
    expect(inHarbour.dismissals).toEqual([])
    expect(await inHarbour.look('harbour', 'HAR-010')).toEqual({ ok: true })
  })

  // ASVS 5.0.0 8.3.2
  it('that changes its role takes the sockets on that production out of the room at once, and those only', async () => {
    const [onPier, inHarbour, bystander] = [await follow(), await follow(person.cookie, 'harbour'), await follow(supervisor.cookie)]
    const { body } = await supervisor.client.get<Member[]>('/api/productions/pier/members')
    const { version } = body.find(({ id }) => id === person.id)!
    expect((await supervisor.client.patch(path(), { role: 'guest', version })).status).toBe(200)
    await until(() => onPier.dismissals.length > 0, 'the news of the role')
    expect(onPier.dismissals).toEqual([{ reason: 'role', production: 'pier' }])
    await pause(100)
    expect([...inHarbour.dismissals, ...bystander.dismissals]).toEqual([])
    const before = onPier.heard.length
    await somethingHappens()
    await until(() => bystander.heard.length > 1, 'the news for the others')
    expect(onPier.heard.length).toBe(before)
    // The line itself stays: the person is still signed in, and asks again with the role they have now.
    expect(await onPier.watch('pier')).toEqual({ ok: true })
    await somethingHappens()
    await until(() => onPier.heard.length > before, 'the news after asking again')
  })

  it('that is removed while `watch` is under way does not leave the socket in the room', async () => {
    // Many at once, so that some read the membership just before it goes.
    const lines = await Promise.all(Array.from({ length: 12 }, () => new Line(server.url, { cookie: person.cookie }).open()))
    const asked = lines.map((line, i) => pause(i).then(() => line.watch('pier')))
    await supervisor.client.delete(path())
    const answers = await Promise.all(asked)
    await pause(100)
    const before = lines.map(({ heard }) => heard.length)
    await somethingHappens()
    await pause(200)
    expect(lines.map(({ heard }) => heard.length)).toEqual(before)
    for (const [i, answer] of answers.entries())
      if (answer.ok) expect(lines[i]!.dismissals).toEqual([{ reason: 'membership', production: 'pier' }])
  })
})
