import { randomBytes } from 'node:crypto'
import { defineNitroPlugin } from '#imports'

const HTML = /^text\/html/

/**
 * The content security policy of a page: scripts and styles of our own files, or inline with this answer's nonce.
 * Drawings set positions through style attributes, which cannot carry a nonce; they can load nothing.
 */
export function pagePolicy(nonce: string): string {
  return [
    "default-src 'none'",
    `script-src 'self' 'nonce-${nonce}'`,
    `style-src 'self' 'nonce-${nonce}'`,
    "style-src-attr 'unsafe-inline'",
    "img-src 'self' data: blob:",
    "font-src 'self'",
    "connect-src 'self'",
    "manifest-src 'self'",
    "frame-src 'self'",
    "worker-src 'self'",
    "form-action 'self'",
    "object-src 'none'",
    "base-uri 'none'",
    "frame-ancestors 'none'",
  ].join('; ')
}

/** Marks the framework's own inline tags; what people wrote is escaped before it gets here, so it holds no tag. */
const withNonce = (chunks: string[], nonce: string) =>
  chunks.map((chunk) => chunk.replace(/<(script|style)(?=[\s>])(?![^>]*\snonce=)/g, `<$1 nonce="${nonce}"`))

export default defineNitroPlugin((nitro) => {
  // The development server injects scripts of its own that know no nonce.
  if (import.meta.dev) return
  nitro.hooks.hook('render:html', (html, { event }) => {
    const nonce = randomBytes(16).toString('base64')
    event.context.nonce = nonce
    html.head = withNonce(html.head, nonce)
    html.bodyPrepend = withNonce(html.bodyPrepend, nonce)
    html.bodyAppend = withNonce(html.bodyAppend, nonce)
  })
  nitro.hooks.hook('render:response', (response, { event }) => {
    const nonce = event.context.nonce
    if (typeof nonce !== 'string' || !HTML.test(String(response.headers?.['content-type'] ?? 'text/html'))) return
    response.headers = { ...response.headers, 'content-security-policy': pagePolicy(nonce), 'cache-control': 'no-store' }
  })
})
