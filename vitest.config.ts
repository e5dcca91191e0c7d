import { fileURLToPath } from 'node:url'
import Unimport from 'unimport/unplugin'
import { defineConfig } from 'vitest/config'

const root = fileURLToPath(new URL('.', import.meta.url)).replace(/\/$/, '')
const seconds = (count: number) => count * 1000

/** A suite is a folder of tests/. */
const suite = (name: string) => ({ name, include: [`tests/${name}/**/*.test.ts`] })

export default defineConfig({
  // The project's own tsconfig.json points into the generated .nuxt folder, which unit tests do without.
  tsconfig: 'tests/helpers/tsconfig.vitest.json',
  resolve: { alias: { '~': root, '#imports': `${root}/tests/helpers/imports.ts` } },
  plugins: [
    // What Nuxt imports by itself, for code under test that leaves it out. Works without a generated .nuxt folder.
    Unimport.vite({
      presets: [
        'vue',
        {
          from: 'h3',
          imports: ['createError', 'defineEventHandler', 'getHeader', 'getQuery', 'getRouterParams', 'isError', 'readBody'],
        },
      ],
    }),
  ],
  test: {
    environment: 'node',
    // A test that meets another one's leftovers is worth less than the time that sharing saves.
    isolate: true,
    unstubGlobals: true,
    restoreMocks: true,
    projects: [
      { extends: true, test: { ...suite('unit'), testTimeout: seconds(20), hookTimeout: seconds(20), maxWorkers: 2 } },
      { extends: true, test: { ...suite('outside'), testTimeout: seconds(180), hookTimeout: seconds(30), maxWorkers: 2 } },
      // From here on against the production build, each test file with a server of its own.
      { extends: true, test: { ...suite('api'), testTimeout: seconds(30), hookTimeout: seconds(90), maxWorkers: 2 } },
      { extends: true, test: { ...suite('live'), testTimeout: seconds(120), hookTimeout: seconds(90), maxWorkers: 1 } },
      { extends: true, test: { ...suite('browser'), testTimeout: seconds(180), hookTimeout: seconds(120), maxWorkers: 1 } },
    ],
  },
})
