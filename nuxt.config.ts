import { basename } from 'node:path'
import type { NitroConfig } from 'nitropack'
import { fileURLToPath } from 'node:url'
import type { Nuxt } from 'nuxt/schema'

// A build folder of one's own lets two builds run side by side (tests beside development). The intermediate files stay
// inside the checkout, where the packages they import are found.
const buildDir = process.env.TILTYARD_BUILD_DIR

export default defineNuxtConfig({
  modules: [
    '@nuxtjs/tailwindcss',
    '@pinia/nuxt',
    'nuxt-auth-utils',
    '@nuxt/icon',
    '@nuxt/eslint',
    // Vue numbers its ids anew behind every component that prefetches. Nuxt strips that from the browser's half only, and
    // behind the first icon every label would point at an id that its field does not have.
    (_: unknown, nuxt: Nuxt) => {
      const { client } = nuxt.options.optimization.treeShake.composables
      client.vue = (client.vue ?? []).filter((name) => name !== 'onServerPrefetch')
    },
  ],
  // Folders sit at the root, as DEVELOPERS.md draws them.
  srcDir: '.',
  alias: {
    // nuxt-auth-utils offers its server half through '#imports' only, which means something else to the app's type check.
    '#sealed-cookie': fileURLToPath(
      new URL('./node_modules/nuxt-auth-utils/dist/runtime/server/utils/session.js', import.meta.url),
    ),
    '#sealed-password': fileURLToPath(
      new URL('./node_modules/nuxt-auth-utils/dist/runtime/server/utils/password.js', import.meta.url),
    ),
  },
  ...(buildDir ? { buildDir: `.nuxt-${basename(buildDir)}` } : {}),
  compatibilityDate: '2026-11-01',
  devtools: { enabled: false },
  telemetry: false,
  ssr: true,
  css: ['~/assets/css/main.css'],
  components: [{ path: '~/components', pathPrefix: true }],
  imports: { dirs: ['stores', 'composables'] },
  // Nothing here changes between two builds of one start: no page needs to ask which build is served.
  experimental: { appManifest: false },
  app: {
    head: {
      htmlAttrs: { lang: 'en' },
      title: 'Tiltyard',
      meta: [{ name: 'viewport', content: 'width=device-width, initial-scale=1' }],
      link: [{ rel: 'icon', type: 'image/svg+xml', href: '/favicon.svg' }],
    },
  },
  icon: {
    // Drawn on the page from the bundle: no request ever leaves for an icon.
    provider: 'none',
    // As SVG in the page: the other way writes a style element, which the content security policy refuses.
    mode: 'svg',
    serverBundle: false,
    clientBundle: { scan: true, sizeLimitKb: 64 },
    fallbackToApi: false,
  },
  auth: {
    // The sealed cookie carries only a session id; server/utils/session.ts reads the row every time.
    loadStrategy: 'none',
    // scrypt at the cost of security.md 11.4.2: 128 MiB for each; server/utils/password.ts hashes few at once.
    hash: { scrypt: { cost: 2 ** 17, blockSize: 8, parallelization: 1, maxMemory: 256 * 1024 * 1024 } },
  },
  runtimeConfig: {
    // Each is set at run time by NUXT_…; scripts/start.mjs fills them from the settings in README.md.
    session: {
      password: '',
      name: 'tiltyard',
      maxAge: 60 * 60 * 24 * 30,
      // The cookie and nothing else: a header of another name would be a second way in.
      sessionHeader: false as const,
      cookie: { sameSite: 'lax' as const, secure: false },
    },
    dataDir: '.data',
    baseUrl: '',
    demo: 'on',
    mailUrl: '',
    mailFrom: 'Tiltyard <board@tiltyard.invalid>',
    // How patient the mail worker is (server/services/letters/pace.ts); only tests are in more of a hurry.
    mailPaceSeconds: 30,
    trustProxy: 'off',
  },
  nitro: {
    preset: 'node-server',
    experimental: { websocket: true },
    ...(buildDir ? { output: { dir: `${buildDir}/output` } } : {}),
    externals: { external: ['sequelize', 'sqlite3'] },
    // Taken from the server's folder, which is Nitro's own root.
    serverAssets: [{ baseName: 'migrations', dir: './migrations' }],
    typescript: { strict: true },
  },
  typescript: {
    strict: true,
    tsConfig: { compilerOptions: { paths: { odex: ['../tests/types/odex.d.ts'] } }, exclude: ['../.output*', '../.nuxt-*'] },
  },
  tailwindcss: { cssPath: '~/assets/css/main.css', configPath: 'tailwind.config.ts', viewer: false },
  hooks: {
    // nuxt-auth-utils would give every visitor a cookie (for sockets of its own) and answer a second sign-out that our gates
    // do not guard: sessions are server/utils/session.ts's business alone.
    'nitro:config'(nitro: NitroConfig) {
      nitro.plugins = nitro.plugins?.filter((plugin) => !/nuxt-auth-utils.*plugins[/\\]ws$/.test(plugin ?? ''))
      nitro.handlers = nitro.handlers?.filter((handler) => handler?.route !== '/api/_auth/session')
    },
  },
  eslint: { config: { stylistic: false } },
  // The development server's own reload socket listens on this machine only, like everything else.
  vite: { build: { target: 'es2022' }, server: { hmr: { host: '127.0.0.1' } } },
})
