import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { closeDatabase, database, openDatabase, rows, run } from '~/server/models/database'
import { migrate, NewerDatabase, statements } from '~/server/models/migrate'
import { shippedMigrations } from '../../../helpers/store'

let folder: string
beforeEach(async () => {
  folder = mkdtempSync(join(tmpdir(), 'tiltyard-migrate-'))
  await openDatabase(folder)
})
afterEach(async () => {
  await closeDatabase()
  rmSync(folder, { recursive: true, force: true })
})

const tables = async () =>
  (await rows<{ name: string }>("SELECT name FROM sqlite_schema WHERE type = 'table' AND name NOT LIKE 'sqlite%' ORDER BY name")).map(({ name }) => name)

describe('migrations', () => {
  it('make every table on an empty file, and nothing on a second start', async () => {
    await migrate(database(), shippedMigrations())
    const first = await rows('SELECT name, sql FROM sqlite_schema ORDER BY name')
    expect(await tables()).toEqual(expect.arrayContaining(['people', 'productions', 'shots', 'takes', 'rulings', 'events', 'letters']))
    await migrate(database(), shippedMigrations())
    expect(await rows('SELECT name, sql FROM sqlite_schema ORDER BY name')).toEqual(first)
  })

  it('leave a half-done step behind nowhere: the next start begins where the last good one ended', async () => {
    const broken = [{ name: '0001-good.sql', sql: 'CREATE TABLE good (a TEXT);' }, { name: '0002-bad.sql', sql: 'CREATE TABLE half (a TEXT);\nCREATE TABLE half (a TEXT);' }]
    await expect(migrate(database(), broken)).rejects.toThrow(/already exists/)
    expect(await tables()).toEqual(['good', 'migrations'])
    await migrate(database(), [broken[0]!, { name: '0002-bad.sql', sql: 'CREATE TABLE whole (a TEXT);' }])
    expect(await tables()).toEqual(['good', 'migrations', 'whole'])
  })

  it('refuse a database that a newer version wrote, and touch nothing of it', async () => {
    await migrate(database(), shippedMigrations())
    await run("INSERT INTO migrations (name) VALUES ('9999-later.sql')")
    const before = await rows('SELECT name, sql FROM sqlite_schema ORDER BY name')
    const attempt = migrate(database(), [...shippedMigrations(), { name: '0999-ours.sql', sql: 'CREATE TABLE ours (a TEXT);' }])
    await expect(attempt).rejects.toThrow(NewerDatabase)
    await expect(attempt).rejects.toThrow(/newer version of Tiltyard \(it knows "9999-later\.sql"\)/)
    expect(await rows('SELECT name, sql FROM sqlite_schema ORDER BY name')).toEqual(before)
  })

  it('run in the order of their names, whatever order they arrive in', async () => {
    await migrate(database(), [
      { name: '0002-b.sql', sql: 'ALTER TABLE a ADD COLUMN second TEXT;' },
      { name: '0001-a.sql', sql: 'CREATE TABLE a (first TEXT);' },
    ])
    expect((await rows<{ name: string }>("SELECT name FROM pragma_table_info('a')")).map(({ name }) => name)).toEqual(['first', 'second'])
  })

  it('are split at the semicolons that end a line', () => {
    expect(statements("-- a comment; with a semicolon\nCREATE TABLE a (b TEXT CHECK (b <> ';'), c TEXT);\n\nCREATE INDEX d ON a (b);\n")).toEqual([
      "CREATE TABLE a (b TEXT CHECK (b <> ';'), c TEXT)",
      'CREATE INDEX d ON a (b)',
    ])
  })
})
