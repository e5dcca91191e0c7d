import { v4, v7 as uuid } from 'uuid'
import { Letter, Link, Membership, Person, Session } from '~/server/models'
import type { Role } from '~/utils/permissions'
import type { House } from '../../helpers/seed'

const now = () => new Date().toISOString()

/** Somebody with an account who never signs in. */
export const newPerson = (): Promise<Person> =>
  Person.create({ id: uuid(), email: `${v4()}@pier.example`, name: 'Made for one request', createdAt: now() })

export async function newMemberOf({ production }: House, role: Role): Promise<Person> {
  const person = await newPerson()
  await Membership.create({ productionId: production.id, personId: person.id, role, createdAt: now() })
  return person
}

export const newSession = (person: Person): Promise<Session> =>
  Session.create({ id: uuid(), tokenHash: v4(), personId: person.id, device: '', address: '', createdAt: now(), seenAt: now() })

export const newInvitation = (): Promise<Link> =>
  Link.create({
    id: uuid(),
    kind: 'invitation',
    tokenHash: v4(),
    email: `${v4()}@pier.example`,
    name: 'Invited',
    createdAt: now(),
    expiresAt: new Date(Date.now() + 3_600_000).toISOString(),
  })

/** A letter that was refused for good, so that no worker touches it. */
export const newLetter = (): Promise<Letter> =>
  Letter.create({
    id: uuid(),
    kind: 'invitation',
    toAddress: 'nobody@pier.example',
    toName: 'Nobody',
    messageId: `<${v4()}@pier.example>`,
    subject: 'An invitation',
    text: 'Come in.',
    html: '<p>Come in.</p>',
    state: 'parked',
    createdAt: now(),
  })
