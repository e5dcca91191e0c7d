import { v7 as uuid } from 'uuid'
import { expect } from 'vitest'
import { DEMO_PASSWORD, signIn } from '../helpers/client'
import type { Client } from '../helpers/client'
import { swung } from '../bench/lists/motion'
import type { Claim, Production } from '~/utils/contracts/production'

/**
 * The shot that the day is about: a 38 m clock tower that goes over, drawn with the time of a toy. The list comes from
 * the integrator of the test lists, which shares nothing with the judge.
 */

export const PRODUCTION = 'quayside-giants'
export const as = (url: string, role: string): Promise<Client> => signIn(url, `${role}@quayside.example`, DEMO_PASSWORD)

export const towerClaim: Claim = {
  law: 'topple', measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1,
  subject: { shape: 'block', width: 6, height: 38 },
}
/** Standard gravity, 3rd CGPM 1901; equal-pendulum length of a block over its edge, ⅔·√(w²+h²) (any mechanics textbook). */
const GRAVITY = 9.80665
const equalLength = (width: number, height: number) => (2 / 3) * Math.hypot(width, height)

/** Drawings on twos of a block like the tower, but `height` metres tall, from 1.5° past balance until it lies; read to a tenth of a degree. */
export function tippingList(height: number): { frame: number; reading: number }[] {
  const kSquared = GRAVITY / equalLength((6 / 38) * height, height)
  const angles = swung(1, kSquared, (1.5 * Math.PI) / 180, 0, 24, 400).map((radians) => (radians * 180) / Math.PI)
  const keys = []
  for (let frame = 0; frame < angles.length && angles[frame]! <= 90; frame += 2) keys.push({ frame: frame + 1, reading: Math.round(angles[frame]! * 10) / 10 })
  return keys
}

/** Two columns, as a sheet puts them on the clipboard. */
export const asColumns = (keys: readonly { frame: number; reading: number }[]) =>
  ['frame\tdegrees', ...keys.map(({ frame, reading }) => `${frame}\t${reading}`)].join('\n')

/** A shot of the clock-tower sequence for the demo's animator and supervisor, claimed as the tower unless told otherwise. */
export async function hangTower(url: string, code: string, claim: Claim = towerClaim): Promise<void> {
  const coordinator = await as(url, 'coordinator')
  const { body: production } = await coordinator.get<Production>(`/api/productions/${PRODUCTION}`)
  const who = (role: string) => production.members.find((member) => member.role === role)?.id
  const [animator, supervisor] = [await as(url, 'animator'), await as(url, 'supervisor')]
  expect(who('animator')).toBeDefined()
  const made = await coordinator.post(`/api/productions/${PRODUCTION}/shots`, {
    clientId: uuid(), code, title: 'The tower goes over at dawn', sequence: 'CLK', firstFrame: 1, lastFrame: 200, fps: 24,
    brief: 'It must read as **big**.', dueOn: null, animator: animator.me?.id, supervisor: supervisor.me?.id,
  })
  expect(made.status).toBe(201)
  const { version } = made.body as { version: number }
  const claimed = await supervisor.put(`/api/productions/${PRODUCTION}/shots/${code}/claim`, { claim, version })
  expect(claimed.status).toBe(200)
}
