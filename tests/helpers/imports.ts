/**
 * What Nuxt offers to server code under `#imports`, for unit tests, which run without Nuxt: h3 as it is, and the
 * settings straight from the environment under the names that the start script uses.
 */
export * from 'h3'

export const defineNitroPlugin = <T>(plugin: T): T => plugin

export function useRuntimeConfig() {
  const { env } = process
  return {
    session: { password: env.NUXT_SESSION_PASSWORD ?? '', name: env.NUXT_SESSION_NAME ?? 'tiltyard' },
    dataDir: env.NUXT_DATA_DIR ?? '.data',
    baseUrl: env.NUXT_BASE_URL ?? '',
    demo: env.NUXT_DEMO ?? 'on',
    mailUrl: env.NUXT_MAIL_URL ?? '',
    mailFrom: env.NUXT_MAIL_FROM ?? 'Tiltyard <board@tiltyard.invalid>',
    trustProxy: env.NUXT_TRUST_PROXY ?? 'off',
  }
}
