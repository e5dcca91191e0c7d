/**
 * How patient the mail worker is, all in one measure: the pace, 30 s unless NUXT_MAIL_PACE_SECONDS says otherwise (tests do).
 * Waits between tries are 30 s, 2 min, 10 min, 1 h, 6 h and then 24 h each, every one shifted by up to a fifth so that letters
 * which failed together do not all come back together.
 */
export const MOST_ATTEMPTS = 8
const WAITS = [1, 4, 20, 120, 720, 2880] as const
const SHIFT = 0.2

export interface Pace {
  /** Everything in milliseconds. To reach the mail server, and to hear its greeting. */
  connect: number
  /** Silence on an open line. */
  silence: number
  /** A whole delivery, after which it counts as failed. */
  send: number
  /** How long a claimed letter stays with its worker. Longer than a delivery can last, or it would be sent by two at once. */
  lease: number
  /** What a stopping server gives the letter in hand. */
  stop: number
  /** The longest the worker sleeps without looking. */
  look: number
}

export function paceOf(seconds: number): Pace {
  const pace = (Number.isFinite(seconds) && seconds > 0 ? seconds : 30) * 1000
  return { connect: pace / 3, silence: (pace * 2) / 3, send: pace * 1.5, lease: pace * 2, stop: pace / 3, look: pace }
}

/**
 * Milliseconds to wait after the `attempts`-th try failed (1 and up). @param chance 0 to 1, what a die says
 */
export function waitAfter(attempts: number, pace: Pace, chance: number): number {
  const step = WAITS[Math.min(Math.max(attempts, 1), WAITS.length) - 1] ?? 1
  return Math.round(pace.look * step * (1 - SHIFT + 2 * SHIFT * chance))
}
