import { setTimeout as pause } from 'node:timers/promises'
import { v7 as uuid } from 'uuid'
import { Link, Person } from '~/server/models'
import { row, rows, run, write } from '~/server/models/database'
import { fail } from '~/server/utils/fail'
import { resetLetterAllowed } from '~/server/utils/limits'
import { hashSecret, newSecret } from '~/server/utils/secret'
import { settings } from '~/server/utils/settings'
import type { InvitationRow, LinkAnswer, MadeLink } from '~/utils/contracts/people'
import type { Role } from '~/utils/permissions'
import { oweLinkLetter } from './letters'

/**
 * One-use links. The secret has 256 bits, travels in the fragment of the address (which no browser sends, so that no log
 * holds it), and only its hash is kept. security.md 6.4.1, 11.5.1.
 */
const HOUR = 60 * 60 * 1000
const LASTS = { invitation: 7 * 24 * HOUR, reset: 2 * HOUR } as const
/** Well beyond what writing a letter down takes. */
const ANSWER_AFTER_MS = 400
const OPEN = 'used_at IS NULL AND expires_at > :now'
const COLUMNS = 'id, kind, email, name, created_at AS createdAt, expires_at AS expiresAt'

interface NewLink {
  email: string
  name: string
  keeper?: boolean
  productionId?: string
  role?: Role
  madeBy: string | null
}
type Whose = { kind: 'invitation' } | { kind: 'reset'; person: Person }

/** Makes a link and owes its letter. Inside `write`. */
async function makeLink(whose: Whose, { email, name, keeper, productionId, role, madeBy }: NewLink): Promise<MadeLink> {
  const secret = newSecret()
  const now = Date.now()
  const personId = whose.kind === 'reset' ? whose.person.id : null
  const made = {
    id: uuid(),
    kind: whose.kind,
    email,
    name,
    createdAt: new Date(now).toISOString(),
    expiresAt: new Date(now + LASTS[whose.kind]).toISOString(),
  }
  await Link.create({
    ...made,
    tokenHash: hashSecret(secret),
    keeper: keeper ?? false,
    productionId: productionId ?? null,
    role: role ?? null,
    personId,
    madeBy,
  })
  const url = `${settings().baseUrl}/${whose.kind}#${secret}`
  await oweLinkLetter({ linkId: made.id, kind: whose.kind, toAddress: email, toName: name, personId, url })
  return { invitation: made, link: url }
}

/** An invitation. An older one to the same address no longer works. */
export async function makeInvitation(wanted: NewLink): Promise<MadeLink> {
  await closeLinks('email = :email AND kind = \'invitation\'', { email: wanted.email })
  return makeLink({ kind: 'invitation' }, wanted)
}

/** A link to choose a new password with. @param madeBy the keeper who made it, null when the person asked */
export async function makeReset(person: Person, madeBy: string | null): Promise<MadeLink> {
  return makeLink({ kind: 'reset', person }, { email: person.email, name: person.name, madeBy })
}

/**
 * A forgotten password: owes a letter where the address has an account and has not been written to too often. Takes the
 * same time in every case, so that nobody learns which it was.
 */
export async function askForReset(email: string): Promise<void> {
  const answered = pause(ANSWER_AFTER_MS)
  await write(async () => {
    const person = await Person.findOne({ where: { email } })
    // Who never had a password comes in by an invitation.
    if (!person || person.passwordHash === null || person.disabledAt !== null) return
    if (await resetLetterAllowed(email)) await makeReset(person, null)
  })
  await answered
}

type Closes = 'email = :email AND kind = \'invitation\'' | 'person_id = :personId' | 'made_by = :madeBy' | 'id = :id'

/** From here on these open links no longer work. Rows stay: the mail room's letters belong to them. */
async function closeLinks(which: Closes, values: Record<string, string>): Promise<number> {
  const now = new Date().toISOString()
  return run(`UPDATE links SET expires_at = :now WHERE ${which} AND ${OPEN}`, { ...values, now })
}
/** Every open reset link of this person stops working: the password or the address has changed, or the account is closed. */
export const closeResetsOf = (personId: string) => closeLinks('person_id = :personId', { personId })
/** What somebody handed out as keeper does not outlast their being one. */
export const closeLinksBy = (keeperId: string) => closeLinks('made_by = :madeBy', { madeBy: keeperId })
/** @returns false when there is no such open link. */
export const withdrawLink = async (id: string) => (await closeLinks('id = :id', { id })) > 0

export async function openLinks(): Promise<InvitationRow[]> {
  return rows<InvitationRow>(`SELECT ${COLUMNS} FROM links WHERE ${OPEN} ORDER BY created_at DESC, id DESC`, {
    now: new Date().toISOString(),
  })
}

const over = (): never => fail(410, 'This link was used before, was withdrawn, or has run out. Ask for a new one.')

interface OpenLink extends LinkAnswer {
  id: string
  keeper: number
  productionId: string | null
  role: Role | null
  personId: string | null
  madeBy: string | null
}

/** The open link that this secret belongs to. @throws 410 for every other secret. */
export async function findLink(token: string, kind?: LinkAnswer['kind']): Promise<OpenLink> {
  const found = await row<OpenLink>(
    `SELECT id, kind, email, name, keeper, production_id AS productionId, role, person_id AS personId, made_by AS madeBy
       FROM links WHERE token_hash = :hash AND ${OPEN}`,
    { hash: hashSecret(token), now: new Date().toISOString() },
  )
  return found && (kind === undefined || found.kind === kind) ? found : over()
}

/** Uses a link up: of two who try at once, one is refused. Inside `write`. @throws 410 */
export async function useUp(link: { id: string }): Promise<void> {
  const now = new Date().toISOString()
  if ((await run(`UPDATE links SET used_at = :now WHERE id = :id AND ${OPEN}`, { id: link.id, now })) === 0) over()
}
