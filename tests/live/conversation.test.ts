import { io } from 'socket.io-client'
import { beforeAll, expect, it, onTestFinished } from 'vitest'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'
import { House } from './house'
import type { Person } from './house'
import { Line, until } from './line'
import { Reader } from './reader'

let server: TestServer
let house: House
let people: Person[]
const place = { production: 'pier', shot: 'PIR-010' }

beforeAll(async () => {
  server = await startServer({ demo: 'off' })
  house = new House(server)
  const pier = await house.production('pier', ['PIR-010'])
  const harbour = await house.production('harbour', ['HAR-010'])
  people = await Promise.all([
    house.person('Ada Lund', { [pier]: 'animator' }),
    house.person('Bo Reis', { [pier]: 'supervisor' }),
    house.person('Cleo Marsh', { [pier]: 'guest' }),
    house.person('Dov Adler', { [harbour]: 'supervisor' }),
  ])
  return () => house.close()
})

it('carries a conversation between two people over WebSocket and one over polling', async () => {
  const [ada, bo, cleo] = people as [Person, Person, Person]
  const readers = [new Reader(ada, place), new Reader(bo, place), new Reader(cleo, place, 'polling')] as const
  await Promise.all(readers.map((reader) => reader.open()))
  expect(readers.map(({ line }) => line.transport)).toEqual(['websocket', 'websocket', 'polling'])

  const thread = await readers[0].startThread('Does the tower wait long enough?')
  const answers = [
    await readers[1].say(thread.id, 'Two frames more before it goes.'),
    await readers[2].say(thread.id, 'It reads as wood to me.'),
    await readers[0].say(thread.id, 'Then *slower* it is.'),
  ]
  for (const reader of readers) {
    await until(() => reader.comments.length === 4, `${reader.person.name} to have the conversation`)
    expect(reader.comments.map(({ body }) => body)).toEqual([
      'Does the tower wait long enough?',
      ...answers.map(({ comment }) => comment.body),
    ])
    expect(reader.comments.map(({ by }) => by.name)).toEqual(['Ada Lund', 'Bo Reis', 'Cleo Marsh', 'Ada Lund'])
  }
})

it('starts with polling and goes over to WebSocket where that works', async () => {
  const socket = io(server.url, { forceNew: true, extraHeaders: { origin: server.url, cookie: people[0]!.cookie } })
  onTestFinished(() => void socket.disconnect())
  await until(() => socket.connected, 'the connection')
  await until(() => socket.io.engine.transport.name === 'websocket', 'the upgrade')
  const answer = await socket.timeout(3_000).emitWithAck('watch', { production: 'pier' })
  expect(answer).toEqual({ ok: true })
})

it('says nothing of a production to those who follow another', async () => {
  const [ada, , , dov] = people as [Person, Person, Person, Person]
  const stranger = await new Line(server.url, { cookie: dov.cookie }).open()
  expect(await stranger.watch('harbour')).toEqual({ ok: true })
  const reader = await new Reader(ada, place).open()
  await reader.startThread('Only for the pier.')
  await until(() => reader.line.heard.length > 0, 'the news on the pier')
  // Had it been told, it would have come before the answer to a question asked later.
  await stranger.look('harbour', 'HAR-010')
  expect(stranger.heard).toEqual([])
})

it('follows one production at a time', async () => {
  const both = await house.person('Ida Storm')
  for (const slug of ['pier', 'harbour'])
    await house.run(
      `INSERT INTO memberships (production_id, person_id, role, created_at) SELECT id, ?, 'guest', ? FROM productions WHERE slug = ?`,
      ...[both.id, new Date().toISOString(), slug],
    )
  const line = await new Line(server.url, { cookie: both.cookie }).open()
  await line.watch('pier')
  await line.watch('harbour')
  const reader = await new Reader(people[0]!, place).open()
  await reader.startThread('After you left.')
  await until(() => reader.line.heard.length > 0, 'the news on the pier')
  await line.look('harbour', null)
  expect(line.heard).toEqual([])
})
