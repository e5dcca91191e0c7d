import type { Sequelize } from 'sequelize'
import { SequelizeStorage, Umzug } from 'umzug'

export interface Migration {
  name: string
  sql: string
}

/** The database was written by a newer version than this one: nothing may touch it. */
export class NewerDatabase extends Error {}

/**
 * Brings the database up to this version: plain SQL files in order of their names, each in one transaction of its own.
 * @throws {NewerDatabase} when the database knows migrations that this version does not.
 */
export async function migrate(sequelize: Sequelize, migrations: Migration[]): Promise<void> {
  const ordered = [...migrations].sort((a, b) => (a.name < b.name ? -1 : 1))
  const storage = new SequelizeStorage({ sequelize, tableName: 'migrations' })
  const umzug = new Umzug({
    migrations: ordered.map(({ name, sql }) => ({
      name,
      up: async () => {
        await sequelize.transaction(async () => {
          for (const statement of statements(sql)) await sequelize.query(statement)
        })
      },
    })),
    context: sequelize,
    storage,
    logger: undefined,
  })
  const known = new Set(ordered.map(({ name }) => name))
  const foreign = (await storage.executed()).filter((name) => !known.has(name))
  if (foreign.length > 0)
    throw new NewerDatabase(
      `This database was written by a newer version of Tiltyard (it knows "${foreign[0]}"): start that version, or put a backup back.`,
    )
  await umzug.up()
}

/** Splits a migration at the semicolons that end a line; our files hold no trigger and no semicolon inside a statement. */
export function statements(sql: string): string[] {
  return sql
    .replace(/^\s*--.*$/gm, '')
    .split(/;\s*$/m)
    .map((statement) => statement.trim())
    .filter((statement) => statement.length > 0)
}
