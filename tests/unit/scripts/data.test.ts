import { chmodSync, mkdtempSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { prepareDataDir, sessionSecret } from '../../../scripts/lib/data.mjs'

let folder = ''
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'tiltyard-data-'))
})
afterEach(() => rmSync(folder, { recursive: true }))
const mode = (path: string) => statSync(path).mode & 0o777

describe('the data folder', () => {
  it('is made for its owner alone, and left clean', () => {
    const made = join(folder, 'deep', 'data')
    prepareDataDir(made)
    expect(mode(made)).toBe(0o700)
    expect(readdirSync(made)).toEqual([])
  })

  it('that is a file is refused in one sentence', () => {
    writeFileSync(join(folder, 'file'), '')
    expect(() => prepareDataDir(join(folder, 'file'))).toThrow(/^The data folder .* cannot be written \(ENOTDIR\): set DATA_DIR/)
    expect(() => prepareDataDir(join(folder, 'file', 'data'))).toThrow(/cannot be written \(ENOTDIR\)/)
  })

  it('where even root may not write is refused in one sentence', () => {
    expect(() => prepareDataDir('/proc/tiltyard')).toThrow(/^The data folder \/proc\/tiltyard cannot be written/)
  })
})

describe('the session secret', () => {
  it('is made once, long and random, for its owner alone', () => {
    const secret = sessionSecret(folder)
    expect(secret).toMatch(/^[0-9a-f]{64}$/)
    expect(mode(join(folder, 'session-secret'))).toBe(0o600)
    expect(sessionSecret(folder)).toBe(secret)
    expect(readdirSync(folder)).toEqual(['session-secret'])
    rmSync(join(folder, 'session-secret'))
    expect(sessionSecret(folder)).not.toBe(secret)
  })

  it('is closed to others when a copy has opened it', () => {
    const secret = sessionSecret(folder)
    chmodSync(join(folder, 'session-secret'), 0o644)
    expect(sessionSecret(folder)).toBe(secret)
    expect(mode(join(folder, 'session-secret'))).toBe(0o600)
  })

  it('that is too short is refused and kept', () => {
    writeFileSync(join(folder, 'session-secret'), 'short\n', { mode: 0o600 })
    expect(() => sessionSecret(folder)).toThrow(/shorter than 32 characters/)
    expect(readFileSync(join(folder, 'session-secret'), 'utf8')).toBe('short\n')
  })
})
