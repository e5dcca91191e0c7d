import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { v7 as uuid } from 'uuid'
import { rows, run, write } from '~/server/models/database'
import { addRuling, addShot, addTake, addThread, seedHouse } from '../../../helpers/seed'
import type { House } from '../../../helpers/seed'
import { openEmptyStore, rowCounts } from '../../../helpers/store'

/** The database defends itself, whatever a mistake of ours sends it. */

let close: () => Promise<void>
let house: House
const ids: Record<string, string> = {}

beforeAll(async () => {
  close = await openEmptyStore()
  house = await seedHouse()
  const shot = await addShot(house)
  const take = await addTake(shot, house.people.animator)
  const thread = await addThread(house.production, shot, house.people.animator, take)
  await addRuling(take, house.people.supervisor)
  Object.assign(ids, {
    person: house.people.animator.id, production: house.production.id, elsewhere: house.elsewhere.id,
    sequence: house.sequence.id, shot: shot.id, take: take.id, thread: thread.id, none: uuid(),
  })
})
afterAll(() => close())

/** A row as it is stored, with some columns changed. */
async function again(table: string, changes: Record<string, string | number | null>): Promise<number> {
  const [first] = await rows<Record<string, string | number | null>>(`SELECT * FROM "${table}" LIMIT 1`)
  const row = { ...first, ...changes }
  const names = Object.keys(row)
  return run(`INSERT INTO "${table}" (${names.join(', ')}) VALUES (${names.map((name) => `:${name}`).join(', ')})`, row)
}

/** What SQLite itself said: Sequelize calls a broken UNIQUE something else. */
async function complaint(attempt: Promise<unknown>): Promise<string> {
  const problem = await attempt.then(() => null, (one: Error & { parent?: Error }) => one)
  return problem ? String(problem.parent ?? problem) : 'nothing'
}

/** New values for the columns that must differ from row to row. */
const fresh = (table: string): Record<string, string | number> => {
  const own: Record<string, Record<string, string | number>> = {
    people: { email: `${uuid()}@pier.example` },
    shots: { client_id: uuid(), code: `N-${uuid().slice(-6)}` },
    takes: { client_id: uuid(), number: 77 },
    threads: { client_id: uuid() },
    comments: { client_id: uuid() },
    rulings: { client_id: uuid() },
    sequences: { code: uuid().slice(-6) },
  }
  return { id: uuid(), ...own[table] }
}

describe.each<[string, Record<string, string | number | null>, RegExp]>([
  ['people', { mail_wish: 'sometimes' }, /CHECK/],
  ['people', { keeper: 2 }, /CHECK/],
  ['people', { name: '' }, /CHECK/],
  ['people', { email: 'ANIMATOR@pier.example' }, /UNIQUE/],
  ['shots', { last_frame: 1 }, /CHECK/],
  ['shots', { fps: 0 }, /CHECK/],
  ['shots', { fps: 'NaN' }, /cannot store TEXT|datatype/i],
  ['shots', { claim: '{"law":' }, /CHECK/],
  ['shots', { due_on: 'tomorrow' }, /CHECK/],
  ['shots', { version: 0 }, /CHECK/],
  ['shots', { title: null }, /NOT NULL/],
  ['takes', { number: 1 }, /UNIQUE/],
  ['takes', { number: 0 }, /CHECK/],
  ['takes', { keys: 'not json' }, /CHECK/],
  ['takes', { verdict: 'maybe' }, /CHECK/],
  ['takes', { slop: -1 }, /CHECK/],
  ['takes', { tolerance: 1.5 }, /CHECK/],
  ['threads', { take_id: null, from_frame: null, to_frame: null }, /CHECK/],
  ['threads', { from_frame: 9, to_frame: 8 }, /CHECK/],
  ['threads', { from_frame: null }, /CHECK/],
  ['comments', { body: '' }, /CHECK/],
  ['rulings', {}, /UNIQUE/],
  ['rulings', { decision: 'maybe' }, /CHECK/],
  ['rulings', { reopened_at: '2026-12-01T00:00:00.000Z' }, /CHECK/],
])('%s with %o', (table, changes, problem) => {
  it(`is refused: ${problem.source}`, async () => {
    const before = await rowCounts()
    expect(await complaint(write(() => again(table, { ...fresh(table), ...changes })))).toMatch(problem)
    expect(await rowCounts()).toEqual(before)
  })
})

describe('foreign keys bite on every connection', () => {
  it.each([
    ['shots', 'animator_id'], ['takes', 'shot_id'], ['takes', 'person_id'], ['threads', 'take_id'],
    ['comments', 'thread_id'], ['rulings', 'take_id'], ['sequences', 'production_id'],
  ])('%s.%s must stand for something', async (table, column) => {
    const bad = { ...fresh(table), [column]: ids.none! }
    expect(await complaint(write(() => again(table, bad)))).toMatch(/FOREIGN KEY/)
    expect(await complaint(again(table, bad))).toMatch(/FOREIGN KEY/)
  })

  it('a shot stands in a sequence of its own production', async () => {
    expect(await complaint(again('shots', { ...fresh('shots'), production_id: ids.elsewhere! }))).toMatch(/FOREIGN KEY/)
  })

  it('somebody who posted or said something can’t be deleted from under it', async () => {
    expect(await complaint(run('DELETE FROM people WHERE id = :person', { person: ids.person! }))).toMatch(/FOREIGN KEY/)
  })

  it('one id of one author stands for one thing', async () => {
    const [comment] = await rows<{ client_id: string }>('SELECT client_id FROM comments LIMIT 1')
    expect(await complaint(again('comments', { id: uuid(), client_id: comment!.client_id }))).toMatch(/UNIQUE/)
  })

  it('an event number is given once per production', async () => {
    const event = { production: ids.production!, at: '2026-12-01T00:00:00.000Z' }
    const insert = () => run("INSERT INTO events (production_id, n, kind, created_at) VALUES (:production, 900, 'shot', :at)", event)
    await insert()
    expect(await complaint(insert())).toMatch(/UNIQUE/)
  })
})
