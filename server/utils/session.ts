import type { H3Event } from 'h3'
import { getCookie } from 'h3'
import { useRuntimeConfig } from '#imports'
import { clearUserSession, getUserSession, setUserSession } from '#sealed-cookie'
import { v7 as uuid } from 'uuid'
import { row, run, write } from '~/server/models/database'
import { fail } from './fail'
import { hashSecret, newSecret } from './secret'

/** A session ends by itself after this long unused, and after this long in all: security.md 7.3.1, 7.3.2. */
export const IDLE_DAYS = 14
export const ABSOLUTE_DAYS = 30
const DAY = 24 * 60 * 60 * 1000
const SEEN_EVERY = 60 * 1000

/** Who is asking, read afresh on every request. */
export interface Asker {
  id: string
  name: string
  email: string
  keeper: boolean
  sessionId: string
}
interface SessionRow {
  sessionId: string
  createdAt: string
  seenAt: string
  id: string
  name: string
  email: string
  keeper: number
}

/** The person behind a session token, or null when the session ended, grew old, or its person was disabled. */
export async function askerOf(token: string | undefined): Promise<Asker | null> {
  if (!token) return null
  const found = await row<SessionRow>(
    `SELECT sessions.id AS sessionId, sessions.created_at AS createdAt, sessions.seen_at AS seenAt,
            people.id, people.name, people.email, people.keeper
       FROM sessions JOIN people ON people.id = sessions.person_id
      WHERE sessions.token_hash = :hash AND sessions.ended_at IS NULL AND people.disabled_at IS NULL`,
    { hash: hashSecret(token) },
  )
  if (!found) return null
  const now = Date.now()
  if (now - Date.parse(found.seenAt) > IDLE_DAYS * DAY || now - Date.parse(found.createdAt) > ABSOLUTE_DAYS * DAY) return null
  if (now - Date.parse(found.seenAt) > SEEN_EVERY)
    await write(() => run('UPDATE sessions SET seen_at = :at WHERE id = :id', { at: new Date(now).toISOString(), id: found.sessionId }))
  return { id: found.id, name: found.name, email: found.email, keeper: found.keeper === 1, sessionId: found.sessionId }
}

/** The token inside the sealed cookie, if there is one. Asking must not set a cookie where none was. */
export async function sessionToken(event: H3Event): Promise<string | undefined> {
  if (getCookie(event, useRuntimeConfig(event).session.name ?? '') === undefined) return undefined
  return (await getUserSession(event)).secure?.token
}

/** Who is asking, or null. Remembered on the request only. */
export async function findPerson(event: H3Event): Promise<Asker | null> {
  event.context.asker ??= askerOf(await sessionToken(event))
  return event.context.asker
}

/** @throws 401 when nobody is signed in. */
export async function requirePerson(event: H3Event): Promise<Asker> {
  return (await findPerson(event)) ?? fail(401, 'Sign in first.')
}

/** Starts a session under a new id and puts it in the cookie; a session that the browser already had is ended. */
export async function startSession(event: H3Event, personId: string, device: string, address: string): Promise<void> {
  const before = await sessionToken(event)
  const token = newSecret()
  const at = new Date().toISOString()
  await write(async () => {
    if (before) await run('UPDATE sessions SET ended_at = :at WHERE token_hash = :hash AND ended_at IS NULL', { at, hash: hashSecret(before) })
    await run(
      `INSERT INTO sessions (id, token_hash, person_id, device, address, created_at, seen_at)
       VALUES (:id, :hash, :personId, :device, :address, :at, :at)`,
      { id: uuid(), hash: hashSecret(token), personId, device: device.slice(0, 200), address, at },
    )
  })
  // replace-by-merge is this package's way: clear first, so that nothing of an older cookie stays.
  await clearUserSession(event)
  await setUserSession(event, { secure: { token } })
  event.context.asker = undefined
}

declare module '#auth-utils' {
  interface SecureSessionData {
    token: string
  }
}
declare module 'h3' {
  interface H3EventContext {
    asker?: Promise<Asker | null>
  }
}
