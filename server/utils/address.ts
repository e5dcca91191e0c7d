import type { IncomingMessage } from 'node:http'
import { settings } from './settings'

/**
 * The address a request came from. Behind a proxy of one's own (TRUST_PROXY=on) that is the last entry which the proxy
 * added; otherwise the header is anybody's claim and is ignored.
 */
export function remoteAddress(request: IncomingMessage): string {
  if (settings().trustProxy) {
    const forwarded = request.headers['x-forwarded-for']
    const last = (Array.isArray(forwarded) ? forwarded.join(',') : (forwarded ?? '')).split(',').at(-1)?.trim()
    if (last) return last
  }
  return request.socket?.remoteAddress ?? 'unknown'
}
