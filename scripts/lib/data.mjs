/** The data folder: made, proven writable, and holding the secret that seals the session cookies. */
import { randomBytes } from 'node:crypto'
import {
  accessSync,
  chmodSync,
  constants,
  existsSync,
  linkSync,
  mkdirSync,
  readFileSync,
  rmSync,
  statSync,
  writeFileSync,
} from 'node:fs'
import { dirname, join } from 'node:path'
import { PlainStop } from './say.mjs'

/** Inside the data folder; server/models opens it under the same name. */
export const DATABASE_FILE = 'tiltyard.sqlite'
export const SECRET_FILE = 'session-secret'
export const UPLOADS_FOLDER = 'uploads'
const SECRET_MIN_CHARS = 32

/** Makes the folder if need be. Throws a PlainStop when it, or the database in it, cannot be written. */
export function prepareDataDir(dataDir) {
  try {
    makeFolder(dataDir)
    // Asking for permission says yes to root even on a read-only disk: only writing tells.
    const probe = join(dataDir, `.probe-${process.pid}`)
    writeFileSync(probe, '')
    rmSync(probe)
    const database = join(dataDir, DATABASE_FILE)
    if (existsSync(database)) accessSync(database, constants.R_OK | constants.W_OK)
  } catch (error) {
    throw new PlainStop(
      `The data folder ${dataDir} cannot be written (${error.code ?? error.message}): set DATA_DIR to one that can.`,
    )
  }
}

/**
 * The secret of this installation, made at the first start. Whoever has it can forge a session cookie's seal,
 * so only the owner may read it.
 * @returns {string} at least 32 characters
 */
export function sessionSecret(dataDir) {
  const file = join(dataDir, SECRET_FILE)
  try {
    if (!existsSync(file)) writeOnce(file, `${randomBytes(32).toString('hex')}\n`)
    if (statSync(file).mode & 0o077) chmodSync(file, 0o600)
    const secret = readFileSync(file, 'utf8').trim()
    if (secret.length >= SECRET_MIN_CHARS) return secret
  } catch (error) {
    throw new PlainStop(`The session secret ${file} cannot be used (${error.code ?? error.message}).`)
  }
  throw new PlainStop(
    `The session secret ${file} is shorter than ${SECRET_MIN_CHARS} characters: delete the file to have a new one made; everyone signs in again.`,
  )
}

/** Not mkdir's own `recursive`: where the system says ENOENT to making a folder, as under /proc, that never returns. */
function makeFolder(path) {
  if (existsSync(path)) {
    if (statSync(path).isDirectory()) return
    throw Object.assign(new Error('It is a file.'), { code: 'ENOTDIR' })
  }
  makeFolder(dirname(path))
  try {
    mkdirSync(path, { mode: 0o700 })
  } catch (error) {
    // Made by somebody else in the meantime is just as well.
    if (error.code !== 'EEXIST') throw error
  }
}

/** A crash half-way leaves no half secret, and of two starts at once the first one's secret stays. */
function writeOnce(file, text) {
  const draft = `${file}.${process.pid}`
  writeFileSync(draft, text, { mode: 0o600, flush: true })
  try {
    linkSync(draft, file)
  } catch (error) {
    if (error.code !== 'EEXIST') throw error
  } finally {
    rmSync(draft)
  }
}
