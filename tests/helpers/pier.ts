import { expect } from 'vitest'
import type { Shot } from '~/server/models'
import { signIn } from './client'
import type { Client } from './client'
import { temporaryFolder } from './folder'
import { addShot, cast, emailOf, seedHouse, SEED_PASSWORD } from './seed'
import type { Cast, House, ShotWishes } from './seed'
import { startServer } from './server'
import { openStore } from './store'

/** A seeded house behind a running server, and the people who are signed in to it. */
export interface Pier {
  house: House
  as: Record<Cast, Client>
  /** The production's address. */
  here: string
  shot: (wishes?: ShotWishes) => Promise<{ shot: Shot; base: string }>
}

/** `who` signs in; the others are there without a browser. */
export async function openPier(who: readonly Cast[] = cast): Promise<Pier> {
  const dataDir = temporaryFolder()
  await openStore(dataDir)
  const house = await seedHouse()
  const { url } = await startServer({ demo: 'off', dataDir })
  const as = {} as Record<Cast, Client>
  for (const one of who) as[one] = await signIn(url, emailOf(one), SEED_PASSWORD)
  const here = `/api/productions/${house.production.slug}`
  const shot = async (wishes?: ShotWishes) => {
    const made = await addShot(house, wishes)
    return { shot: made, base: `${here}/shots/${made.code}` }
  }
  return { house, as, here, shot }
}

/** The body of an answer with the status that was expected. */
export async function ok<T>(answer: Promise<{ status: number; body: unknown }>, status: number): Promise<T> {
  const { body, ...rest } = await answer
  expect(rest.status, JSON.stringify(body)).toBe(status)
  return body as T
}
