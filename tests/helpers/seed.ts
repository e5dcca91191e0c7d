import { randomBytes, scryptSync } from 'node:crypto'
import { v4, v7 as uuid } from 'uuid'
import { Comment, Flag, Membership, Person, Production, Ruling, Sequence, Shot, Take, Thread, Waiver } from '~/server/models'
import { takeNumber } from '~/server/services/events'
import { makeSketch } from '~/server/services/sketch'
import { write } from '~/server/models/database'
import type { Claim, Decision } from '~/utils/contracts/production'
import { requestFor } from '~/utils/contracts/check'
import { judge } from '~/utils/motion'
import type { Key } from '~/utils/motion/types'
import type { Role } from '~/utils/permissions'

/** Everybody of a seeded house signs in with it. */
export const SEED_PASSWORD = 'lanterns on the long pier'

const castOf = {
  guest: { role: 'guest' },
  animator: { role: 'animator' },
  otherAnimator: { role: 'animator' },
  supervisor: { role: 'supervisor' },
  otherSupervisor: { role: 'supervisor' },
  coordinator: { role: 'coordinator' },
  /** Administers the installation and is a member of nothing. */
  keeper: { role: null },
  /** Member of another production only. */
  outsider: { role: null },
} as const satisfies Record<string, { role: Role | null }>

export type Cast = keyof typeof castOf
export const cast = Object.keys(castOf) as Cast[]

export interface House {
  production: Production
  sequence: Sequence
  /** Another production, whose only member is `outsider`. */
  elsewhere: Production
  people: Record<Cast, Person>
}

export const emailOf = (who: Cast) => `${who.toLowerCase()}@pier.example`

/** As many people as there are roles and ways of being none, in two productions. The store must be open. */
export async function seedHouse(): Promise<House> {
  const passwordHash = hash(SEED_PASSWORD)
  return write(async () => {
    const createdAt = now()
    const people = {} as Record<Cast, Person>
    const production = await Production.create({ id: uuid(), slug: 'long-pier', title: 'The Long Pier', createdAt })
    const elsewhere = await Production.create({ id: uuid(), slug: 'elsewhere', title: 'Elsewhere', createdAt })
    for (const who of cast) {
      people[who] = await Person.create({ id: uuid(), email: emailOf(who), name: nameOf(who), passwordHash, keeper: who === 'keeper', createdAt })
      const { role } = castOf[who]
      if (role) await Membership.create({ productionId: production.id, personId: people[who].id, role, createdAt })
    }
    await Membership.create({ productionId: elsewhere.id, personId: people.outsider.id, role: 'supervisor', createdAt })
    const sequence = await Sequence.create({ id: uuid(), productionId: production.id, code: 'PIR', title: 'The pier', position: 10 })
    await Sequence.create({ id: uuid(), productionId: elsewhere.id, code: 'FAR', title: 'Far away', position: 10 })
    return { production, elsewhere, sequence, people }
  })
}

const nameOf = (who: Cast) => `Seeded ${who.replace(/[A-Z]/, (letter) => ` ${letter.toLowerCase()}`)}`

export const fallClaim: Claim = { law: 'odd-rule', measure: 'distance', unit: 'px', slop: 0.5, tolerance: 0.1 }

/** A fall from rest on twos, in pixels, that the judge finds nothing wrong with. */
export const fall = (drawings = 12, first = 1001): Key[] =>
  Array.from({ length: drawings }, (_, i) => ({ frame: first + 2 * i, reading: Math.round(15 * i * i) / 10 }))

/** The same with one drawing off the line. */
export const brokenFall = (drawings = 12): Key[] =>
  fall(drawings).map((key, i) => (i === 7 ? { ...key, reading: key.reading + 12 } : key))

let shots = 0

export interface ShotWishes {
  code?: string
  animator?: Person | null
  supervisor?: Person | null
  claim?: Claim | null
}

export function addShot({ production, sequence, people }: House, wishes: ShotWishes = {}): Promise<Shot> {
  shots += 1
  return Shot.create({
    id: uuid(),
    clientId: v4(),
    productionId: production.id,
    sequenceId: sequence.id,
    code: wishes.code ?? `PIR-${String(shots).padStart(4, '0')}`,
    title: 'A crate goes off the pier',
    firstFrame: 1001,
    lastFrame: 1100,
    fps: 24,
    brief: 'It has weight.',
    position: shots * 10,
    animatorId: wishes.animator === undefined ? people.animator.id : (wishes.animator?.id ?? null),
    supervisorId: wishes.supervisor === undefined ? people.supervisor.id : (wishes.supervisor?.id ?? null),
    claim: wishes.claim === undefined ? fallClaim : wishes.claim,
    createdBy: people.coordinator.id,
    createdAt: now(),
  })
}

export interface TakeWishes {
  number?: number
  keys?: Key[]
  withdrawn?: boolean
}

/** A take judged by the real judge, put straight into the store. */
export function addTake(shot: Shot, by: Person, { number = 1, keys = brokenFall(), withdrawn = false }: TakeWishes = {}): Promise<Take> {
  const claim = shot.claim ?? fallClaim
  const answer = judge(requestFor(claim, shot.fps, keys))
  const at = now()
  return Take.create({
    id: uuid(),
    clientId: v4(),
    shotId: shot.id,
    number,
    keys,
    unit: claim.unit,
    slop: claim.slop,
    tolerance: claim.tolerance,
    fps: shot.fps,
    claim,
    note: '',
    personId: by.id,
    createdAt: at,
    withdrawnAt: withdrawn ? at : null,
    answer,
    verdict: answer.verdict,
    judgeVersion: 'seed',
    sketch: makeSketch(number, answer, claim),
  })
}

export const addRuling = (take: Take, by: Person, decision: Decision = 'goes-back'): Promise<Ruling> =>
  Ruling.create({ id: uuid(), clientId: v4(), takeId: take.id, decision, note: '', personId: by.id, createdAt: now() })

export const addFlag = (take: Take, by: Person): Promise<Flag> =>
  Flag.create({ id: uuid(), clientId: v4(), takeId: take.id, fromFrame: 1015, toFrame: 1015, reason: 'Too far.', personId: by.id, createdAt: now() })

export const addWaiver = (take: Take, by: Person): Promise<Waiver> =>
  Waiver.create({
    id: uuid(),
    clientId: v4(),
    takeId: take.id,
    finding: { kind: 'misplaced', frames: [1015] },
    reason: 'Meant.',
    personId: by.id,
    createdAt: now(),
  })

/** A thread with its first comment, numbered as any other but without an event. */
export function addThread(production: Production, shot: Shot, by: Person, take: Take | null = null): Promise<Thread> {
  return write(async () => {
    const thread = await Thread.create({
      id: uuid(),
      clientId: v4(),
      shotId: shot.id,
      takeId: take?.id ?? null,
      fromFrame: 1015,
      toFrame: 1015,
      personId: by.id,
      createdAt: now(),
    })
    await Comment.create({
      id: uuid(),
      clientId: v4(),
      threadId: thread.id,
      eventNumber: await takeNumber(production),
      body: 'Why so far?',
      personId: by.id,
      createdAt: now(),
    })
    return thread
  })
}

const now = () => new Date().toISOString()

/** As server/utils/password.ts hashes at today's cost: sign-in would otherwise hash once more. */
function hash(password: string): string {
  const salt = randomBytes(16)
  const key = scryptSync(password, salt, 64, { N: 2 ** 17, r: 8, p: 1, maxmem: 2 ** 28 })
  const text = (bytes: Buffer) => bytes.toString('base64').replace(/=+$/, '')
  return `$scrypt$n=${2 ** 17},r=8,p=1$${text(salt)}$${text(key)}`
}
