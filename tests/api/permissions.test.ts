import { beforeAll, describe, expect, it } from 'vitest'
import type { Refusal } from '~/utils/contracts/common'
import { routes } from '~/utils/permissions'
import type { RouteName } from '~/utils/permissions'
import { anonymous, signIn } from '../helpers/client'
import type { Client } from '../helpers/client'
import { emailOf, seedHouse, SEED_PASSWORD } from '../helpers/seed'
import type { House } from '../helpers/seed'
import { startServer } from '../helpers/server'
import { openStore, rowCounts } from '../helpers/store'
import { temporaryFolder } from '../helpers/folder'
import { filled, requests } from './walk/requests'
import { askers, makeScene, refusalFor, scenesFor } from './walk/scenes'
import type { Asker } from './walk/scenes'

/** Covers 8.2.1 and 8.2.2: every role × every route × whose thing it is, from the table that the server itself asks. */

let house: House
const clients = {} as Record<Asker, Client>

beforeAll(async () => {
  const dataDir = temporaryFolder()
  await openStore(dataDir)
  house = await seedHouse()
  const { url } = await startServer({ demo: 'off', dataDir })
  for (const asker of askers) clients[asker] = asker === 'signedOut' ? anonymous(url) : await signIn(url, emailOf(asker), SEED_PASSWORD)
})

/** One request of one asker in one scene, with what was stored by it. */
async function ask(name: RouteName, asker: Asker, wish: ReturnType<typeof scenesFor>[number]) {
  const scene = await makeScene(house, asker, wish)
  const prepared = await requests[name]({ house, asker, scene })
  const { verb, path } = filled(name, prepared.parts)
  const before = await rowCounts(['sessions'])
  const answer = await clients[asker].send<Refusal>(verb, path, prepared.body)
  return { answer, passes: prepared.passes, before, after: await rowCounts(['sessions']) }
}

describe.each(Object.keys(routes) as RouteName[])('%s', (name) => {
  for (const wish of scenesFor(name)) {
    const refused = askers.filter((asker) => refusalFor(name, asker, wish) !== null)
    const passing = askers.filter((asker) => refusalFor(name, asker, wish) === null)
    const thing = scenesFor(name).length > 1 ? ` (${wish.label})` : ''

    if (refused.length > 0)
      it(`refuses ${refused.join(', ')}${thing}`, async () => {
        for (const asker of refused) {
          const { answer, before, after } = await ask(name, asker, wish)
          expect(answer.status, asker).toBe(refusalFor(name, asker, wish))
          expect(Object.keys(answer.body).sort(), asker).toEqual(['message', 'statusCode'])
          expect(answer.body.statusCode, asker).toBe(answer.status)
          expect(after, `${asker} left something behind`).toEqual(before)
        }
      })

    if (passing.length > 0)
      it(`lets ${passing.join(', ')} pass${thing}`, { timeout: 60_000 }, async () => {
        for (const asker of passing) {
          const { answer, passes } = await ask(name, asker, wish)
          expect(answer.status, `${asker}: ${JSON.stringify(answer.body)}`).toBe(passes)
          if (name === 'DELETE /api/session' && asker !== 'signedOut') await clients[asker].signIn(emailOf(asker), SEED_PASSWORD)
          if (name === 'POST /api/session' && asker === 'signedOut') clients.signedOut = anonymous(clients.signedOut.url)
        }
      })
  }
})

describe('a role is read afresh', () => {
  it('8.3.2: works at once when it changes, and a removed member finds nothing any more', async () => {
    const wall = `/api/productions/${house.production.slug}/wall`
    const members = `/api/productions/${house.production.slug}/members`
    const { otherAnimator, coordinator } = clients
    const id = house.people.otherAnimator.id
    expect((await otherAnimator.post(`${members}`, { email: 'nobody@pier.example', role: 'guest' })).status).toBe(403)
    expect((await coordinator.patch(`${members}/${id}`, { role: 'coordinator', version: 1 })).status).toBe(200)
    expect((await otherAnimator.post(`${members}`, { email: 'nobody@pier.example', role: 'guest' })).status).toBe(422)
    expect((await coordinator.delete(`${members}/${id}`)).status).toBe(204)
    expect((await otherAnimator.get(wall)).status).toBe(404)
    expect((await otherAnimator.get('/api/productions/never-was/wall')).body).toEqual((await otherAnimator.get(wall)).body)
  })
})
