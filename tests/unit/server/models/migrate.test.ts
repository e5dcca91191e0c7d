import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { initModels, Take } from '~/server/models'
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

  it('carry the takes of an old database over: their lists, claims and answers are read as they were', async () => {
    const [first, ...later] = shippedMigrations()
    await migrate(database(), [first!])
    const at = '2026-01-01T00:00:00.000Z'
    const claim = { law: 'odd-rule', measure: 'distance', unit: 'px', slop: 0.5, tolerance: 0.1 }
    const keys = [{ frame: 1, reading: 0 }, { frame: 2, reading: 1 }, { frame: 3, reading: 4 }]
    const answer = { verdict: 'undecided', reason: 'x', keys: [], findings: [] }
    await run("INSERT INTO people (id, email, name, created_at) VALUES ('p', 'p@pier.example', 'P', :at)", { at })
    await run("INSERT INTO productions (id, slug, title, created_at) VALUES ('f', 'film', 'Film', :at)", { at })
    await run("INSERT INTO sequences (id, production_id, code, title, position) VALUES ('q', 'f', 'Q', 'Q', 1)")
    await run(
      `INSERT INTO shots (id, client_id, production_id, sequence_id, code, title, first_frame, last_frame, fps, position, claim, created_by, created_at)
       VALUES ('s', 'c', 'f', 'q', 'Q-1', 'One', 1, 9, 24, 1, :claim, 'p', :at)`,
      { claim: JSON.stringify(claim), at },
    )
    await run(
      `INSERT INTO takes (id, client_id, shot_id, number, person_id, created_at, verdict, judge_version, measure, unit, slop, tolerance, fps, sketch, claim, keys, answer)
       VALUES ('t', 'c', 's', 1, 'p', :at, 'undecided', '1', 'distance', 'px', 0.5, 0.1, 24, '{}', :claim, :keys, :answer)`,
      { at, claim: JSON.stringify(claim), keys: JSON.stringify(keys), answer: JSON.stringify(answer) },
    )
    await run("INSERT INTO flags (id, client_id, take_id, from_frame, to_frame, reason, person_id, created_at) VALUES ('g', 'c', 't', 1, 2, 'Why', 'p', :at)", { at })

    await migrate(database(), [first!, ...later])
    initModels(database())
    const take = await Take.findByPk('t')
    expect(take).toMatchObject({ number: 1, claim, keys, answer, unit: 'px', slop: 0.5, verdict: 'undecided', judgeVersion: '1' })
    expect(await rows("SELECT take_id FROM flags")).toEqual([{ take_id: 't' }])
    expect(await rows('PRAGMA foreign_key_check')).toEqual([])
    // What was the column's own is still in the claim, where every reader looks for it.
    expect(take?.claim.measure).toBe('distance')
  })

  it('are split at the semicolons that end a line', () => {
    expect(statements("-- a comment; with a semicolon\nCREATE TABLE a (b TEXT CHECK (b <> ';'), c TEXT);\n\nCREATE INDEX d ON a (b);\n")).toEqual([
      "CREATE TABLE a (b TEXT CHECK (b <> ';'), c TEXT)",
      'CREATE INDEX d ON a (b)',
    ])
  })
})
