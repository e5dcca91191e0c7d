import { execFile } from 'node:child_process'
import { mkdirSync, mkdtempSync, readFileSync, rmSync, symlinkSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { countLine, countLint, countTests, sum } from '../../../scripts/lib/count.mjs'

const packages = fileURLToPath(new URL('../../../node_modules', import.meta.url))

// Every test here starts a runner, which takes seconds on a busy machine.
describe('counting what Vitest really reports', { timeout: 90_000 }, () => {
  let folder = ''
  beforeAll(() => {
    folder = mkdtempSync(join(tmpdir(), 'tiltyard-count-'))
    symlinkSync(packages, join(folder, 'node_modules'))
  })
  afterAll(() => rmSync(folder, { recursive: true }))

  /** Runs test files of these contents and answers the count. */
  async function count(name: string, contents: string[]) {
    const place = join(folder, name)
    mkdirSync(place)
    contents.forEach((content, i) =>
      writeFileSync(join(place, `${i}.test.mjs`), `import { it, describe, beforeAll, expect } from 'vitest'\n${content}`),
    )
    const report = join(place, 'report.json')
    const args = [join(packages, 'vitest/vitest.mjs'), 'run', '--root', place, '--reporter=json', `--outputFile=${report}`]
    // Of its own, not as a part of the run that this test belongs to.
    const env = Object.fromEntries(Object.entries(process.env).filter(([key]) => !key.startsWith('VITEST')))
    const code = await new Promise<number>((resolve) => {
      execFile(process.execPath, args, { cwd: place, env }, (error) => resolve(error ? Number(error.code) : 0))
    })
    return countTests(readFileSync(report, 'utf8'), code)
  }

  it('takes passed, failed, skipped and planned tests as they are', async () => {
    const counted = await count('mixed', [
      `it('a', () => {}); it('b', () => {}); it('c', () => expect(1).toBe(2)); it.skip('d', () => {}); it.todo('e')`,
    ])
    expect(counted).toEqual({ passed: 2, failed: 1, skipped: 2 })
  })

  it('counts a file that cannot be loaded, and a set-up that throws, as failed', async () => {
    const counted = await count('broken', [
      `it('a', () => {})`,
      `import './not-there.mjs'; it('b', () => {})`,
      `describe('c', () => { beforeAll(() => { throw new Error('no') }); it('d', () => {}) })`,
    ])
    expect(counted).toEqual({ passed: 1, failed: 2, skipped: 1, why: '2 test files failed outside of any test.' })
  })

  it('counts an error outside of all tests as failed', async () => {
    const counted = await count('loose', [`it('a', async () => { setTimeout(() => { throw new Error('loose') }); await new Promise((r) => setTimeout(r, 50)) })`])
    expect(counted).toMatchObject({ passed: 1, failed: 1, skipped: 0 })
  })

  it('counts a run without a single test as failed, also when all are skipped', async () => {
    expect(await count('empty', [])).toMatchObject({ passed: 0, failed: 1, skipped: 0 })
    expect(await count('skipped', [`it.skip('a', () => {})`])).toMatchObject({ passed: 0, failed: 1, skipped: 1 })
  })

  it('is content when all is well', async () => {
    expect(await count('well', [`it('a', () => {})`])).toEqual({ passed: 1, failed: 0, skipped: 0 })
  })
})

describe('counting without a report', () => {
  it.each([null, '', '{"testRes', '{}', '[]'])('fails once on %o', (report) => {
    expect(countTests(report, 0)).toMatchObject({ passed: 0, failed: 1, skipped: 0 })
  })
})

describe('lint', () => {
  const file = (errorCount: number) => ({
    filePath: '/x/a.ts',
    errorCount,
    messages: [{ line: 3, column: 7, severity: 2, message: 'No.', ruleId: 'no-no' }].slice(0, errorCount),
  })

  it('fails once however many errors there are, and repeats them', () => {
    expect(countLint(JSON.stringify([file(0), file(1), file(1)]), 1)).toEqual({
      passed: 0,
      failed: 1,
      skipped: 0,
      why: 'ESLint found 2 errors.',
      messages: ['/x/a.ts:3:7 error No. (no-no)', '/x/a.ts:3:7 error No. (no-no)'],
    })
  })

  it('adds nothing when clean, fails when ESLint itself did', () => {
    expect(countLint(JSON.stringify([file(0)]), 0)).toEqual({ passed: 0, failed: 0, skipped: 0, messages: [] })
    expect(countLint(JSON.stringify([file(0)]), 2).failed).toBe(1)
    expect(countLint(null, 2).failed).toBe(1)
  })
})

describe('the last line', () => {
  it('sums, and speaks of skipped tests only when there are any', () => {
    const total = sum([
      { passed: 3, failed: 0, skipped: 0 },
      { passed: 4, failed: 1, skipped: 2, why: 'x' },
    ])
    expect(total).toEqual({ passed: 7, failed: 1, skipped: 2 })
    expect(countLine(total)).toBe('7 passed, 1 failed, 2 skipped')
    expect(countLine({ passed: 7, failed: 0, skipped: 0 })).toBe('7 passed, 0 failed')
  })
})
