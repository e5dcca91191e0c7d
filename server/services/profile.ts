import type { H3Event } from 'h3'
import { Person } from '~/server/models'
import { rows, run, write } from '~/server/models/database'
import { invalid, stale } from '~/server/utils/fail'
import { limitOwnPassword } from '~/server/utils/limits'
import { log } from '~/server/utils/log'
import { fits, hashChosen } from '~/server/utils/password'
import { endSessionsOf, renewSession } from '~/server/utils/session'
import { isOver } from '~/server/utils/sessionAge'
import type { Asker } from '~/server/utils/session'
import type { MailWish, Me, OwnSession } from '~/utils/contracts/people'
import { closeResetsOf } from './links'
import { meOf } from './people'

/** What people change about themselves. */

/** Inside `write`. @throws 409 with what stands now. */
export async function changeProfile(personId: string, change: { name?: string; mailWish?: MailWish; version: number }): Promise<Me> {
  const { name = null, mailWish = null, version } = change
  const changed = await run(
    `UPDATE people SET name = coalesce(:name, name), mail_wish = coalesce(:mailWish, mail_wish), version = version + 1
      WHERE id = :personId AND version = :version`,
    { personId, name, mailWish, version },
  )
  const me = await meOf(personId)
  return changed === 0 ? stale(me) : me
}

/** Is this the person's password? @returns its hash. @throws 422 at `currentPassword`, 429 */
async function proveCurrent(event: H3Event, person: Asker, currentPassword: string): Promise<string> {
  await limitOwnPassword(event)
  const hash = (await Person.findByPk(person.id))?.passwordHash ?? null
  if (hash !== null && (await fits(event, hash, currentPassword))) return hash
  log.warn('current password refused', { person: person.id })
  return invalid('currentPassword', 'This is not your current password.')
}

/** Not in a transaction: it hashes first. @throws 422 for a wrong password or a taken address */
export async function changeEmail(event: H3Event, person: Asker, change: { email: string; currentPassword: string }): Promise<Me> {
  const proven = await proveCurrent(event, person, change.currentPassword)
  return write(async () => {
    const other = await Person.findOne({ where: { email: change.email } })
    if (other && other.id !== person.id) invalid('email', 'This address has an account already.')
    const changed = await run('UPDATE people SET email = :email, version = version + 1 WHERE id = :id AND password_hash = :proven', {
      email: change.email,
      id: person.id,
      proven,
    })
    if (changed === 0) stale(await meOf(person.id))
    // Links that went to the old address are no longer this person's.
    await closeResetsOf(person.id)
    await renewSession(event, person.sessionId)
    log.info('address changed', { person: person.id })
    return meOf(person.id)
  })
}

interface PasswordChange {
  currentPassword: string
  password: string
  endOtherSessions: boolean
}

/** Not in a transaction: it hashes first. @throws 422 for a wrong or a common password */
export async function changePassword(event: H3Event, person: Asker, change: PasswordChange): Promise<Me> {
  const proven = await proveCurrent(event, person, change.currentPassword)
  const hash = await hashChosen(event, change.password, person.email)
  return write(async () => {
    const changed = await run('UPDATE people SET password_hash = :hash WHERE id = :id AND password_hash = :proven', {
      hash,
      id: person.id,
      proven,
    })
    if (changed === 0) stale(await meOf(person.id))
    await closeResetsOf(person.id)
    if (change.endOtherSessions) await endSessionsOf(person.id, person.sessionId)
    await renewSession(event, person.sessionId)
    log.info('password changed', { person: person.id, othersEnded: change.endOtherSessions })
    return meOf(person.id)
  })
}

/** The sessions that still work, newest use first. */
export async function ownSessions(person: Asker): Promise<OwnSession[]> {
  const now = Date.now()
  const found = await rows<Omit<OwnSession, 'current'>>(
    `SELECT id, created_at AS createdAt, seen_at AS seenAt, device FROM sessions
      WHERE person_id = :id AND ended_at IS NULL ORDER BY seen_at DESC, id DESC`,
    { id: person.id },
  )
  return found.filter((session) => !isOver(session, now)).map((session) => ({ ...session, current: session.id === person.sessionId }))
}
