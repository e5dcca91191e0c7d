import type { z } from 'zod'
import { Membership, Person } from '~/server/models'
import type { Production } from '~/server/models'
import { afterCommit, rows } from '~/server/models/database'
import { fail, invalid, notFound, stale } from '~/server/utils/fail'
import type { Member, memberChange, newMember } from '~/utils/contracts/people'
import { may, roles } from '~/utils/permissions'
import type { Role } from '~/utils/permissions'
import { appendEvent } from './events'
import { news } from './news'
import { now } from './wire'
import type { InProduction } from './wire'

type MemberRow = Omit<Member, 'disabled' | 'email'> & { email: string; disabled: number }

const managers = roles.filter((role) => may(role, 'members.manage'))

/** Everybody of a production by name. Addresses are for those who manage the members. */
export async function membersOf(production: Production, asking: Role): Promise<Member[]> {
  const found = await rows<MemberRow>(
    `SELECT people.id, people.name, people.email, memberships.role, memberships.version, people.disabled_at IS NOT NULL AS disabled
       FROM memberships JOIN people ON people.id = memberships.person_id
      WHERE memberships.production_id = :production ORDER BY people.name, people.id`,
    { production: production.id },
  )
  const addresses = may(asking, 'members.manage')
  return found.map(({ id, name, email, role, version, disabled }) => ({
    id,
    name,
    email: addresses ? email : null,
    role,
    version,
    disabled: disabled === 1,
  }))
}

/** Makes somebody who has an account a member. @throws 422 without an account, 409 for a member */
export async function addMember({ production, person: by }: InProduction, { email, role }: z.infer<typeof newMember>): Promise<Member> {
  const person = await Person.findOne({ where: { email } })
  if (!person || person.disabledAt) return invalid('email', 'No account has this address: a keeper can invite them.')
  const key = { productionId: production.id, personId: person.id }
  if (await Membership.findOne({ where: key })) {
    const message = `${person.name} is a member already.`
    fail(409, message, { issues: [{ path: 'email', message }] })
  }
  const membership = await Membership.create({ ...key, role, createdAt: now() })
  await announce(production, by.id, person.id, role)
  return memberWire(person, membership)
}

/** @throws 409 with what stands now, or where nobody would be left who may manage the members */
export async function changeMember(place: InProduction, personId: string, body: z.infer<typeof memberChange>): Promise<Member> {
  const { person, membership } = await find(place.production, personId)
  if (membership.version !== body.version) stale(memberWire(person, membership))
  if (membership.role !== body.role) {
    if (!may(body.role, 'members.manage')) await requireAnotherManager(place.production, personId)
    await membership.update({ role: body.role, version: membership.version + 1 })
    await announce(place.production, place.person.id, personId, body.role)
  }
  return memberWire(person, membership)
}

/** Takes somebody out of the production. What they posted and said stays; their shots keep their name until reassigned. */
export async function removeMember(place: InProduction, personId: string): Promise<void> {
  const { membership } = await find(place.production, personId)
  await requireAnotherManager(place.production, personId)
  await membership.destroy()
  await announce(place.production, place.person.id, personId, null)
}

async function find(production: Production, personId: string): Promise<{ person: Person; membership: Membership }> {
  const membership = await Membership.findOne({ where: { productionId: production.id, personId } })
  const person = membership && (await Person.findByPk(personId))
  return membership && person ? { person, membership } : notFound()
}

async function requireAnotherManager(production: Production, exceptPersonId: string): Promise<void> {
  const others = await rows<{ id: string }>(
    `SELECT people.id FROM memberships JOIN people ON people.id = memberships.person_id
      WHERE memberships.production_id = :production AND memberships.role IN (:managers)
        AND people.disabled_at IS NULL AND people.password_hash IS NOT NULL AND people.id <> :exceptPersonId LIMIT 1`,
    { production: production.id, managers, exceptPersonId },
  )
  if (others.length === 0) fail(409, 'Nobody else here may manage the members: give somebody that role first.')
}

/** Written down for everybody; told at once to the live connection, which cuts what the old role had opened. */
async function announce(production: Production, byId: string, personId: string, role: Role | null): Promise<void> {
  // The rights first: who is out does not hear of the event any more, and asks for nothing that would be refused.
  afterCommit(() => news.emit('membership', { production: production.slug, personId, role }))
  await appendEvent(production, { kind: 'member', personId: byId })
}

const memberWire = (person: Person, { role, version }: Membership): Member => ({
  id: person.id,
  name: person.name,
  email: person.email,
  role,
  version,
  disabled: Boolean(person.disabledAt),
})
