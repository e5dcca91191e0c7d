import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { v7 as uuid } from 'uuid'
import { rows, run, write } from '~/server/models/database'
import { clearOldSessions } from '~/server/services/housekeeping'
import { seedHouse } from '../../../helpers/seed'
import type { House } from '../../../helpers/seed'
import { openEmptyStore } from '../../../helpers/store'

const DAY = 24 * 60 * 60 * 1000
const NOW = Date.UTC(2030, 0, 1)
let close: () => Promise<void>
let house: House

beforeAll(async () => {
  close = await openEmptyStore()
  house = await seedHouse()
})
afterAll(() => close())

/** A session by how many days ago it began, was last seen and was ended. */
async function session(personId: string, created: number, seen: number, ended: number | null): Promise<string> {
  const id = uuid()
  const at = (days: number) => new Date(NOW - days * DAY).toISOString()
  await write(() =>
    run('INSERT INTO sessions (id, token_hash, person_id, created_at, seen_at, ended_at) VALUES (:id, :id, :personId, :created, :seen, :ended)', {
      id, personId, created: at(created), seen: at(seen), ended: ended === null ? null : at(ended),
    }),
  )
  return id
}
const left = async () => (await rows<{ id: string }>('SELECT id FROM sessions')).map(({ id }) => id)

describe('old sessions', () => {
  it('go a month after they are over, and never the one that says when somebody was last here', async () => {
    const { animator, supervisor } = house.people
    const now = await session(animator.id, 5, 0, null)
    const endedLately = await session(animator.id, 12, 11, 10)
    const endedLong = await session(animator.id, 50, 41, 40)
    const idleLong = await session(animator.id, 100, 90, null)
    const onlyOne = await session(supervisor.id, 400, 390, 390)
    expect(await clearOldSessions(NOW)).toBe(2)
    const kept = await left()
    for (const id of [now, endedLately, onlyOne]) expect(kept).toContain(id)
    for (const id of [endedLong, idleLong]) expect(kept).not.toContain(id)
    expect(await clearOldSessions(NOW)).toBe(0)
  })
})
