import { afterAll, beforeAll, expect, it, vi } from 'vitest'
import { run } from '~/server/models/database'
import { sweep } from '~/server/services/live/rooms'
import type { LiveSocket } from '~/server/services/live/types'
import { hashSecret } from '~/server/utils/secret'
import { openEmptyStore } from '../../helpers/store'

// The sealed cookie's package runs in Nuxt only.
vi.mock('#sealed-cookie', () => ({ clearUserSession: vi.fn(), getUserSession: vi.fn(), setUserSession: vi.fn() }))

let close: () => Promise<void>
const days = (count: number) => new Date(Date.now() - count * 24 * 60 * 60 * 1000).toISOString()
const people = { awake: null, away: days(1) }

beforeAll(async () => {
  close = await openEmptyStore()
  for (const [id, disabledAt] of Object.entries(people))
    await run('INSERT INTO people (id, email, name, disabled_at, created_at) VALUES (:id, :email, :id, :disabledAt, :at)', {
      ...{ id, email: `${id}@pier.example`, disabledAt, at: days(99) },
    })
})
afterAll(() => close())

async function session(token: string, { person = 'awake', seenAt = days(0), createdAt = days(0), endedAt = null as string | null } = {}) {
  await run(
    `INSERT INTO sessions (id, token_hash, person_id, created_at, seen_at, ended_at)
     VALUES (:token, :hash, :person, :createdAt, :seenAt, :endedAt)`,
    { token, hash: hashSecret(token), person, createdAt, seenAt, endedAt },
  )
}
function socketWith(token: string) {
  const socket = { data: { token }, emit: vi.fn(), disconnect: vi.fn() }
  return { ...socket, whole: socket as unknown as LiveSocket }
}

// ASVS 5.0.0 7.3.1, 7.3.2 for a socket that nobody says anything on.
it('cuts the sockets whose session ended without a word, and leaves the others', async () => {
  await session('good')
  await session('nearly idle', { seenAt: days(13), createdAt: days(29) })
  await session('idle', { seenAt: days(15), createdAt: days(15) })
  await session('old', { createdAt: days(31) })
  await session('ended', { endedAt: days(0) })
  await session('of someone disabled', { person: 'away' })
  const tokens = ['good', 'nearly idle', 'idle', 'old', 'ended', 'of someone disabled', 'renewed since']
  const sockets = [...tokens, 'good'].map(socketWith)
  await sweep(sockets.map(({ whole }) => whole))
  const cut = sockets.filter(({ disconnect }) => disconnect.mock.calls.length > 0).map(({ data }) => data.token)
  expect(cut).toEqual(['idle', 'old', 'ended', 'of someone disabled', 'renewed since'])
  for (const { emit, disconnect } of sockets.slice(2, 7)) {
    expect(emit).toHaveBeenCalledExactlyOnceWith('dismissed', { reason: 'session' })
    expect(disconnect).toHaveBeenCalledExactlyOnceWith(true)
  }
})

it('asks nothing when nobody is there', async () => {
  await expect(sweep([])).resolves.toBeUndefined()
})
