import type { H3Event } from 'h3'
import { v7 as uuid } from 'uuid'
import { Membership, Person, Production } from '~/server/models'
import { afterCommit, run, write } from '~/server/models/database'
import { fail, forbidden, invalid, notFound } from '~/server/utils/fail'
import { log } from '~/server/utils/log'
import { hashChosen } from '~/server/utils/password'
import { endSessionsOf } from '~/server/utils/session'
import type { MadeLink } from '~/utils/contracts/people'
import { may } from '~/utils/permissions'
import type { Role } from '~/utils/permissions'
import { appendEvent } from './events'
import { closeResetsOf, findLink, makeInvitation, useUp } from './links'
import { news } from './news'
import { isEmpty } from './people'
import { openSession } from './signIn'

/** How somebody comes to have an account and a password: first keeper, invitation, forgotten password. */

const notEmpty = (): never => fail(409, 'This installation has a keeper already: ask them for an invitation.')

/** Makes the first keeper and signs them in. @returns their id. @throws 409 when there is a keeper, 422 */
export async function makeFirstKeeper(event: H3Event, wanted: { name: string; email: string; password: string }): Promise<string> {
  if (!(await isEmpty())) notEmpty()
  const passwordHash = await hashChosen(event, wanted.password, wanted.email)
  return write(async () => {
    // Asked again where only one can be: two who send this at once do not both become keeper.
    if (!(await isEmpty())) notEmpty()
    const person = await newPerson({ ...wanted, passwordHash, keeper: true })
    log.info('first keeper made', { person: person.id })
    await openSession(event, person)
    return person.id
  })
}

async function newPerson(wanted: { name: string; email: string; passwordHash: string; keeper: boolean }): Promise<Person> {
  const { name, email, passwordHash, keeper } = wanted
  const there = await Person.findOne({ where: { email } })
  if (!there) return Person.create({ id: uuid(), name, email, passwordHash, keeper, createdAt: new Date().toISOString() })
  // Somebody who was only ever named as a member gets their password now; nobody's account is ever taken over.
  if (there.passwordHash !== null || there.disabledAt !== null) return invalid('email', 'This address has an account already.')
  return there.update({ name, passwordHash, keeper, version: there.version + 1 })
}

interface Invitation {
  email: string
  name: string
  keeper: boolean
  production?: string
  role?: Role
}

/** Invites somebody by a link. Inside `write`. @throws 404, 403 for a production where the keeper manages no members, 422 */
export async function invite(keeperId: string, { production: slug, ...wanted }: Invitation): Promise<MadeLink> {
  const there = await Person.findOne({ where: { email: wanted.email } })
  if (there && (there.passwordHash !== null || there.disabledAt !== null)) invalid('email', 'This address has an account already.')
  const productionId = slug === undefined ? undefined : await manageable(slug, keeperId)
  const made = await makeInvitation({ ...wanted, productionId, madeBy: keeperId })
  log.info('invited', { by: keeperId, invitation: made.invitation.id, keeper: wanted.keeper })
  return made
}

/** A keeper hands out roles only where they may as a member: to anybody else a production is not there. */
async function manageable(slug: string, personId: string): Promise<string> {
  const production = await Production.findOne({ where: { slug } })
  const own = production && (await Membership.findOne({ where: { productionId: production.id, personId } }))
  if (!production || !own) return notFound()
  return may(own.role, 'members.manage') ? production.id : forbidden()
}

/** Uses an invitation: an account, its role where one was given, and a session. @returns the person's id. @throws 410, 422 */
export async function acceptInvitation(event: H3Event, wanted: { token: string; name: string; password: string }): Promise<string> {
  const link = await findLink(wanted.token, 'invitation')
  const passwordHash = await hashChosen(event, wanted.password, link.email)
  return write(async () => {
    await useUp(link)
    const person = await newPerson({ name: wanted.name, email: link.email, passwordHash, keeper: link.keeper === 1 })
    if (link.productionId && link.role && (await stillManages(link.productionId, link.madeBy))) await join(link.productionId, person.id, link.role)
    log.info('invitation accepted', { person: person.id, invitation: link.id })
    await openSession(event, person)
    return person.id
  })
}

/** Whoever left the production, or may not let anybody in any more, does not do so by an invitation of before. */
async function stillManages(productionId: string, personId: string | null): Promise<boolean> {
  if (personId === null) return false
  return may((await Membership.findOne({ where: { productionId, personId } }))?.role, 'members.manage')
}

async function join(productionId: string, personId: string, role: Role): Promise<void> {
  const production = await Production.findByPk(productionId)
  // A role that somebody has been given meanwhile is newer than the invitation.
  if (!production || (await Membership.findOne({ where: { productionId, personId } }))) return
  await Membership.create({ productionId, personId, role, createdAt: new Date().toISOString() })
  await appendEvent(production, { kind: 'member', personId })
  afterCommit(() => news.emit('membership', { production: production.slug, personId, role }))
}

/** Uses a reset link: the new password holds, every session ends, and one begins here. @returns the person's id. @throws 410, 422 */
export async function resetPassword(event: H3Event, { token, password }: { token: string; password: string }): Promise<string> {
  const link = await findLink(token, 'reset')
  const passwordHash = await hashChosen(event, password, link.email)
  return write(async () => {
    await useUp(link)
    const id = link.personId ?? ''
    const changed = await run('UPDATE people SET password_hash = :passwordHash WHERE id = :id AND disabled_at IS NULL', {
      passwordHash,
      id,
    })
    if (changed === 0) fail(410, 'This account is closed: ask a keeper.')
    await closeResetsOf(id)
    await endSessionsOf(id)
    log.info('password reset', { person: id })
    await openSession(event, { id, email: link.email })
    return id
  })
}
