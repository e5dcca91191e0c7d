import { beforeAll, describe, expect, it } from 'vitest'
import type { SocketAnswer } from '~/utils/contracts/event'
import { may, roles, socketEvents } from '~/utils/permissions'
import type { Role, SocketEvent } from '~/utils/permissions'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'
import { House } from './house'
import type { Person } from './house'
import { Line } from './line'

// ASVS 5.0.0 8.2.1, 8.2.2 and 2.2.1 for events of the socket: denied unless granted, and nothing without a schema.
let server: TestServer
let house: House
let pier: string
let outsider: Person
const members = {} as Record<Role, Person>
const events = Object.keys(socketEvents) as SocketEvent[]

/** A well-formed request for each event of the table: an event without one does not compile. */
const requests: Record<SocketEvent, (production: string) => object> = {
  watch: (production) => ({ production }),
  look: (production) => ({ production, shot: 'PIR-010' }),
}
const NOTHING: SocketAnswer = { ok: false, statusCode: 404, message: 'There is nothing here.' }

beforeAll(async () => {
  server = await startServer({ demo: 'off' })
  house = new House(server)
  pier = await house.production('pier', ['PIR-010'])
  const harbour = await house.production('harbour', ['HAR-010'])
  // A supervisor and a keeper, and still nobody on the pier.
  outsider = await house.person('Dov Adler', { [harbour]: 'supervisor' }, true)
  for (const role of roles) members[role] = await house.person(`The ${role}`, { [pier]: role })
  return () => house.close()
})

const open = ({ cookie }: Person) => new Line(server.url, { cookie }).open()

describe('who is no member', () => {
  it.each(events)('is told of `%s` on a production what is told of one that does not exist', async (name) => {
    const line = await open(outsider)
    expect(await line.ask(name, requests[name]('pier'))).toEqual(NOTHING)
    expect(await line.ask(name, requests[name]('no-such-place'))).toEqual(NOTHING)
  })

  it('hears nothing afterwards', async () => {
    const line = await open(outsider)
    await line.watch('pier')
    await line.look('pier', 'PIR-010')
    const watcher = await open(members.guest)
    await watcher.watch('pier')
    await watcher.look('pier', 'PIR-010')
    await line.watch('pier')
    expect(line.presences).toEqual([])
    expect(line.heard).toEqual([])
    expect(watcher.presences.flatMap(({ lookers }) => lookers).map(({ person }) => person.name)).not.toContain(outsider.name)
  })
})

describe.each(roles)('a member who is %s', (role) => {
  it.each(events)('gets from `%s` what the table says', async (name) => {
    const line = await open(members[role])
    // What may be asked of a production depends on following it first.
    if (name !== 'watch') await line.watch('pier')
    const granted = may(role, socketEvents[name])
    const answer = await line.ask(name, requests[name]('pier'))
    expect(answer).toEqual(granted ? { ok: true } : expect.objectContaining({ ok: false, statusCode: 403 }))
  })
})

describe('what is not well-formed', () => {
  it.each([
    ['watch', undefined],
    ['watch', null],
    ['watch', 'pier'],
    ['watch', {}],
    ['watch', { production: 'Pier' }],
    ['watch', { production: ['pier'] }],
    ['watch', { production: { slug: 'pier' } }],
    ['watch', { production: 'pier', role: 'supervisor' }],
    ['look', { production: 'pier' }],
    ['look', { production: 'pier', shot: '<b>' }],
    ['look', { production: 'pier', shot: 'PIR-010', person: 'somebody else' }],
  ])('is refused: %s %j', async (name, request) => {
    const line = await open(members.supervisor)
    expect(await line.ask(name, request)).toMatchObject({ ok: false, statusCode: 422 })
  })

  it('does not matter to who may not know: a foreign production is refused for its shape first, then as nothing', async () => {
    const line = await open(outsider)
    expect(await line.ask('look', { production: 'pier', shot: '<b>' })).toMatchObject({ statusCode: 422 })
    expect(await line.ask('look', { production: 'pier', shot: 'PIR-010' })).toEqual(NOTHING)
  })

  it('takes no shot that the production does not have, nor one of a production that is not followed', async () => {
    const line = await open(members.animator)
    expect(await line.look('pier', 'PIR-010')).toMatchObject({ ok: false, statusCode: 422 })
    await line.watch('pier')
    expect(await line.look('pier', 'PIR-999')).toEqual(NOTHING)
    expect(await line.look('pier', 'HAR-010')).toEqual(NOTHING)
  })

  it.each(['ruling', 'event', 'presence', 'dismissed', 'constructor', '__proto__', 'toString'])(
    'knows no event called %s',
    async (name) => {
      const line = await open(members.supervisor)
      expect(await line.ask(name, { production: 'pier' })).toEqual(NOTHING)
    },
  )

  it('does without an acknowledgement, and with anything in its place', async () => {
    const line = await open(members.supervisor)
    const say = line.socket.emit.bind(line.socket) as (name: string, ...args: unknown[]) => void
    say('watch')
    say('watch', { production: 'pier' })
    say('nothing', 1, 2, 3)
    expect(await line.watch('pier')).toEqual({ ok: true })
  })
})

it('slows who asks without end, and answers again later', async () => {
  const line = await open(members.guest)
  const answers = await Promise.all(Array.from({ length: 60 }, () => line.watch('pier')))
  const refused = answers.filter((answer) => !answer.ok && answer.statusCode === 429)
  expect(refused.length).toBeGreaterThan(20)
  expect(answers[0]).toEqual({ ok: true })
  await new Promise((resolve) => setTimeout(resolve, 1_000))
  expect(await line.watch('pier')).toEqual({ ok: true })
})
