import { v7 as uuid } from 'uuid'
import { Comment, Flag, Membership, Person, Production, Ruling, Sequence, Shot, Take, Thread } from '~/server/models'
import { closeDatabase, write } from '~/server/models/database'
import type { MailWish } from '~/utils/contracts/people'
import type { Decision } from '~/utils/contracts/production'
import type { Finding } from '~/utils/motion/types'
import type { Role } from '~/utils/permissions'
import { sessionSecret } from '../../scripts/lib/data.mjs'
import { openEmptyStore, openStore } from './store'

/** A take that is ruled on, with whoever it takes: filled in below the routes, for tests of the letters alone. */

const at = '2026-11-30T09:15:00.000Z'
export const SECRET = 'a secret of these tests alone, long enough'

/** Opens an empty house in a folder of its own. @returns how to close it and take it away. */
export async function openHouse(): Promise<() => Promise<void>> {
  setUp(SECRET, 'https://board.example')
  return openEmptyStore()
}

/** Works on the data of a running server, beside it, as its own services would. @returns how to let go of it. */
export async function joinHouse({ dataDir, url }: { dataDir: string; url: string }): Promise<() => Promise<void>> {
  setUp(sessionSecret(dataDir), url)
  await openStore(dataDir)
  return closeDatabase
}

function setUp(secret: string, baseUrl: string): void {
  Object.assign(process.env, {
    NUXT_SESSION_PASSWORD: secret,
    NUXT_BASE_URL: baseUrl,
    NUXT_MAIL_FROM: 'Tiltyard <board@board.example>',
  })
}

export interface Story {
  production: Production
  shot: Shot
  take: Take
  /** By the name they were asked for under. */
  people: Record<string, Person>
}

interface Who {
  role?: Role
  wish?: MailWish
  disabled?: boolean
}

/** A production with one shot and one take by `ana`; `sam` supervises. `others` join as they are described. */
export function tellStory(others: Record<string, Who> = {}, findings: Finding[] = []): Promise<Story> {
  // One transaction: a disk that is asked to sync twenty times is slow.
  return write(() => tell(others, findings))
}

async function tell(others: Record<string, Who>, findings: Finding[]): Promise<Story> {
  const production = await Production.create({ id: uuid(), slug: `p-${uuid().slice(-8)}`, title: 'Quayside Giants', createdAt: at })
  const cast: Record<string, Who> = { ana: { role: 'animator' }, sam: { role: 'supervisor' }, ...others }
  const people: Record<string, Person> = {}
  for (const [name, who] of Object.entries(cast)) {
    people[name] = await Person.create({
      id: uuid(),
      email: `${name}.${uuid().slice(-6)}@board.example`,
      name,
      mailWish: who.wish ?? 'all',
      disabledAt: who.disabled ? at : null,
      createdAt: at,
    })
    if (who.role) await Membership.create({ productionId: production.id, personId: people[name].id, role: who.role, createdAt: at })
  }
  const sequence = await Sequence.create({ id: uuid(), productionId: production.id, code: 'CLK', title: 'Clock Tower', position: 0 })
  const shot = await Shot.create({
    id: uuid(),
    clientId: uuid(),
    productionId: production.id,
    sequenceId: sequence.id,
    code: 'CLK-110',
    title: 'The clock tower goes over',
    firstFrame: 1001,
    lastFrame: 1099,
    fps: 24,
    brief: '',
    position: 0,
    animatorId: people.ana!.id,
    supervisorId: people.sam!.id,
    createdAt: at,
  })
  return { production, shot, take: await postTake(shot, people.ana!, 1, findings), people }
}

export async function postTake(shot: Shot, by: Person, number: number, findings: Finding[] = []): Promise<Take> {
  return Take.create({
    id: uuid(),
    clientId: uuid(),
    shotId: shot.id,
    number,
    keys: [{ frame: 1001, reading: 0 }, { frame: 1003, reading: 1 }, { frame: 1005, reading: 4 }],
    unit: 'deg',
    slop: 0.3,
    tolerance: 0.1,
    fps: 24,
    claim: { law: 'topple', measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1 },
    note: '',
    personId: by.id,
    createdAt: at,
    answer: { verdict: 'breaks', reason: null, keys: [], findings, readsAs: [], size: null, claim: null, ruled: { fit: [], claim: null } },
    verdict: 'breaks',
    judgeVersion: 'test',
    sketch: { number, verdict: 'breaks', headline: '', drawings: 3, marks: [] },
  })
}

/** A thread pinned to the take, or to frames of the shot when `take` is null, with a comment by each of `voices`. */
export async function talk(shot: Shot, take: Take | null, voices: Person[]): Promise<void> {
  const thread = await Thread.create({
    id: uuid(),
    clientId: uuid(),
    shotId: shot.id,
    takeId: take?.id ?? null,
    fromFrame: take ? null : 1003,
    toFrame: take ? null : 1003,
    personId: voices[0]!.id,
    createdAt: at,
  })
  for (const [i, voice] of voices.entries())
    await Comment.create({ id: uuid(), clientId: uuid(), threadId: thread.id, eventNumber: i + 1, body: 'Hm.', personId: voice.id, createdAt: at })
}

export async function flag(take: Take, by: Person, from: number, to: number, reason: string, finding: Flag['finding'] = null): Promise<Flag> {
  return Flag.create({ id: uuid(), clientId: uuid(), takeId: take.id, fromFrame: from, toFrame: to, reason, finding, personId: by.id, createdAt: at })
}

/** The ruling and whatever `then` does with it, in one transaction. */
export async function rule<T>(take: Take, by: Person, then: (ruling: Ruling) => Promise<T>, decision: Decision = 'goes-back', note = ''): Promise<T> {
  return write(async () =>
    then(await Ruling.create({ id: uuid(), clientId: uuid(), takeId: take.id, decision, note, personId: by.id, createdAt: at })),
  )
}
