import { Op } from 'sequelize'
import { Person } from '~/server/models'
import { rows } from '~/server/models/database'
import { fail, invalid, notFound, stale } from '~/server/utils/fail'
import { log } from '~/server/utils/log'
import { endSessionsOf } from '~/server/utils/session'
import type { Account, MadeLink, Membership } from '~/utils/contracts/people'
import { closeLinksBy, closeResetsOf, makeReset } from './links'

/** What keepers do about people. */

interface AccountRow {
  id: string
  name: string
  email: string
  keeper: number
  disabled: number
  createdAt: string
  seenAt: string | null
  version: number
}

/**
 * Every account, or one. Of a person's productions only those are told which the keeper belongs to as well: being a
 * keeper opens no production.
 */
async function findAccounts(keeperId: string, personId: string | null): Promise<Account[]> {
  const people = await rows<AccountRow>(
    `SELECT id, name, email, keeper, disabled_at IS NOT NULL AS disabled, created_at AS createdAt, version,
            (SELECT max(seen_at) FROM sessions WHERE person_id = people.id) AS seenAt
       FROM people WHERE :personId IS NULL OR id = :personId ORDER BY name COLLATE NOCASE, id`,
    { personId },
  )
  const shared = await rows<Membership & { personId: string }>(
    `SELECT theirs.person_id AS personId, productions.slug AS production, productions.title, theirs.role
       FROM memberships AS theirs
       JOIN memberships AS mine ON mine.production_id = theirs.production_id AND mine.person_id = :keeperId
       JOIN productions ON productions.id = theirs.production_id
      WHERE :personId IS NULL OR theirs.person_id = :personId ORDER BY productions.title, productions.slug`,
    { keeperId, personId },
  )
  return people.map(({ keeper, disabled, ...person }) => ({
    ...person,
    keeper: keeper === 1,
    disabled: disabled === 1,
    memberships: shared.filter((one) => one.personId === person.id).map(({ production, title, role }) => ({ production, title, role })),
  }))
}

export const allAccounts = (keeperId: string) => findAccounts(keeperId, null)

/** @throws 404 */
export async function oneAccount(keeperId: string, personId: string): Promise<Account> {
  return (await findAccounts(keeperId, personId))[0] ?? notFound()
}

interface AccountChange {
  disabled?: boolean
  keeper?: boolean
  version: number
}

/**
 * Closes or opens an account, makes a keeper or a keeper no longer. A closed account's sessions end with it. Inside `write`.
 * @throws 404, 409 with what stands now, 422 where nobody would be left to keep the installation
 */
export async function changeAccount(keeperId: string, personId: string, change: AccountChange): Promise<Account> {
  const person = (await Person.findByPk(personId)) ?? notFound()
  if (person.version !== change.version) stale(await oneAccount(keeperId, personId))
  const disabled = change.disabled ?? person.disabledAt !== null
  const keeper = change.keeper ?? person.keeper
  if (person.keeper && person.disabledAt === null && (disabled || !keeper) && (await isLastKeeper(personId)))
    invalid(disabled ? 'disabled' : 'keeper', 'This is the last keeper: make somebody else keeper first.')
  await person.update({
    keeper,
    disabledAt: disabled ? (person.disabledAt ?? new Date().toISOString()) : null,
    version: person.version + 1,
  })
  if (disabled) {
    await endSessionsOf(personId)
    await closeResetsOf(personId)
  }
  if (disabled || !keeper) await closeLinksBy(personId)
  log.info('account changed', { by: keeperId, person: personId, disabled, keeper })
  return oneAccount(keeperId, personId)
}

/** Would nobody be left who can sign in and keep the installation? */
async function isLastKeeper(personId: string): Promise<boolean> {
  return (
    (await Person.count({
      where: { id: { [Op.ne]: personId }, keeper: true, disabledAt: null, passwordHash: { [Op.ne]: null } },
    })) === 0
  )
}

/** Ends all of a person's sessions. Inside `write`. @returns how many ended. @throws 404 */
export async function endAccountSessions(keeperId: string, personId: string): Promise<number> {
  if (!(await Person.findByPk(personId))) notFound()
  const ended = await endSessionsOf(personId)
  log.info('sessions ended', { by: keeperId, person: personId, ended })
  return ended
}

/** A link for somebody who has forgotten their password. Inside `write`. @throws 404, 409 for a closed account */
export async function makeAccountReset(keeperId: string, personId: string): Promise<MadeLink> {
  const person = (await Person.findByPk(personId)) ?? notFound()
  if (person.disabledAt !== null) fail(409, 'This account is closed: open it first.')
  log.info('reset link made', { by: keeperId, person: personId })
  return makeReset(person, keeperId)
}
