import { beforeAll, expect, it } from 'vitest'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'
import { House } from './house'
import type { Person } from './house'
import { pause, until } from './line'
import { Reader, seeded } from './reader'

const CLIENTS = 8
const EACH = 25
const TOTAL = CLIENTS * EACH
const SEED = 20261201

let server: TestServer
let house: House
let people: Person[]
const place = { production: 'pier', shot: 'PIR-010' }

beforeAll(async () => {
  server = await startServer({ demo: 'off' })
  house = new House(server)
  const pier = await house.production('pier', ['PIR-010'])
  people = []
  for (let i = 0; i < CLIENTS; i += 1) people.push(await house.person(`Person ${i}`, { [pier]: 'animator' }))
  return () => house.close()
})

it(`brings the same ${TOTAL} comments, once and in the same order, to ${CLIENTS} clients whose lines are cut at random`, async () => {
  const random = seeded(SEED)
  const readers = await Promise.all(people.map((person, i) => new Reader(person, place, i % 4 === 3 ? 'polling' : 'websocket').open()))
  const starter = await readers[0]!.startThread('begins')
  const first = starter.comments[0]!.id

  let talking = true
  let cuts = 0
  const cutting = (async () => {
    while (talking) {
      const { line } = readers[random(CLIENTS)]!
      if (line.socket.connected) {
        line.cut()
        cuts += 1
      }
      await pause(10 + random(40))
    }
  })()

  let repeats = 0
  // One answer in three is lost, at some moment from before the request is read to after it was stored.
  const lose = () => (random(3) === 0 ? 1 + random(25) : null)
  const answered = await Promise.all(
    readers.map(async (reader) => {
      const ids: string[] = []
      for (let i = 0; i < EACH; i += 1) {
        const { comment, sent } = await reader.say(starter.id, `${reader.person.name}, ${i}`, lose)
        repeats += sent - 1
        ids.push(comment.id)
        await pause(random(30))
      }
      return ids
    }),
  )
  talking = false
  await cutting

  // The test is worth something only if it did what its name says.
  expect(cuts).toBeGreaterThan(40)
  expect(repeats).toBeGreaterThan(20)
  const stored = await house.rows<{ id: string }>('SELECT id FROM comments WHERE id <> ? ORDER BY event_number', first)
  expect(stored).toHaveLength(TOTAL)
  expect(new Set(stored.map(({ id }) => id))).toEqual(new Set(answered.flat()))
  for (const reader of readers) {
    await until(() => reader.comments.length > TOTAL, `${reader.person.name} to have everything`, 20_000)
    expect(reader.comments.map(({ id }) => id)).toEqual([first, ...stored.map(({ id }) => id)])
    expect(reader.events.map(({ n }) => n)).toEqual(Array.from({ length: TOTAL + 1 }, (_, i) => i + 1))
  }
  // Each one's own comments stand in the order in which they were said.
  for (const [i, ids] of answered.entries()) {
    const mine = stored.filter(({ id }) => ids.includes(id)).map(({ id }) => id)
    expect(mine, `the order of ${people[i]!.name}`).toEqual(ids)
  }
})
