import { randomBytes } from 'node:crypto'
import type { H3Event } from 'h3'
import { setResponseHeader } from 'h3'
import { Semaphore } from 'async-mutex'
import { useRuntimeConfig } from '#imports'
import { hashPassword, passwordNeedsReHash, verifyPassword } from '#sealed-password'
import { fail, invalid } from './fail'
import { log } from './log'
import { refusedPassword } from './passwordRules'

/**
 * Hashing and checking of passwords: scrypt at the cost that nuxt.config.ts sets (N = 2¹⁷, r = 8, p = 1, so 128 MiB and
 * about half a second each). Never inside a transaction: the writer would wait for it.
 */

/** Two at once leave two of Node's four threads to the database; whoever finds this many waiting is sent away. */
const AT_ONCE = 2
const WAITING_AT_MOST = 32
const seats = new Semaphore(AT_ONCE)
let waiting = 0

async function seated<T>(event: H3Event, task: () => Promise<T>): Promise<T> {
  if (waiting >= WAITING_AT_MOST) {
    log.warn('too many passwords at once', { waiting })
    setResponseHeader(event, 'retry-after', 10)
    fail(429, 'Too many people are signing in at this moment. Try again in ten seconds.')
  }
  waiting += 1
  try {
    return await seats.runExclusive(task)
  } finally {
    waiting -= 1
  }
}

/** A hash that no password fits: checking against it takes as long as against a real one. */
function nobodysHash(): string {
  const { cost = 0, blockSize = 8, parallelization = 1 } = useRuntimeConfig().hash?.scrypt ?? {}
  const text = (bytes: number) => randomBytes(bytes).toString('base64').replace(/=+$/, '')
  return `$scrypt$n=${cost},r=${blockSize},p=${parallelization}$${text(16)}$${text(64)}`
}

/** Does the password fit? Takes about as long when there is no hash at all. @throws 429 when too many wait. */
export function fits(event: H3Event, hash: string | null | undefined, typed: string): Promise<boolean> {
  return seated(event, () => verifyPassword(hash ?? nobodysHash(), typed))
}

/** A hash of a password that may be chosen. @throws 422 at `password` for a common one, 429 when too many wait. */
export async function hashChosen(event: H3Event, password: string, email: string): Promise<string> {
  const why = await refusedPassword(password, email)
  if (why) invalid('password', why)
  return seated(event, () => hashPassword(password))
}

/** The same password hashed at today's cost, or null when the hash already is. */
export async function rehashed(event: H3Event, hash: string, typed: string): Promise<string | null> {
  return passwordNeedsReHash(hash) ? seated(event, () => hashPassword(typed)) : null
}
