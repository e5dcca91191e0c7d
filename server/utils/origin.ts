import type { IncomingHttpHeaders } from 'node:http'
import { settings } from './settings'

const LOOPBACK = /^(?:localhost|127\.0\.0\.1|\[::1\])(?::\d+)?$/i

/**
 * Is this `Origin` our own? Ours is the public address; on a loopback name also the very host that was asked, so that
 * `localhost` and `127.0.0.1` both work. A request without an Origin is no browser's cross-site request.
 */
export function isOwnOrigin(headers: IncomingHttpHeaders): boolean {
  const origin = headers.origin
  if (origin === undefined) return headers['sec-fetch-site'] === undefined || headers['sec-fetch-site'] === 'same-origin'
  const host = headers.host ?? ''
  const { baseUrl } = settings()
  if (baseUrl && origin === new URL(baseUrl).origin) return true
  return LOOPBACK.test(host) && origin === `http://${host}`
}
