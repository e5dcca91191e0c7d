/**
 * `npm run backup -- TARGET [--with-secret]`: writes a consistent copy of the database and the uploads into a new
 * folder, while the server runs or not. To restore, copy the folder's content into an empty data folder.
 */
import { cpSync, existsSync, mkdirSync, renameSync, rmSync, statSync } from 'node:fs'
import { join, resolve } from 'node:path'
import { DATABASE_FILE, SECRET_FILE, UPLOADS_FOLDER } from './lib/data.mjs'
import { PlainStop, runScript } from './lib/say.mjs'
import { projectRoot as root } from './lib/serve.mjs'
import { readSettings } from './lib/settings.mjs'

const USAGE = 'Say where to: npm run backup -- FOLDER, which must not exist yet; --with-secret adds the session secret.'

await runScript(async () => {
  const { target, withSecret } = readArguments(process.argv.slice(2))
  // Only the folder matters here: a setting of the server's that is missing must not stop a backup.
  const { dataDir } = readSettings({ DATA_DIR: process.env.DATA_DIR }, root)
  const database = join(dataDir, DATABASE_FILE)
  if (!existsSync(database)) throw new PlainStop(`There is no database in ${dataDir}: set DATA_DIR to the data folder.`)
  if (existsSync(target)) throw new PlainStop(`${target} exists already, and a backup overwrites nothing: name a new folder.`)

  // Under its own name only when it is whole: what is called a backup is one.
  const draft = `${target}.unfinished-${process.pid}`
  try {
    makeFolder(draft)
    await copyDatabase(database, join(draft, DATABASE_FILE))
    copyIfThere(join(dataDir, UPLOADS_FOLDER), join(draft, UPLOADS_FOLDER))
    if (withSecret) copyIfThere(join(dataDir, SECRET_FILE), join(draft, SECRET_FILE))
    renameSync(draft, target)
  } catch (error) {
    // What SQLite or the disk says (damaged, full, no rights) is for the person to act on.
    if (error instanceof PlainStop || !error.code) throw error
    throw new PlainStop(`No backup was made: ${error.message}.`)
  } finally {
    rmSync(draft, { recursive: true, force: true })
  }
  for (const name of [DATABASE_FILE, UPLOADS_FOLDER, SECRET_FILE]) {
    const written = join(target, name)
    if (existsSync(written)) console.log(`${written}${name === DATABASE_FILE ? ` (${statSync(written).size} bytes)` : ''}`)
  }
})

function readArguments(args) {
  const folders = args.filter((arg) => !arg.startsWith('--'))
  const unknown = args.filter((arg) => arg.startsWith('--') && arg !== '--with-secret')
  if (folders.length !== 1 || unknown.length > 0) throw new PlainStop(USAGE)
  // npm runs scripts in the project's folder; a relative path means where the person stands.
  return { target: resolve(process.env.INIT_CWD ?? process.cwd(), folders[0]), withSecret: args.includes('--with-secret') }
}

function makeFolder(folder) {
  try {
    mkdirSync(folder, { recursive: true, mode: 0o700 })
  } catch (error) {
    throw new PlainStop(`The folder ${folder} cannot be made (${error.code ?? error.message}).`)
  }
}

function copyIfThere(from, to) {
  if (existsSync(from)) cpSync(from, to, { recursive: true, preserveTimestamps: true })
}

/** VACUUM INTO reads one consistent state, also while others write; the copy is then checked before it counts. */
async function copyDatabase(from, to) {
  const sqlite3 = await loadSqlite()
  await withDatabase(sqlite3, from, sqlite3.OPEN_READWRITE, (run) => run('VACUUM INTO ?', [to]))
  await withDatabase(sqlite3, to, sqlite3.OPEN_READONLY, async (run) => {
    const [{ integrity_check: said }] = await run('PRAGMA integrity_check')
    if (said !== 'ok') throw new PlainStop(`The copy is damaged (${said}), so no backup was made.`)
    const strays = await run('PRAGMA foreign_key_check')
    if (strays.length > 0) throw new PlainStop(`The copy has ${strays.length} rows that point nowhere, so no backup was made.`)
  })
}

async function loadSqlite() {
  try {
    return (await import('sqlite3')).default
  } catch {
    throw new PlainStop('The packages are not installed yet: run npm start once, or npm ci.')
  }
}

/** @param {(run: (sql: string, values?: unknown[]) => Promise<any[]>) => Promise<unknown>} task */
async function withDatabase(sqlite3, file, mode, task) {
  const database = await new Promise((resolve, reject) => {
    const opened = new sqlite3.Database(file, mode, (error) => (error ? reject(error) : resolve(opened)))
  })
  database.configure('busyTimeout', 10_000)
  const run = (sql, values = []) =>
    new Promise((resolve, reject) => database.all(sql, values, (error, rows) => (error ? reject(error) : resolve(rows))))
  try {
    await task(run)
  } finally {
    await new Promise((resolve) => database.close(resolve))
  }
}
