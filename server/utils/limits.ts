import { createHash } from 'node:crypto'
import { isIPv6 } from 'node:net'
import { setTimeout as pause } from 'node:timers/promises'
import type { H3Event } from 'h3'
import { setResponseHeader } from 'h3'
import { RateLimiterMemory, RateLimiterRes } from 'rate-limiter-flexible'
import { remoteAddress } from './address'
import { fail } from './fail'
import { knownBrowser } from './knownBrowser'
import { log } from './log'
import { findPerson } from './session'

/**
 * How often, per address and per person, counted in this process's memory.
 *
 * | what           | counted           | per address        | per person or account                              |
 * |----------------|-------------------|--------------------|----------------------------------------------------|
 * | sign-in        | bad ones          | 100 in 15 minutes  | with the address: 10 in 15 minutes, then 429;      |
 * |                |                   |                    | from anywhere: the 6th in an hour waits ½ s, then  |
 * |                |                   |                    | 1, 2, 4 and at most 8 s, and is never refused      |
 * | sign-in, in a browser that has signed in to the account before: 10 bad ones in 15 minutes of its own, no wait     |
 * | first-keeper   | all               | 10 in 15 minutes   |                                                    |
 * | reset-ask      | all               | 20 in an hour      | 3 letters an hour; beyond that none is written     |
 * | link-look      | all               | 60 in 15 minutes   |                                                    |
 * | link-use       | all               | 30 in 15 minutes   |                                                    |
 * | own-password   | all               |                    | 10 in 15 minutes, per session                      |
 * | invite         | all               |                    | 60 in an hour                                      |
 * | check, a take  | each 250 keys     | 900 in a minute    | 300 in a minute                                    |
 * | comment        | all               | 900 in a minute    | 120 in a minute                                    |
 *
 * Nobody can lock another out: what is counted against an account from elsewhere only ever makes a try wait, and a
 * browser that the person has used before is not counted with strangers, not even with those at the same address.
 */
const MINUTE = 60
const QUARTER = 15 * MINUTE
const HOUR = 60 * MINUTE

type Allowance = readonly [times: number, seconds: number]
interface Rule {
  address?: Allowance
  person?: Allowance
}
const rules = {
  'first-keeper': { address: [10, QUARTER] },
  'reset-ask': { address: [20, HOUR] },
  'link-look': { address: [60, QUARTER] },
  'link-use': { address: [30, QUARTER] },
  invite: { person: [60, HOUR] },
  check: { address: [900, MINUTE], person: [300, MINUTE] },
  // Faster than anybody types: for a script that has gone wrong.
  comment: { address: [900, MINUTE], person: [120, MINUTE] },
} as const satisfies Record<string, Rule>
export type Limited = keyof typeof rules

const PAIR: Allowance = [10, QUARTER]
const ADDRESS: Allowance = [100, QUARTER]
const OWN_BROWSER: Allowance = [10, QUARTER]
const FREE_TRIES = 5
const LONGEST_WAIT_MS = 8_000

const counter = ([points, duration]: Allowance) => new RateLimiterMemory({ points, duration })
const counters = new Map<string, RateLimiterMemory>()
for (const [name, rule] of Object.entries<Rule>(rules)) {
  if (rule.address) counters.set(`${name}:address`, counter(rule.address))
  if (rule.person) counters.set(`${name}:person`, counter(rule.person))
}
const pairs = counter(PAIR)
const addresses = counter(ADDRESS)
const ownBrowsers = counter(OWN_BROWSER)
const ownPasswords = counter([10, QUARTER])
const resetLetters = counter([3, HOUR])
const accountTries = counter([Number.MAX_SAFE_INTEGER, HOUR])

/** Whom an address counts as: one IPv6 customer holds a whole /64. */
export function networkOf(address: string): string {
  const plain = address.replace(/^::ffff:(?=\d+\.\d+\.\d+\.\d+$)/i, '').replace(/%.*$/, '')
  if (!isIPv6(plain)) return plain
  const [head = '', tail] = plain.toLowerCase().split('::')
  const front = head === '' ? [] : head.split(':')
  const back = tail ? tail.split(':') : []
  const zeros = tail === undefined ? [] : Array<string>(Math.max(0, 8 - front.length - back.length)).fill('0')
  return [...front, ...zeros, ...back].slice(0, 4).map((part) => part.replace(/^0+(?=.)/, '')).join(':') + '::/64'
}

/** How long the n-th bad try on one account within the hour waits, in milliseconds. */
export function waitBefore(tries: number): number {
  return tries <= FREE_TRIES ? 0 : Math.min(LONGEST_WAIT_MS, 500 * 2 ** (tries - FREE_TRIES - 1))
}

const networkOfEvent = (event: H3Event) => networkOf(remoteAddress(event.node.req))
/** Keys are as long as somebody likes to type: keep a short hash of them. */
const short = (text: string) => createHash('sha256').update(text).digest('base64url').slice(0, 22)

/** @throws 429 with Retry-After. */
async function take(event: H3Event, from: RateLimiterMemory, key: string, what: string, cost = 1): Promise<void> {
  try {
    await from.consume(key, cost)
  } catch (problem) {
    if (!(problem instanceof RateLimiterRes)) throw problem
    const seconds = Math.max(1, Math.ceil(problem.msBeforeNext / 1000))
    log.warn('limited', { what, address: remoteAddress(event.node.req) })
    setResponseHeader(event, 'retry-after', seconds)
    fail(429, `Too many tries. Wait ${inWords(seconds)}, then try again.`)
  }
}

function inWords(seconds: number): string {
  if (seconds <= 90) return seconds === 1 ? 'a second' : `${seconds} seconds`
  return `${Math.ceil(seconds / 60)} minutes`
}

/**
 * Counts this request against the allowances of the table above, as `cost` of them. @throws 429 with Retry-After when they
 * are used up.
 */
export async function limit(event: H3Event, what: Limited, cost = 1): Promise<void> {
  const byAddress = counters.get(`${what}:address`)
  if (byAddress) await take(event, byAddress, networkOfEvent(event), what, cost)
  const byPerson = counters.get(`${what}:person`)
  const person = byPerson && (await findPerson(event))
  if (byPerson && person) await take(event, byPerson, person.id, what, cost)
}

/** Counts a list that is about to be judged: the longest takes a third of a second, in which nobody else is served. @throws 429 */
export const limitJudging = (event: H3Event, keys: readonly unknown[]) => limit(event, 'check', Math.ceil(keys.length / 250))

/** Counts a try at the current password by somebody who is signed in. Per session: a stolen one locks out itself only. */
export async function limitOwnPassword(event: H3Event): Promise<void> {
  const person = await findPerson(event)
  if (person) await take(event, ownPasswords, person.sessionId, 'own-password')
}

/** May another reset letter go to this address within the hour? Asking is never refused for it, so that it tells nothing. */
export async function resetLetterAllowed(email: string): Promise<boolean> {
  return resetLetters.consume(short(email)).then(
    () => true,
    () => false,
  )
}

/**
 * Lets a sign-in through, after a wait where the account has had many bad tries. It counts as a bad one, before the
 * password is looked at so that many at once are counted too, until the returned function says that it was good.
 * @throws 429 with Retry-After.
 */
export async function admitSignIn(event: H3Event, email: string): Promise<() => Promise<void>> {
  const network = networkOfEvent(event)
  const browser = knownBrowser(event, email)
  if (browser) {
    const own = short(`${browser} ${email}`)
    if (await ownBrowsers.consume(own).then(() => true, () => false)) return async () => void (await ownBrowsers.delete(own))
  }
  const pair = short(`${network} ${email}`)
  const account = short(email)
  await take(event, pairs, pair, 'sign-in')
  await take(event, addresses, network, 'sign-in')
  const { consumedPoints } = await accountTries.consume(account)
  await pause(waitBefore(consumedPoints))
  return async () => {
    await Promise.all([pairs.delete(pair), addresses.reward(network), accountTries.reward(account)])
  }
}
