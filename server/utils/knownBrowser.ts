import { createHmac, randomBytes, timingSafeEqual } from 'node:crypto'
import type { H3Event } from 'h3'
import { getCookie, setCookie } from 'h3'
import { useRuntimeConfig } from '#imports'
import { secureCookies } from './session'
import { settings } from './settings'

/**
 * A browser in which somebody has signed in before keeps a note of that, good for the same account only. Such a browser
 * has an allowance of its own (limits.ts): strangers who guess at the account, from anywhere, cannot use it up. The note
 * opens nothing and names nobody.
 */
const KEPT_SECONDS = 180 * 24 * 60 * 60

const cookieName = () => (useRuntimeConfig().session.name ?? 'tiltyard') + '-known'

function signature(nonce: string, email: string): Buffer {
  return createHmac('sha256', settings().sessionSecret).update(`known-browser\n${nonce}\n${email}`).digest()
}

/** Who this browser is for the limits, when it has signed in to this account before; otherwise null. */
export function knownBrowser(event: H3Event, email: string): string | null {
  const [nonce = '', said = ''] = (getCookie(event, cookieName()) ?? '').split('.')
  const given = Buffer.from(said, 'base64url')
  const expected = signature(nonce, email)
  return given.length === expected.length && timingSafeEqual(given, expected) ? nonce : null
}

export function rememberBrowser(event: H3Event, email: string): void {
  const nonce = randomBytes(16).toString('base64url')
  setCookie(event, cookieName(), `${nonce}.${signature(nonce, email).toString('base64url')}`, {
    httpOnly: true,
    sameSite: 'lax',
    path: '/',
    secure: secureCookies(),
    maxAge: KEPT_SECONDS,
  })
}
