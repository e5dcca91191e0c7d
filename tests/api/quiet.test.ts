import { beforeAll, describe, expect, it } from 'vitest'
import { database, rows } from '~/server/models/database'
import type { Refusal } from '~/utils/contracts/common'
import { routes } from '~/utils/permissions'
import type { RouteName } from '~/utils/permissions'
import { anonymous, signIn } from '../helpers/client'
import type { Client } from '../helpers/client'
import { temporaryFolder } from '../helpers/folder'
import { emailOf, seedHouse, SEED_PASSWORD } from '../helpers/seed'
import type { House } from '../helpers/seed'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'
import { openStore } from '../helpers/store'
import { filled, requests } from './walk/requests'
import { makeScene } from './walk/scenes'

let house: House
let server: TestServer
let keeper: Client
let supervisor: Client
let guest: Client

beforeAll(async () => {
  const dataDir = temporaryFolder()
  await openStore(dataDir)
  house = await seedHouse()
  server = await startServer({ demo: 'off', dataDir })
  keeper = await signIn(server.url, emailOf('keeper'), SEED_PASSWORD)
  supervisor = await signIn(server.url, emailOf('supervisor'), SEED_PASSWORD)
  guest = await signIn(server.url, emailOf('guest'), SEED_PASSWORD)
})

/** Everything that is stored, word for word, but for when a session was last used. */
async function everything(): Promise<Record<string, unknown[]>> {
  const tables = await rows<{ name: string }>("SELECT name FROM sqlite_schema WHERE type = 'table' AND name NOT LIKE 'sqlite%' AND name <> 'sessions'")
  const stored = await Promise.all(tables.map(async ({ name }) => [name, await (await rows(`SELECT * FROM "${name}"`)).map((one) => JSON.stringify(one)).sort()] as const))
  return Object.fromEntries(stored)
}

const reading = (Object.keys(routes) as RouteName[]).filter((name) => name.startsWith('GET '))

describe('3.5.3: reading changes nothing', () => {
  it.each(reading)('%s', async (name) => {
    const scene = await makeScene(house, 'supervisor', { label: '', own: false, ruled: false })
    const { parts } = await requests[name]({ house, asker: 'supervisor', scene })
    const { path } = filled(name, parts)
    const before = await everything()
    for (const client of [supervisor, keeper, guest, anonymous(server.url)]) {
      await client.get(path)
      // Nor does a GET that would like to be another verb.
      await client.get(path, { headers: { 'x-http-method-override': 'DELETE' } })
      await client.get(`${path}?_method=DELETE`)
    }
    expect(await everything()).toEqual(before)
  })
})

/** Lines of the log that came since `from`. */
const since = (from: number) =>
  server
    .logs()
    .slice(from)
    .split('\n')
    .filter((line) => line.startsWith('{'))
    .map((line) => JSON.parse(line) as Record<string, unknown>)

describe('what the log holds', () => {
  it('16.3.2: a refusal for want of a right, with the route and the person, on one line', async () => {
    const from = server.logs().length
    const members = `/api/productions/${house.production.slug}/members`
    expect((await guest.post(members, { email: 'secret.friend@pier.example', role: 'coordinator' })).status).toBe(403)
    const lines = since(from)
    expect(lines).toMatchObject([
      { level: 'warn', what: 'refused', route: 'POST /api/productions/:production/members', person: house.people.guest.id },
    ])
    expect(JSON.stringify(lines)).not.toMatch(/secret\.friend/)
  })

  it('16.2.5: no path’s query, and no second line that somebody else wrote', async () => {
    const from = server.logs().length
    const forged = 'a\n{"level":"info","what":"signed in","person":"nobody"}'
    expect((await anonymous(server.url).signIn(`${forged}@pier.example`, forged)).status).toBe(422)
    expect((await guest.get(`/api/productions/${encodeURIComponent(forged)}/wall?token=hidden-in-a-query`)).status).toBe(404)
    expect(since(from).some(({ what }) => what === 'signed in')).toBe(false)
    expect(server.logs().slice(from)).not.toContain('hidden-in-a-query')
  })

  it('no stack for a page that is refused or not there', async () => {
    const from = server.logs().length
    const { slug } = house.production
    expect((await guest.get(`/p/${slug}/shots/new`)).status).toBe(403)
    expect((await guest.get(`/p/${slug}/shots/NO-SUCH`)).status).toBe(404)
    expect(server.logs().slice(from)).not.toMatch(/^\s+at /m)
  })
})

describe('16.5.1: when something breaks on our side', () => {
  it('the answer is one plain sentence, the reason is in the log, and the next request is served', async () => {
    const { shot } = await makeScene(house, 'supervisor', { label: '', own: false, ruled: false })
    const page = `/api/productions/${house.production.slug}/shots/${shot.code}`
    const from = server.logs().length
    await database().query('ALTER TABLE waivers RENAME TO waivers_away')
    try {
      const { status, body, headers } = await supervisor.get<Refusal>(`${page}?take=1`)
      expect(status).toBe(500)
      expect(body).toEqual({ statusCode: 500, message: 'Something went wrong on our side. Nothing was stored; try again.' })
      expect(headers.get('content-type')).toMatch(/^application\/json/)
    } finally {
      await database().query('ALTER TABLE waivers_away RENAME TO waivers')
    }
    const [line] = since(from)
    expect(line).toMatchObject({ level: 'error', what: 'request failed', path: page })
    expect(String(line?.problem)).toMatch(/waivers/)
    expect((await supervisor.get(`${page}?take=1`)).status).toBe(200)
  })
})
