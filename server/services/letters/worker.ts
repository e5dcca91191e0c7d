import { AsyncResource } from 'node:async_hooks'
import type { Letter } from '~/server/models'
import { log } from '~/server/utils/log'
import type { Pace } from './pace'
import { claimLetter, nextDue, settleLetter } from './queue'
import type { Outcome } from './queue'

export interface MailWorker {
  /** A letter may be due: look now. */
  wake(): void
  /** Finishes the letter in hand, for at most `pace.stop`, and claims no more. */
  stop(): Promise<void>
}

/**
 * Sends what the outbox owes, one letter after the other, and sleeps until the next is due.
 * @param send delivers one letter and never throws; its signal ends the delivery.
 */
export function startMailWorker(pace: Pace, send: (letter: Letter, signal: AbortSignal) => Promise<Outcome>): MailWorker {
  const stopping = new AbortController()
  let stopped = false
  let again = false
  let round: Promise<void> | null = null
  let timer: NodeJS.Timeout | undefined

  async function sendOne(): Promise<boolean> {
    const letter = await claimLetter(pace)
    if (!letter) return false
    const outcome = await send(letter, AbortSignal.any([stopping.signal, AbortSignal.timeout(pace.send)]))
    const state = await settleLetter(letter, outcome, pace)
    const facts = { letter: letter.id, kind: letter.kind, attempt: letter.attempts, why: 'why' in outcome ? outcome.why : null }
    if (state === 'sent' || state === 'dropped') log.info(`letter ${state}`, facts)
    else log.warn(state ? `letter ${state}` : 'letter was claimed by another worker', facts)
    return true
  }

  async function work(): Promise<void> {
    let wait = pace.look
    try {
      while (!stopped && (await sendOne())) again = false
      const due = stopped ? null : await nextDue()
      if (due !== null) wait = Math.min(pace.look, Math.max(10, due - Date.now()))
    } catch (problem) {
      // The outbox itself could not be read or written: the letters are still there, so look again later.
      log.error('mail worker failed', { problem: String(problem) })
    }
    round = null
    if (!stopped) timer = setTimeout(wake, again ? 0 : wait).unref()
    again = false
  }

  function wake(): void {
    if (stopped) return
    again = true
    if (round) return
    clearTimeout(timer)
    again = false
    round = work()
  }

  async function stop(): Promise<void> {
    stopped = true
    clearTimeout(timer)
    const patience = setTimeout(() => stopping.abort(new Error('The server stopped while the letter was on its way.')), pace.stop)
    await round
    clearTimeout(patience)
  }

  wake()
  // Whoever wakes the worker may be inside a transaction that has just ended; the worker's own queries must not look for it.
  return { wake: AsyncResource.bind(wake), stop }
}
