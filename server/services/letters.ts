import { v7 as uuid } from 'uuid'
import { Letter } from '~/server/models'
import type { Ruling, Take } from '~/server/models'
import { afterCommit, isWriting } from '~/server/models/database'
import { settings } from '~/server/utils/settings'
import { headerLine, messageIdOf, shotThreadId } from './letters/headers'
import { linkLetter } from './letters/linkLetter'
import { readersOf } from './letters/recipients'
import { rulingFacts } from './letters/rulingFacts'
import { rulingLetter } from './letters/rulingLetter'
import { sealLink } from './letters/seal'
import { outbox } from './letters/wake'

/** What the rest of the server owes letters through. They are sent later, by server/plugins/mail.ts. */

/**
 * Writes down a letter to everyone whom the ruling concerns, in the ruling's own transaction: both are stored or neither is.
 * @returns how many letters are owed.
 */
export async function oweRulingLetters(ruling: Ruling): Promise<number> {
  if (!isWriting()) throw new Error('Letters are owed inside the transaction of the ruling only.')
  const readers = await readersOf(ruling.takeId, ruling.personId)
  if (readers.length === 0) return 0
  const { baseUrl, mailFrom } = settings()
  const { facts, shotId } = await rulingFacts(ruling, baseUrl)
  const composed = rulingLetter(facts)
  const now = new Date().toISOString()
  await Letter.bulkCreate(
    readers.map((reader) => {
      const id = uuid()
      return {
        id,
        kind: 'ruling' as const,
        rulingId: ruling.id,
        personId: reader.id,
        toAddress: reader.email,
        toName: headerLine(reader.name),
        messageId: messageIdOf(id, mailFrom),
        threadMessageId: shotThreadId(shotId, mailFrom),
        ...composed,
        nextAt: now,
        createdAt: now,
      }
    }),
  )
  afterCommit(() => outbox.emit('owed'))
  return readers.length
}

/** Who would get a letter if `exceptPersonId` ruled on the take now, by name. */
export async function rulingReaders(take: Take, exceptPersonId: string): Promise<{ id: string; name: string }[]> {
  return (await readersOf(take.id, exceptPersonId)).map(({ id, name }) => ({ id, name }))
}

interface LinkOwed {
  /** Row of `links` that the letter belongs to: the letter is dropped when the link was used, ran out or is gone. */
  linkId: string
  kind: 'invitation' | 'reset'
  toAddress: string
  toName: string
  /** Whose account it is; null for an invitation. */
  personId: string | null
  /** The whole one-use address. */
  url: string
}

/** Writes down the letter that carries a one-use link. Call it in the transaction that makes the link. */
export async function oweLinkLetter({ linkId, kind, toAddress, toName, personId, url }: LinkOwed): Promise<void> {
  const { baseUrl, mailFrom, sessionSecret } = settings()
  const id = uuid()
  const now = new Date().toISOString()
  await Letter.create({
    id,
    kind,
    linkId,
    personId,
    toAddress,
    toName: headerLine(toName),
    messageId: messageIdOf(id, mailFrom),
    ...linkLetter({ kind, toName: headerLine(toName), baseUrl }),
    sealedLink: sealLink(url, id, sessionSecret),
    nextAt: now,
    createdAt: now,
  })
  afterCommit(() => outbox.emit('owed'))
}
