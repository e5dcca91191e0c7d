/** Requests per second of the wall's route with 400 shots, against a bare handler with the same statements, same run. */
import { randomUUID } from 'node:crypto'
import { join } from 'node:path'
import autocannon from 'autocannon'
import { closeDatabase, database, openDatabase } from '../../server/models/database'
import { initModels, Production } from '../../server/models'
import { wall } from '../../server/services/wall'
import type { Wall } from '../../utils/contracts/production'
import { startServer, stopServers } from '../helpers/server'
import { House } from '../live/house'
import { median, startBare } from './bare/start'

const SHOTS = 400
const ROUNDS = 3
const SECONDS = 4
const CONNECTIONS = 8
const claim = { law: 'topple', measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1, subject: { shape: 'block', width: 9, height: 38 } }

interface Statement {
  sql: string
  bind: Record<string, unknown>
}

export default async function run(): Promise<void> {
  const server = await startServer({ demo: 'off' })
  const house = new House(server)
  const { id, cookie } = await fill(house)
  await house.close()

  const statements = await statementsOf(server.dataDir, id)
  const bare = await startBare('wall', join(server.dataDir, 'tiltyard.sqlite'), JSON.stringify(statements))
  const route = `${server.url}/api/productions/harbour/wall`
  const bytes = await size(route, cookie)

  const rates = { route: [] as number[], bare: [] as number[] }
  // Turn by turn, so that whatever else the machine does meanwhile meets both.
  for (let round = 0; round < ROUNDS; round += 1) {
    rates.bare.push(await rate(bare.url))
    rates.route.push(await rate(route, cookie))
  }
  bare.stop()
  await stopServers()

  const [ours, theirs] = [median(rates.route), median(rates.bare)]
  console.log(
    [
      `the wall with ${SHOTS} shots, ${Math.round(bytes / 1024)} kB a time; ${CONNECTIONS} connections, ${ROUNDS} × ${SECONDS} s each, medians`,
      `bare handler, same ${statements.length} statements   ${theirs.toFixed(1).padStart(8)} requests per second`,
      `the wall's route                  ${ours.toFixed(1).padStart(8)} requests per second`,
      `ratio                             ${(ours / theirs).toFixed(2).padStart(8)}`,
    ].join('\n'),
  )
}

/** A production of 400 shots, each with a take on twos, three in four of them ruled on. */
async function fill(house: House): Promise<{ id: string; cookie: string }> {
  const codes = Array.from({ length: SHOTS }, (_, i) => `PIR-${String(i + 1).padStart(4, '0')}`)
  await house.run('BEGIN')
  const id = await house.production('harbour', codes)
  const person = await house.person('Ines Ferro', { [id]: 'supervisor' })
  await house.run('UPDATE shots SET animator_id = ?, supervisor_id = ?, claim = ?', person.id, person.id, JSON.stringify(claim))
  const at = new Date().toISOString()
  for (const [i, shot] of (await house.rows<{ id: string }>('SELECT id FROM shots ORDER BY position')).entries()) {
    const marks = Array.from({ length: 24 }, (_, k) => ({ frame: 1 + 2 * k, reading: 1.5 + k * k * 0.16, law: 1.5 + k * k * 0.155, breaks: k === 17 }))
    const sketch = { number: 1, verdict: 'breaks', headline: 'Frame 35 lands 0.8 frame early.', drawings: 24, marks }
    const take = randomUUID()
    await house.run(
      `INSERT INTO takes (id, client_id, shot_id, number, keys, unit, slop, tolerance, fps, claim, person_id,
                          created_at, answer, verdict, judge_version, sketch)
       VALUES (?, ?, ?, 1, '[]', 'deg', 0.3, 0.1, 24, ?, ?, ?, '{}', 'breaks', 'bench', ?)`,
      ...[take, randomUUID(), shot.id, JSON.stringify(claim), person.id, at, JSON.stringify(sketch)],
    )
    if (i % 4 === 0) continue
    await house.run(
      'INSERT INTO rulings (id, client_id, take_id, decision, person_id, created_at) VALUES (?, ?, ?, ?, ?, ?)',
      ...[randomUUID(), randomUUID(), take, i % 2 ? 'stands' : 'goes-back', person.id, at],
    )
  }
  await house.run('COMMIT')
  return { id, cookie: person.cookie }
}

/** The very statements that the wall's service runs, caught while it runs once. */
async function statementsOf(dataDir: string, id: string): Promise<Statement[]> {
  const sequelize = await openDatabase(dataDir)
  initModels(sequelize)
  const production = await Production.findByPk(id)
  if (!production) throw new Error('The production was not stored.')
  const caught: Statement[] = []
  // Sequelize's types hide its options; that it tells every statement to `logging` is documented.
  const { options } = database() as unknown as { options: { logging: (text: string, query: Partial<Statement>) => void } }
  options.logging = (text, { bind = {} }) => {
    caught.push({ sql: text.replace(/^Executing \([^)]*\): /, ''), bind })
  }
  const { sheets } = await wall(production)
  await closeDatabase()
  if (sheets.length !== SHOTS || sheets.some(({ sketch }) => sketch === null)) throw new Error('The wall is not whole.')
  return caught
}

async function size(url: string, cookie: string): Promise<number> {
  const answer = await fetch(url, { headers: { cookie } })
  const text = await answer.text()
  const { sheets } = JSON.parse(text) as Wall
  if (answer.status !== 200 || sheets.length !== SHOTS) throw new Error(`The wall answered ${answer.status}.`)
  return text.length
}

async function rate(url: string, cookie = ''): Promise<number> {
  const headers = { cookie }
  await autocannon({ url, headers, connections: CONNECTIONS, amount: CONNECTIONS * 4 })
  const result = await autocannon({ url, headers, connections: CONNECTIONS, duration: SECONDS })
  if (result.non2xx > 0 || result.errors > 0) throw new Error(`${url}: ${result.non2xx} refused, ${result.errors} failed.`)
  return result.requests.average
}
