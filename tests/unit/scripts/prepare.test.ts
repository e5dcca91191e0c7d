import { mkdirSync, mkdtempSync, renameSync, rmSync, utimesSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { dirname, join } from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { hashSources, needsBuild, needsInstall, outputDir, serverEntry, stampInstall, build } from '../../../scripts/lib/prepare.mjs'

let root = ''
const put = (path: string, content: unknown) => {
  const file = join(root, path)
  mkdirSync(dirname(file), { recursive: true })
  writeFileSync(file, typeof content === 'string' ? content : JSON.stringify(content))
}
const lock = (packages: Record<string, object>) => ({ name: 'board', lockfileVersion: 3, packages: { '': {}, ...packages } })

beforeEach(() => {
  root = mkdtempSync(join(tmpdir(), 'tiltyard-prepare-'))
})
afterEach(() => rmSync(root, { recursive: true }))

describe('installing', () => {
  beforeEach(() => {
    put('package-lock.json', lock({ 'node_modules/kite': { version: '1.0.0' } }))
  })

  it('is needed when there is nothing', () => {
    expect(needsInstall(root)).toBe(true)
  })

  it('is needed when a folder is there and nothing says what is in it', () => {
    mkdirSync(join(root, 'node_modules'))
    expect(needsInstall(root)).toBe(true)
  })

  it('is not needed again until the lock file changes', () => {
    mkdirSync(join(root, 'node_modules'))
    stampInstall(root)
    expect(needsInstall(root)).toBe(false)
    put('package-lock.json', lock({ 'node_modules/kite': { version: '1.0.1' } }))
    expect(needsInstall(root)).toBe(true)
  })

  it('is needed when the folder came from another machine', () => {
    put('node_modules/.package-lock.json', { packages: { 'node_modules/kite': { version: '1.0.0' } } })
    expect(needsInstall(root)).toBe(false)
    put('node_modules/.tiltyard-installed.json', { lock: '', machine: 'cp-m-z80' })
    expect(needsInstall(root)).toBe(true)
  })

  it('believes npm’s own list after an installation by hand', () => {
    put('package-lock.json', lock({ 'node_modules/kite': { version: '1.0.0' }, 'node_modules/fin': { version: '2.0.0', optional: true } }))
    const held = (packages: Record<string, object>) => put('node_modules/.package-lock.json', { packages })
    held({ 'node_modules/kite': { version: '1.0.0' } })
    expect(needsInstall(root), 'an optional package may be missing').toBe(false)
    held({ 'node_modules/kite': { version: '1.0.0' }, 'node_modules/fin': { version: '1.9.0' } })
    expect(needsInstall(root), 'but not be another version').toBe(true)
    held({ 'node_modules/fin': { version: '2.0.0' } })
    expect(needsInstall(root), 'others may not be missing').toBe(true)
    held({ 'node_modules/kite': { version: '1.0.0' }, 'node_modules/old': { version: '1.0.0' } })
    expect(needsInstall(root), 'nor be left over').toBe(true)
  })
})

describe('building', () => {
  /** Stands where Nuxt's command is and writes an entry file, or fails. */
  const builder = (ends: 0 | 1) =>
    put(
      'node_modules/nuxt/bin/nuxt.mjs',
      `import { mkdirSync, writeFileSync } from 'node:fs'
       if (${ends}) process.exit(1)
       mkdirSync('.output/server', { recursive: true }); writeFileSync('.output/server/index.mjs', process.argv[2])`,
    )
  const env = { PATH: process.env.PATH }

  beforeEach(() => {
    put('app.vue', '<template />')
    put('server/api/health.get.ts', 'one')
    put('README.md', 'words')
  })

  it('is needed until it has succeeded, and again when a source changes', async () => {
    expect(needsBuild(root, env)).toBe(true)
    builder(0)
    expect(await build(root, { env })).toBe(true)
    expect(needsBuild(root, env)).toBe(false)
    put('server/api/health.get.ts', 'two')
    expect(needsBuild(root, env)).toBe(true)
  })

  it('is needed again after one that failed, even when an older one succeeded', async () => {
    builder(0)
    await build(root, { env })
    builder(1)
    expect(await build(root, { env })).toBe(false)
    expect(needsBuild(root, env)).toBe(true)
  })

  it('is needed when the built server is gone', async () => {
    builder(0)
    await build(root, { env })
    rmSync(serverEntry(root, env))
    expect(needsBuild(root, env)).toBe(true)
  })

  it('is stopped when it takes too long', async () => {
    put('node_modules/nuxt/bin/nuxt.mjs', 'setInterval(() => {}, 1000)')
    expect(await build(root, { env, timeoutMs: 300 })).toBe(false)
  })

  it('goes where TILTYARD_BUILD_DIR says', () => {
    expect(outputDir(root, {})).toBe(join(root, '.output'))
    expect(outputDir(root, { TILTYARD_BUILD_DIR: '/tmp/side' })).toBe('/tmp/side/output')
  })
})

describe('the hash of the sources', () => {
  beforeEach(() => {
    put('pages/index.vue', 'wall')
    put('utils/a.ts', 'ab')
    put('utils/b.ts', 'cd')
  })

  it('does not look at dates, at dot files, or at what is not built', () => {
    const before = hashSources(root)
    utimesSync(join(root, 'pages/index.vue'), 1, 1)
    put('utils/.swap', 'x')
    put('tests/unit/a.test.ts', 'x')
    put('README.md', 'x')
    expect(hashSources(root)).toBe(before)
  })

  it('changes with a name, with a new file, and when text moves from one file to the next', () => {
    const hashes = [hashSources(root)]
    renameSync(join(root, 'utils/b.ts'), join(root, 'utils/c.ts'))
    hashes.push(hashSources(root))
    put('utils/a.ts', 'abc')
    put('utils/c.ts', 'd')
    hashes.push(hashSources(root))
    put('server/middleware/x.ts', '')
    hashes.push(hashSources(root))
    expect(new Set(hashes).size).toBe(4)
  })
})
