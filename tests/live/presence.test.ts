import { beforeAll, expect, it } from 'vitest'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'
import { House } from './house'
import type { Person } from './house'
import { Line, until } from './line'

let server: TestServer
let house: House
let ada: Person
let bo: Person

beforeAll(async () => {
  server = await startServer({ demo: 'off' })
  house = new House(server)
  const pier = await house.production('pier', ['PIR-010', 'PIR-020'])
  ada = await house.person('Ada Lund', { [pier]: 'animator' })
  bo = await house.person('Bo Reis', { [pier]: 'supervisor' })
  return () => house.close()
})

async function follow(cookie: string) {
  const line = await new Line(server.url, { cookie }).open()
  await line.watch('pier')
  return line
}
const seenBy = (line: Line) => line.presences.at(-1)?.lookers.map(({ person, shot }) => `${person.name} on ${shot}`)
const sees = (line: Line, ...what: string[]) => until(() => JSON.stringify(seenBy(line)) === JSON.stringify(what), what.join(' and ') || 'nobody')

it('shows who looks at which shot, and that they left', async () => {
  const [here, there] = [await follow(bo.cookie), await follow(ada.cookie)]
  await there.look('pier', 'PIR-010')
  await sees(here, 'Ada Lund on PIR-010')
  await here.look('pier', 'PIR-010')
  await sees(there, ...['Ada Lund on PIR-010', 'Bo Reis on PIR-010'].sort((a) => (a.startsWith(ada.id < bo.id ? 'Ada' : 'Bo') ? -1 : 1)))
  await here.look('pier', null)
  await there.look('pier', 'PIR-020')
  await sees(here, 'Ada Lund on PIR-020')
  there.cut()
  await sees(here)
})

it('tells a newcomer at once, names two windows of one person once, and says no more of a person than the name', async () => {
  const windows = [await follow(ada.cookie), await follow((await house.session(ada.id)).cookie)] as const
  await windows[0].look('pier', 'PIR-010')
  await windows[1].look('pier', 'PIR-010')
  const newcomer = await follow(bo.cookie)
  await sees(newcomer, 'Ada Lund on PIR-010')
  expect(newcomer.presences.at(-1)?.lookers).toEqual([{ person: { id: ada.id, name: 'Ada Lund' }, shot: 'PIR-010' }])
  windows[0].socket.disconnect()
  await windows[1].look('pier', 'PIR-020')
  await sees(newcomer, 'Ada Lund on PIR-020')
  windows[1].socket.disconnect()
  await sees(newcomer)
})

it('is gone when the page turns to another production', async () => {
  const harbour = await house.production('harbour')
  await house.run(
    'INSERT INTO memberships (production_id, person_id, role, created_at) VALUES (?, ?, ?, ?)',
    ...[harbour, ada.id, 'guest', new Date().toISOString()],
  )
  const [here, there] = [await follow(bo.cookie), await follow(ada.cookie)]
  await there.look('pier', 'PIR-010')
  await sees(here, 'Ada Lund on PIR-010')
  await there.watch('harbour')
  await sees(here)
})
