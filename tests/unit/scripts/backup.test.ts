import { execFile } from 'node:child_process'
import { cpSync, existsSync, mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import sqlite3 from 'sqlite3'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { withoutSettings } from '../../../scripts/lib/settings.mjs'

const root = fileURLToPath(new URL('../../..', import.meta.url))
let folder = ''
let live: sqlite3.Database

/** Opens a database, with one way to ask. */
function open(file: string) {
  const database = new sqlite3.Database(file)
  const ask = (sql: string) =>
    new Promise<Record<string, unknown>[]>((resolve, reject) => {
      database.all<Record<string, unknown>>(sql, (error, rows) => (error ? reject(error) : resolve(rows)))
    })
  return { database, ask }
}

/** Runs the command as npm would, from `folder`. */
function backup(...args: string[]) {
  const env = { ...withoutSettings(process.env), DATA_DIR: join(folder, 'data'), INIT_CWD: folder }
  return new Promise<{ code: number; out: string; err: string }>((resolve) => {
    execFile(process.execPath, ['scripts/backup.mjs', ...args], { cwd: root, env }, (error, out, err) => {
      resolve({ code: error ? Number(error.code) : 0, out, err })
    })
  })
}

beforeEach(async () => {
  folder = mkdtempSync(join(tmpdir(), 'tiltyard-backup-'))
  mkdirSync(join(folder, 'data/uploads'), { recursive: true })
  writeFileSync(join(folder, 'data/uploads/frame.png'), 'picture')
  writeFileSync(join(folder, 'data/session-secret'), 'x'.repeat(64))
  const { database, ask } = open(join(folder, 'data/tiltyard.sqlite'))
  live = database
  await ask('PRAGMA journal_mode = WAL')
  await ask('CREATE TABLE takes (number INTEGER PRIMARY KEY, note TEXT)')
  // Stays in the write-ahead log: a copy of the file alone would miss it.
  await ask(`INSERT INTO takes VALUES (1, 'first'), (2, 'second')`)
})
afterEach(async () => {
  await new Promise((resolve) => live.close(resolve))
  rmSync(folder, { recursive: true })
})

describe('npm run backup', () => {
  it('copies the database whole while it is open, with the uploads, and says so', async () => {
    const { code, out, err } = await backup('monday')
    expect({ code, err }).toEqual({ code: 0, err: '' })
    expect(out).toContain(join(folder, 'monday/tiltyard.sqlite'))
    expect(readdirSync(join(folder, 'monday')).sort()).toEqual(['tiltyard.sqlite', 'uploads'])
    expect(readdirSync(folder).sort()).toEqual(['data', 'monday'])

    cpSync(join(folder, 'monday'), join(folder, 'restored'), { recursive: true })
    const { database, ask } = open(join(folder, 'restored/tiltyard.sqlite'))
    expect(await ask('SELECT * FROM takes ORDER BY number')).toEqual([
      { number: 1, note: 'first' },
      { number: 2, note: 'second' },
    ])
    database.close()
    expect(readFileSync(join(folder, 'restored/uploads/frame.png'), 'utf8')).toBe('picture')
  })

  it('takes the session secret only when asked to', async () => {
    await backup('with', '--with-secret')
    expect(readFileSync(join(folder, 'with/session-secret'), 'utf8')).toBe('x'.repeat(64))
  })

  it('overwrites nothing', async () => {
    mkdirSync(join(folder, 'there'))
    const { code, err } = await backup('there')
    expect(code).toBe(1)
    expect(err).toMatch(/exists already, and a backup overwrites nothing: name a new folder\.\n$/)
    expect(readdirSync(join(folder, 'there'))).toEqual([])
  })

  it.each([[[]], [['a', 'b']], [['a', '--force']]])('explains itself when asked wrongly: %j', async (args) => {
    const { code, err } = await backup(...args)
    expect(code).toBe(1)
    expect(err).toMatch(/^Say where to: npm run backup -- FOLDER/)
    expect(existsSync(join(folder, 'a'))).toBe(false)
  })

  it('leaves nothing behind when the copy cannot be made', async () => {
    writeFileSync(join(folder, 'data/tiltyard.sqlite'), 'This is no database at all, however long it may be.')
    rmSync(join(folder, 'data/tiltyard.sqlite-wal'))
    const { code, err } = await backup('tuesday')
    expect(code).toBe(1)
    expect(err).toMatch(/^No backup was made: .*not a database\.\n$/)
    expect(readdirSync(folder)).toEqual(['data'])
  })

  it('says so when there is no database', async () => {
    rmSync(join(folder, 'data/tiltyard.sqlite'))
    const { code, err } = await backup('wednesday')
    expect(code).toBe(1)
    expect(err).toMatch(/^There is no database in .*: set DATA_DIR to the data folder\.\n$/)
  })
})
