import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { initModels } from '~/server/models'
import { closeDatabase, openDatabase, rows } from '~/server/models/database'
import { migrate } from '~/server/models/migrate'
import type { Migration } from '~/server/models/migrate'

const folder = fileURLToPath(new URL('../../server/migrations', import.meta.url))

/** The migrations as the build ships them. */
export const shippedMigrations = (): Migration[] =>
  readdirSync(folder)
    .filter((name) => name.endsWith('.sql'))
    .map((name) => ({ name, sql: readFileSync(join(folder, name), 'utf8') }))

/** Opens the database of a data folder in this process, migrated. A server may run on the same folder. */
export async function openStore(dataDir: string): Promise<void> {
  const sequelize = await openDatabase(dataDir)
  await migrate(sequelize, shippedMigrations())
  initModels(sequelize)
}

/** An empty store in a folder of its own. @returns how to close it and take it away */
export async function openEmptyStore(): Promise<() => Promise<void>> {
  const dataDir = mkdtempSync(join(tmpdir(), 'tiltyard-store-'))
  await openStore(dataDir)
  return async () => {
    await closeDatabase()
    rmSync(dataDir, { recursive: true, force: true })
  }
}

/** How many rows each table has: two of these are equal when nothing was stored in between. */
export async function rowCounts(except: readonly string[] = []): Promise<Record<string, number>> {
  const tables = await rows<{ name: string }>("SELECT name FROM sqlite_schema WHERE type = 'table' AND name NOT LIKE 'sqlite%' ORDER BY name")
  const counted = tables.map(({ name }) => name).filter((name) => !except.includes(name))
  const found = await rows<{ name: string; n: number }>(
    counted.map((name) => `SELECT '${name}' AS name, count(*) AS n FROM "${name}"`).join(' UNION ALL '),
  )
  return Object.fromEntries(found.map(({ name, n }) => [name, n]))
}
