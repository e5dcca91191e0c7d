import { AsyncLocalStorage } from 'node:async_hooks'
import { mkdirSync } from 'node:fs'
import { join } from 'node:path'
import { Mutex } from 'async-mutex'
import { QueryTypes, Sequelize, Transaction } from 'sequelize'
import sqlite3 from 'sqlite3'
import { log } from '~/server/utils/log'

/**
 * The one connection to the one file. Everything that knows about sqlite3 is here, so that the pair
 * sequelize/sqlite3 can be changed in one place.
 */

// Sequelize opens a connection per transaction and fires no hook for it on SQLite: what a connection must
// always carry is set by the driver itself, on every open. They are per connection; WAL is kept in the file.
const PRAGMAS = 'PRAGMA busy_timeout = 5000; PRAGMA foreign_keys = ON; PRAGMA synchronous = FULL;'

type Opened = (problem: Error | null) => void

class TunedDatabase extends sqlite3.Database {
  constructor(file: string, mode: number, opened: Opened) {
    super(file, mode, (problem) => {
      if (problem) opened(problem)
      else this.exec(PRAGMAS, opened)
    })
  }
}

// A query inside a transaction finds it here, so that none can slip outside by forgetting an option.
const frames = new AsyncLocalStorage<Map<string, unknown>>()
Sequelize.useCLS({
  run: (task: (context: unknown) => unknown) => frames.run(new Map(), () => task(frames.getStore())),
  bind: (task: unknown) => task,
  get: (key: string) => frames.getStore()?.get(key),
  set: (key: string, value: unknown) => frames.getStore()?.set(key, value),
} as unknown as object)

// Sequelize's own hook also runs after a commit that failed, and inside the finished transaction: so we keep our own list.
const waiting = new AsyncLocalStorage<(() => void)[]>()
const writer = new Mutex()
let current: Sequelize | null = null

/** Opens `<dataDir>/tiltyard.sqlite`, making the folder and the file when they are missing. */
export async function openDatabase(dataDir: string): Promise<Sequelize> {
  mkdirSync(dataDir, { recursive: true })
  const opened = new Sequelize({
    dialect: 'sqlite',
    dialectModule: { ...sqlite3, Database: TunedDatabase },
    storage: join(dataDir, 'tiltyard.sqlite'),
    logging: false,
    transactionType: Transaction.TYPES.IMMEDIATE,
    define: { timestamps: false, underscored: true },
  })
  await opened.query('PRAGMA journal_mode = WAL')
  current = opened
  return opened
}

/** The open database. @throws when nothing opened it yet: a mistake of ours, not of a person. */
export function database(): Sequelize {
  if (!current) throw new Error('The database is not open.')
  return current
}

export async function closeDatabase(): Promise<void> {
  const closing = current
  current = null
  await closing?.close()
}

/** True while the running call is inside `write`. */
export function isWriting(): boolean {
  // Null once it is committed or rolled back: what is still running then is outside.
  return (frames.getStore()?.get('transaction') ?? null) !== null
}

/**
 * Runs `task` as one transaction: all of it or none. Writers queue on one mutex in this process, so that none waits
 * on a lock of SQLite's. A `write` within a `write` joins the outer one.
 */
export async function write<T>(task: () => Promise<T>): Promise<T> {
  if (isWriting()) return task()
  const after: (() => void)[] = []
  const answer = await writer.runExclusive(() => waiting.run(after, () => transact(task)))
  for (const news of after) tell(news)
  return answer
}

async function transact<T>(task: () => Promise<T>): Promise<T> {
  let own: Transaction | undefined
  try {
    return await database().transaction((transaction) => {
      own = transaction
      return task()
    })
  } catch (problem) {
    if (own) await abandon(own)
    throw problem
  }
}

type Held = { id: string; finished?: string; connection?: sqlite3.Database & { uuid?: string } }
type Keeper = { releaseConnection(connection: sqlite3.Database): void }

/**
 * Sequelize marks a transaction whose COMMIT failed (a full disk) as committed and leaves its connection open, holding
 * SQLite's write lock for good. Roll it back and close it, so that the next writer can go on.
 */
async function abandon(transaction: Transaction): Promise<void> {
  const { id, finished, connection } = transaction as unknown as Held
  if (finished !== 'commit' || !connection) return
  await new Promise<void>((done) => connection.exec('ROLLBACK', () => done()))
  // The name that Sequelize knows the connection by: it closes and forgets it.
  connection.uuid = id
  ;(database().connectionManager as unknown as Keeper).releaseConnection(connection)
}

/** Runs `task` once the surrounding `write` is committed (at once when there is none); never after a rollback. */
export function afterCommit(task: () => void): void {
  const after = waiting.getStore()
  if (after && isWriting()) after.push(task)
  else tell(task)
}

/** What was committed stays so, whatever those who hear of it do. */
function tell(task: () => void): void {
  try {
    task()
  } catch (problem) {
    log.error('news went wrong', { problem: String(problem) })
  }
}

type Value = string | number | null
type Values = Record<string, Value | readonly Value[]>

/**
 * Our `:name` to what SQLite binds: a value never becomes part of the SQL text. A list stands for its members, as `IN` wants
 * them.
 */
function bound(sql: string, values: Values): { sql: string; bind: Record<string, Value> } {
  const bind: Record<string, Value> = {}
  const text = sql.replace(/:([a-zA-Z]\w*)/g, (_, name: string) => {
    const value = values[name]
    if (value === undefined) throw new Error(`Nothing stands for :${name}.`)
    const members = Array.isArray(value) ? (value as readonly Value[]) : null
    if (!members) {
      bind[name] = value as Value
      return `$${name}`
    }
    return members
      .map((member, i) => {
        bind[`${name}_${i}`] = member
        return `$${name}_${i}`
      })
      .join(', ')
  })
  return { sql: text, bind }
}

/** Rows of a SELECT with named parameters (`:name`). Never build SQL from what a person sent. */
export async function rows<T extends object>(sql: string, values: Values = {}): Promise<T[]> {
  const { sql: text, bind } = bound(sql, values)
  return database().query<T>(text, { bind, type: QueryTypes.SELECT })
}

/** The first row of a SELECT, or null. */
export async function row<T extends object>(sql: string, values: Values = {}): Promise<T | null> {
  return (await rows<T>(sql, values))[0] ?? null
}

/** Runs an INSERT, UPDATE or DELETE with named parameters; answers how many rows it changed. */
export async function run(sql: string, values: Values = {}): Promise<number> {
  const { sql: text, bind } = bound(sql, values)
  const [, changes] = await database().query(text, { bind, type: QueryTypes.UPDATE })
  return changes
}
