import type { Letter } from '~/server/models'
import { row } from '~/server/models/database'
import { isPlainAddress } from './headers'

/** Where a letter goes, as of now, or why it goes nowhere. */
export type Recheck = { to: { name: string; address: string }; listId: string | null } | { dropped: string }

/**
 * Asks again, right before sending, what was true when the letter was written: hours may have passed. A letter goes to the
 * address that its reader's account has now.
 */
export async function recheck(letter: Letter): Promise<Recheck> {
  const found = letter.kind === 'ruling' ? await rulingReader(letter) : await linkReader(letter)
  if ('to' in found && !isPlainAddress(found.to.address)) return { dropped: 'The address is not a mail address.' }
  return found
}

interface ReaderRow {
  name: string
  email: string
  disabled: number
  member: number
  wants: number
  production: string
  slug: string
}

async function rulingReader(letter: Letter): Promise<Recheck> {
  const reader = await row<ReaderRow>(
    `SELECT people.name, people.email, people.disabled_at IS NOT NULL AS disabled,
            memberships.person_id IS NOT NULL AS member,
            people.mail_wish = 'all'
              OR (people.mail_wish = 'own-takes' AND (people.id = takes.person_id OR people.id IS shots.animator_id)) AS wants,
            productions.title AS production, productions.slug
       FROM rulings
       JOIN takes ON takes.id = rulings.take_id
       JOIN shots ON shots.id = takes.shot_id
       JOIN productions ON productions.id = shots.production_id
       JOIN people ON people.id = :personId
       LEFT JOIN memberships ON memberships.production_id = productions.id AND memberships.person_id = people.id
      WHERE rulings.id = :rulingId`,
    { personId: letter.personId, rulingId: letter.rulingId },
  )
  if (!reader) return { dropped: 'The ruling or its reader is gone.' }
  if (reader.disabled) return { dropped: 'The account is disabled.' }
  if (!reader.member) return { dropped: `No longer a member of ${reader.production}.` }
  if (!reader.wants) return { dropped: 'Does not want this letter any more.' }
  return { to: { name: reader.name, address: reader.email }, listId: `${reader.slug}.rulings` }
}

interface LinkRow {
  email: string
  name: string
  used: number
  over: number
  accountName: string | null
  accountEmail: string | null
  disabled: number
}

async function linkReader(letter: Letter): Promise<Recheck> {
  const link = await row<LinkRow>(
    `SELECT links.email, links.name, links.used_at IS NOT NULL AS used, links.expires_at <= :now AS over,
            people.name AS accountName, people.email AS accountEmail, people.disabled_at IS NOT NULL AS disabled
       FROM links LEFT JOIN people ON people.id = links.person_id
      WHERE links.id = :linkId`,
    { linkId: letter.linkId, now: new Date().toISOString() },
  )
  if (!link) return { dropped: 'The link is gone.' }
  if (link.used) return { dropped: 'The link has been used.' }
  if (link.over) return { dropped: 'The link has run out.' }
  if (link.disabled) return { dropped: 'The account is disabled.' }
  return { to: { name: link.accountName ?? link.name, address: link.accountEmail ?? link.email }, listId: null }
}
