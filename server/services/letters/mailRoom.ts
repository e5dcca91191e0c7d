import { Letter } from '~/server/models'
import { afterCommit, row, rows, run } from '~/server/models/database'
import { fail, notFound } from '~/server/utils/fail'
import { letterStates } from '~/utils/contracts/letter'
import type { Letter as WireLetter, LetterLine, LettersAnswer, LetterState } from '~/utils/contracts/letter'
import { hideLink } from './linkLetter'
import { outbox } from './wake'

const PAGE = 50

type Columns = LetterLine & { messageId: string; text: string; html: string; sealed: number }
const LINE = `id, kind, to_address AS "to", to_name AS toName, subject, state, attempts, next_at AS nextAt, sent_at AS sentAt,
              last_error AS lastError, created_at AS createdAt`

/** One page of the mail room, newest first; `carrier` is where letters go at present. */
export async function listLetters(query: { state?: LetterState; after?: string }, carrier: string): Promise<LettersAnswer> {
  const { state = null, after = null } = query
  const found = await rows<LetterLine>(
    `SELECT ${LINE} FROM letters
      WHERE (:state IS NULL OR state = :state)
        AND (:after IS NULL OR (created_at, id) < (SELECT created_at, id FROM letters WHERE id = :after))
      ORDER BY created_at DESC, id DESC LIMIT ${PAGE + 1}`,
    { state, after },
  )
  const counted = await rows<{ state: LetterState; n: number }>('SELECT state, count(*) AS n FROM letters GROUP BY state')
  const count = (wanted: LetterState) => counted.find((one) => one.state === wanted)?.n ?? 0
  return {
    letters: found.slice(0, PAGE),
    more: found.length > PAGE,
    counts: Object.fromEntries(letterStates.map((one) => [one, count(one)])) as Record<LetterState, number>,
    carrier,
  }
}

/** One letter as anyone but its reader may see it. @throws 404 */
export async function showLetter(id: string): Promise<WireLetter> {
  const found = await row<Columns>(
    `SELECT ${LINE}, message_id AS messageId, text, html, sealed_link IS NOT NULL AS sealed FROM letters WHERE id = :id`,
    { id },
  )
  if (!found) return notFound()
  const { sealed, ...letter } = found
  return { ...letter, ...hideLink(letter), sendable: letter.state !== 'sending' && (letter.kind === 'ruling' || sealed === 1) }
}

/**
 * Puts a letter back into the outbox, due now: one that was parked, dropped or sent starts over, one that waits for its next
 * try gets it at once. It keeps its Message-ID, so that a reader who has it already is not shown it twice.
 * @throws 404, or 409 when it is on its way, or its one-use link is gone
 */
export async function sendAgain(id: string): Promise<WireLetter> {
  const letter = (await Letter.findByPk(id)) ?? notFound()
  if (letter.state === 'sending') return fail(409, 'This letter is on its way right now.')
  if (letter.kind !== 'ruling' && !letter.sealedLink)
    return fail(409, 'The one-use link of this letter is gone. Make a new invitation or ask for a new password instead.')
  await run(
    `UPDATE letters
        SET state = 'waiting', attempts = CASE WHEN state = 'waiting' THEN attempts ELSE 0 END,
            next_at = :now, sent_at = NULL, last_error = CASE WHEN state = 'waiting' THEN last_error ELSE NULL END
      WHERE id = :id AND state <> 'sending'`,
    { id, now: new Date().toISOString() },
  )
  afterCommit(() => outbox.emit('owed'))
  return showLetter(id)
}
