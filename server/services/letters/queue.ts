import { v7 as uuid } from 'uuid'
import { Letter } from '~/server/models'
import { row, run, write } from '~/server/models/database'
import { MOST_ATTEMPTS, waitAfter } from './pace'
import type { Pace } from './pace'

/**
 * The outbox as a queue. A letter is claimed under a lease in one transaction, sent outside of any, and marked in another.
 * A crash between the claim and the mark leaves the lease to run out; then the letter is claimed again. So a letter can arrive
 * twice, when the crash falls between the server's yes and our mark, but never not at all; both copies carry the same Message-ID.
 */

export type Outcome =
  | { state: 'sent' }
  /** Try again later. */
  | { state: 'waiting'; why: string }
  /** Refused for good. */
  | { state: 'parked'; why: string }
  /** No longer wanted. */
  | { state: 'dropped'; why: string }

const iso = (at: number) => new Date(at).toISOString()

/** The letter that is due longest, now leased to the caller alone; null when none is due. */
export async function claimLetter(pace: Pace, now = Date.now()): Promise<Letter | null> {
  return write(async () => {
    const claimed = await row<{ id: string }>(
      `UPDATE letters
          SET state = 'sending', lease_by = :lease, lease_until = :until, next_at = NULL, attempts = attempts + 1
        WHERE id = (SELECT id FROM letters
                     WHERE (state = 'waiting' AND next_at <= :now) OR (state = 'sending' AND lease_until <= :now)
                     ORDER BY coalesce(next_at, lease_until), id LIMIT 1)
        RETURNING id`,
      { lease: uuid(), until: iso(now + pace.lease), now: iso(now) },
    )
    return claimed ? Letter.findByPk(claimed.id) : null
  })
}

/**
 * Writes down what became of a claimed letter. Nothing happens when the lease has meanwhile gone to somebody else, for then
 * theirs is the word that counts. @returns the state written, or null.
 */
export async function settleLetter(letter: Letter, outcome: Outcome, pace: Pace, now = Date.now()): Promise<Letter['state'] | null> {
  const final: Outcome =
    outcome.state === 'waiting' && letter.attempts >= MOST_ATTEMPTS
      ? { state: 'parked', why: `Given up after ${letter.attempts} tries. ${outcome.why}` }
      : outcome
  const changed = await write(() =>
    run(
      `UPDATE letters
          SET state = :state, lease_by = NULL, lease_until = NULL, next_at = :nextAt, last_error = :why, sent_at = :sentAt,
              sealed_link = CASE WHEN :state = 'waiting' THEN sealed_link ELSE NULL END
        WHERE id = :id AND state = 'sending' AND lease_by = :lease`,
      {
        id: letter.id,
        lease: letter.leaseBy ?? '',
        state: final.state,
        nextAt: final.state === 'waiting' ? iso(now + waitAfter(letter.attempts, pace, Math.random())) : null,
        why: final.state === 'sent' ? null : final.why.slice(0, 500),
        sentAt: final.state === 'sent' ? iso(now) : null,
      },
    ),
  )
  return changed > 0 ? final.state : null
}

/** When the next letter or lease falls due, in milliseconds since 1970; null when nothing is owed. */
export async function nextDue(): Promise<number | null> {
  const next = await row<{ at: string | null }>(
    `SELECT min(coalesce(next_at, lease_until)) AS at FROM letters WHERE state IN ('waiting', 'sending')`,
  )
  return next?.at ? Date.parse(next.at) : null
}
