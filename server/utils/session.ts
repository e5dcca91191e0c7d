import type { H3Event } from 'h3'
import { deleteCookie, getCookie } from 'h3'
import { useRuntimeConfig } from '#imports'
import { clearUserSession, getUserSession, setUserSession } from '#sealed-cookie'
import { v7 as uuid } from 'uuid'
import { afterCommit, row, rows, run, write } from '~/server/models/database'
import { news } from '~/server/services/news'
import { fail } from './fail'
import { hashSecret, newSecret } from './secret'
import { isOver } from './sessionAge'

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
  if (isOver(found, now)) return null
  if (now - Date.parse(found.seenAt) > SEEN_EVERY)
    await write(() => run('UPDATE sessions SET seen_at = :at WHERE id = :id', { at: new Date(now).toISOString(), id: found.sessionId }))
  return { id: found.id, name: found.name, email: found.email, keeper: found.keeper === 1, sessionId: found.sessionId }
}

const cookieName = () => useRuntimeConfig().session.name ?? 'tiltyard'

/** Do cookies travel by https only? The start script decides it by the public address. */
export function secureCookies(): boolean {
  const { cookie } = useRuntimeConfig().session as { cookie?: { secure?: boolean } }
  return cookie?.secure === true
}

/** The token inside the sealed cookie, if there is one. Asking must not set a cookie where none was. */
export async function sessionToken(event: H3Event): Promise<string | undefined> {
  if (getCookie(event, cookieName()) === undefined) return undefined
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
    if (before) await endSessions('token_hash = :hash', { hash: hashSecret(before) })
    await run(
      `INSERT INTO sessions (id, token_hash, person_id, device, address, created_at, seen_at)
       VALUES (:id, :hash, :personId, :device, :address, :at, :at)`,
      { id: uuid(), hash: hashSecret(token), personId, device: device.slice(0, 200), address, at },
    )
  })
  await putInCookie(event, token)
}

/** The same session under a new token: a copy of the cookie that somebody took before is worth nothing from here on. */
export async function renewSession(event: H3Event, sessionId: string): Promise<void> {
  const token = newSecret()
  await write(async () => {
    await run('UPDATE sessions SET token_hash = :hash WHERE id = :id', { id: sessionId, hash: hashSecret(token) })
    // Whoever holds a copy of the old cookie loses the line at once; the person's own page comes back with the new one.
    afterCommit(() => news.emit('sessionEnded', { sessionId }))
  })
  await putInCookie(event, token)
}

/** Ends the session that this browser has, if any, and takes the cookie away. */
export async function closeSession(event: H3Event): Promise<void> {
  const token = await sessionToken(event)
  if (token) await write(() => endSessions('token_hash = :hash', { hash: hashSecret(token) }))
  if (getCookie(event, cookieName()) === undefined) return
  await clearUserSession(event)
  // The package leaves an empty cookie behind: take it away altogether.
  deleteCookie(event, cookieName(), { httpOnly: true, sameSite: 'lax', secure: secureCookies(), path: '/' })
  event.context.asker = undefined
}

/** Ends one session of this person; its sockets go after the commit. @returns false when there is no such session. */
export async function endOneSession(sessionId: string, personId: string): Promise<boolean> {
  return (await endSessions('id = :sessionId AND person_id = :personId', { sessionId, personId })) > 0
}

/** Ends every session of this person, but for one that is kept; all their sockets go after the commit. */
export async function endSessionsOf(personId: string, exceptSessionId?: string): Promise<number> {
  const ended = await endSessions('person_id = :personId AND id <> :kept', { personId, kept: exceptSessionId ?? '' })
  afterCommit(() => news.emit('personOut', { personId, exceptSessionId }))
  return ended
}

type Ends = 'token_hash = :hash' | 'id = :sessionId AND person_id = :personId' | 'person_id = :personId AND id <> :kept'

async function endSessions(which: Ends, values: Record<string, string>): Promise<number> {
  const ended = await rows<{ id: string }>(`UPDATE sessions SET ended_at = :at WHERE ${which} AND ended_at IS NULL RETURNING id`, {
    ...values,
    at: new Date().toISOString(),
  })
  for (const { id } of ended) afterCommit(() => news.emit('sessionEnded', { sessionId: id }))
  return ended.length
}

async function putInCookie(event: H3Event, token: string): Promise<void> {
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
