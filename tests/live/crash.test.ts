import { beforeAll, expect, it } from 'vitest'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'
import { House } from './house'
import type { Person } from './house'
import { pause, until } from './line'
import { Reader } from './reader'

let server: TestServer
let house: House
let people: Person[]
const place = { production: 'pier', shot: 'PIR-010' }
const EACH = 30

beforeAll(async () => {
  server = await startServer({ demo: 'off' })
  house = new House(server)
  const pier = await house.production('pier', ['PIR-010'])
  people = [
    await house.person('Ada Lund', { [pier]: 'animator' }),
    await house.person('Bo Reis', { [pier]: 'supervisor' }),
    await house.person('Cleo Marsh', { [pier]: 'guest' }),
  ]
  return () => house.close()
})

it('loses and doubles nothing when the server is killed in the middle of a conversation, twice', async () => {
  const readers = await Promise.all(people.map((person, i) => new Reader(person, place, i === 2 ? 'polling' : 'websocket').open()))
  const thread = await readers[0]!.startThread('begins')

  let said = 0
  const talking = readers.map(async (reader) => {
    const answered: string[] = []
    for (let i = 0; i < EACH; i += 1) {
      const { comment } = await reader.say(thread.id, `${reader.person.name} ${i}`)
      answered.push(comment.id)
      said += 1
      await pause(15)
    }
    return answered
  })
  for (const moment of [20, 55]) {
    await until(() => said >= moment, `comment ${moment}`, 30_000)
    // No word of warning: whatever was under way is cut in two.
    await server.kill('SIGKILL')
    await pause(300)
    await server.restart()
  }
  const answered = (await Promise.all(talking)).flat()
  expect(answered).toHaveLength(EACH * 3)

  const total = EACH * 3 + 1
  const stored = await house.rows<{ id: string; body: string }>('SELECT id, body FROM comments ORDER BY event_number')
  // Every comment that was answered for is there, and none that was repeated is there twice.
  expect(new Set(stored.map(({ id }) => id))).toEqual(new Set([...answered, stored[0]!.id]))
  expect(new Set(stored.map(({ body }) => body)).size).toBe(total)
  for (const reader of readers) {
    await until(() => reader.comments.length >= total, `${reader.person.name} to have everything`, 20_000)
    expect(reader.comments.map(({ id }) => id)).toEqual(stored.map(({ id }) => id))
    expect(reader.events.map(({ n }) => n)).toEqual(Array.from({ length: total }, (_, i) => i + 1))
  }
})

it('stops in good order while people are connected', async () => {
  const readers = await Promise.all(people.map((person, i) => new Reader(person, place, i === 2 ? 'polling' : 'websocket').open()))
  expect(readers.map(({ line }) => line.socket.connected)).toEqual([true, true, true])
  // Not forced: it ended by itself before the helper's patience did.
  const ended = await server.stop()
  expect(ended.forced).toBe(false)
})
