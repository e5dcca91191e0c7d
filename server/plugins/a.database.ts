import { defineNitroPlugin, useStorage } from '#imports'
import { initModels } from '~/server/models'
import { openDatabase, row } from '~/server/models/database'
import { migrate, NewerDatabase } from '~/server/models/migrate'
import type { Migration } from '~/server/models/migrate'
import { openAsDemo } from '~/server/services/demo'
import { log } from '~/server/utils/log'
import { setReady } from '~/server/utils/ready'
import { settings } from '~/server/utils/settings'

// SQLite before this loses data when a WAL is reset under load: engineering.md, "Known traps".
const OLDEST_SQLITE = [3, 51, 3] as const

/** Opens the database before the first request is answered. Named to run before the other plugins. */
export default defineNitroPlugin(() => {
  setReady(open())
})

async function open(): Promise<void> {
  try {
    const sequelize = await openDatabase(settings().dataDir)
    await refuseOldSqlite()
    await migrate(sequelize, await shippedMigrations())
    initModels(sequelize)
    await openAsDemo(settings().demoWanted)
  } catch (problem) {
    // One clear sentence and out: a board without its database can answer nothing.
    console.error(problem instanceof NewerDatabase ? problem.message : `The database cannot be opened: ${String(problem)}`)
    process.exit(1)
  }
}

async function refuseOldSqlite(): Promise<void> {
  const version = (await row<{ version: string }>('SELECT sqlite_version() AS version'))?.version ?? '0'
  const parts = version.split('.').map(Number)
  const difference = OLDEST_SQLITE.map((least, i) => (parts[i] ?? 0) - least).find((step) => step !== 0) ?? 0
  if (difference < 0) throw new Error(`SQLite ${version} is too old; ${OLDEST_SQLITE.join('.')} or newer is needed.`)
  log.info('database open', { sqlite: version })
}

/** The SQL files travel inside the build, so that the server needs nothing beside it. */
async function shippedMigrations(): Promise<Migration[]> {
  const files = useStorage('assets:migrations')
  const names = (await files.getKeys()).filter((name) => name.endsWith('.sql'))
  // Without this an empty database would stay empty, and one with data would be taken for a newer version's.
  if (names.length === 0) throw new Error('this build holds no migrations; build it again.')
  return Promise.all(names.map(async (name) => ({ name, sql: String(await files.getItemRaw(name)) })))
}
