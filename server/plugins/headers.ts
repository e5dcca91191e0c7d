import { setResponseHeaders } from 'h3'
import { defineNitroPlugin, useRuntimeConfig } from '#imports'
import { settings } from '~/server/utils/settings'

/**
 * Headers that every answer carries, files included: those are answered before any middleware runs. A page replaces the
 * policy with one of its own (server/plugins/page-security.ts).
 */
export default defineNitroPlugin((nitro) => {
  nitro.hooks.hook('request', (event) => {
    // Nitro would read the whole environment again for every request (a third of a route's time); our settings do not change while
    // the server runs, so each request gets the ones read at the start.
    event.context.nitro = { ...event.context.nitro, runtimeConfig: useRuntimeConfig() }
    setResponseHeaders(event, {
      'x-content-type-options': 'nosniff',
      'referrer-policy': 'same-origin',
      'cross-origin-opener-policy': 'same-origin',
      'cross-origin-resource-policy': 'same-origin',
      'permissions-policy': 'camera=(), microphone=(), geolocation=(), payment=(), usb=()',
      'x-frame-options': 'DENY',
      ...(import.meta.dev ? {} : { 'content-security-policy': "default-src 'none'; frame-ancestors 'none'; base-uri 'none'" }),
      ...(settings().baseUrl.startsWith('https:') ? { 'strict-transport-security': 'max-age=31536000' } : {}),
    })
  })
})
