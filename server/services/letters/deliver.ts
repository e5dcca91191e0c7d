import type { Letter } from '~/server/models'
import type { Carrier } from './carriers'
import { headerLine } from './headers'
import { fillLink } from './linkLetter'
import { messageOf } from './message'
import type { Outcome } from './queue'
import { recheck } from './recheck'
import { openLink } from './seal'

interface Means {
  carrier: Carrier
  from: string
  baseUrl: string
  sessionSecret: string
  /** Ends the delivery: its time is up, or the server stops. */
  signal: AbortSignal
}

/** Sends one claimed letter, outside of any transaction, and says what became of it. Never throws. */
export async function deliver(letter: Letter, { carrier, from, baseUrl, sessionSecret, signal }: Means): Promise<Outcome> {
  try {
    const now = await recheck(letter)
    if ('dropped' in now) return { state: 'dropped', why: now.dropped }
    let body = { text: letter.text, html: letter.html }
    if (letter.kind !== 'ruling') {
      const url = letter.sealedLink ? openLink(letter.sealedLink, letter.id, sessionSecret) : null
      if (!url) return { state: 'parked', why: 'The one-use link can no longer be opened. Make a new one.' }
      body = fillLink(body, url)
    }
    await carrier.carry(letter.id, messageOf(letter, { from, baseUrl, ...now, ...body }), signal)
    return { state: 'sent' }
  } catch (problem) {
    return outcomeOf(problem)
  }
}

interface MailProblem {
  message?: unknown
  response?: unknown
  responseCode?: unknown
}

/** Answers about our own sign-in or TLS at the mail server (RFC 4954): the keeper mends a setting, the letter is not to blame. */
const ABOUT_OURSELVES = new Set([530, 534, 535, 538])

/**
 * A 5xx answer to a letter is final. Anything else (a 4xx, a line that drops, silence, a mail server that does not let us
 * in) may go better later.
 */
export function outcomeOf(problem: unknown): Outcome {
  const { message, response, responseCode }: MailProblem = problem !== null && typeof problem === 'object' ? problem : {}
  // The server's own words where it spoke.
  const why = headerLine(String(response || message || problem)).slice(0, 480) || 'No reason was given.'
  const refused = typeof responseCode === 'number' && responseCode >= 500 && responseCode < 600 && !ABOUT_OURSELVES.has(responseCode)
  return { state: refused ? 'parked' : 'waiting', why }
}
