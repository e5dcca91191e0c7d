import { beforeAll, describe, expect, it } from 'vitest'
import { setTimeout as pause } from 'node:timers/promises'
import { openDatabase } from '~/server/models/database'
import type { Refusal } from '~/utils/contracts/common'
import type { Client } from '../helpers/client'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'
import { CHEAP_HASH, inStore, makeFirstKeeper, newColleague } from '../helpers/studio'

let server: TestServer
let keeper: Client
beforeAll(async () => {
  server = await startServer({ demo: 'off', env: CHEAP_HASH })
  keeper = await makeFirstKeeper(server.url)
})

/**
 * Sends a change while another process holds the database, and lets `meanwhile` happen before it has its turn: what the
 * server asked before the wait is no longer true after it.
 */
async function whileItWaits(send: () => Promise<{ status: number; body: unknown }>, meanwhile: string, id: string) {
  const sequelize = await openDatabase(server.dataDir)
  try {
    let answered: Promise<{ status: number; body: unknown }> | undefined
    await sequelize.transaction(async () => {
      answered = send()
      await pause(500)
      await sequelize.query(meanwhile, { bind: { id, at: new Date().toISOString() } })
    })
    return await answered!
  } finally {
    await sequelize.close()
  }
}
const nameOf = (id: string) =>
  inStore(server.dataDir, async ({ rows }) => (await rows<{ name: string }>('SELECT name FROM people WHERE id = :id', { id }))[0]?.name)

describe('a change that waited for its turn', () => {
  it('goes through when nothing happened meanwhile', async () => {
    const { client, id } = await newColleague(keeper)
    const { status } = await whileItWaits(() => client.patch('/api/me', { name: 'Patient', version: 1 }), 'UPDATE people SET name = name WHERE id = $id AND $at > 0', id)
    expect(status).toBe(200)
    expect(await nameOf(id)).toBe('Patient')
  })

  it.each([
    ['7.4.1: whose session ended meanwhile', 'UPDATE sessions SET ended_at = $at WHERE person_id = $id'],
    ['7.4.2: whose account was closed meanwhile', 'UPDATE people SET disabled_at = $at WHERE id = $id'],
  ])('%s is nobody’s any more', async (_, meanwhile) => {
    const { client, id } = await newColleague(keeper)
    const before = await nameOf(id)
    const { status, body } = await whileItWaits(() => client.patch('/api/me', { name: 'Too late', version: 1 }), meanwhile, id)
    expect(status).toBe(401)
    expect((body as Refusal).message).toBe('Sign in first.')
    expect(await nameOf(id)).toBe(before)
  })

  it('8.3.2: of somebody who is no keeper any more finds nothing', async () => {
    const { client, id } = await newColleague(keeper, { keeper: true })
    const { status } = await whileItWaits(
      () => client.post('/api/productions', { slug: 'too-late', title: 'Too late' }),
      'UPDATE people SET keeper = 0 WHERE id = $id AND $at > 0',
      id,
    )
    expect(status).toBe(404)
    expect(await inStore(server.dataDir, ({ rows }) => rows("SELECT id FROM productions WHERE slug = 'too-late'"))).toEqual([])
  })
})
