/**
 * Decides whether packages must be installed and the product built, and does it. Runs before anything is
 * installed, so it uses Node.js alone. Decisions go by content, not by dates: a checkout or a copy changes dates.
 */
import { createHash } from 'node:crypto'
import { existsSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { join, relative, resolve, sep } from 'node:path'
import { run } from './processes.mjs'
import { PlainStop } from './say.mjs'

const INSTALL_STAMP = join('node_modules', '.tiltyard-installed.json')
const BUILD_STAMP = 'tiltyard-built.json'
const MACHINE = `${process.platform}-${process.arch}`

/** Everything that ends up in the build. A folder counts with all it holds. */
const SOURCES = [
  'package.json',
  'package-lock.json',
  'nuxt.config.ts',
  'tailwind.config.ts',
  'tsconfig.json',
  'app.vue',
  'error.vue',
  'app.config.ts',
  'assets',
  'components',
  'composables',
  'layouts',
  'middleware',
  'modules',
  'pages',
  'plugins',
  'public',
  'server',
  'shared',
  'stores',
  'utils',
]

/**
 * @param {string} root the project's folder
 * @param {Record<string, string | undefined>} [env]
 * @returns {string} the folder of the built server; TILTYARD_BUILD_DIR moves it, as in nuxt.config.ts
 */
export function outputDir(root, env = process.env) {
  return env.TILTYARD_BUILD_DIR ? resolve(root, env.TILTYARD_BUILD_DIR, 'output') : join(root, '.output')
}

/**
 * The built server's entry file.
 * @param {string} root
 * @param {Record<string, string | undefined>} [env]
 */
export const serverEntry = (root, env = process.env) => join(outputDir(root, env), 'server', 'index.mjs')

/** @returns {boolean} true when `npm ci` has to run before anything else can */
export function needsInstall(root) {
  if (!existsSync(join(root, 'node_modules'))) return true
  const stamp = readJson(join(root, INSTALL_STAMP))
  // Packages compiled for another machine arrive when somebody copies the whole folder.
  if (stamp && stamp.machine !== MACHINE) return true
  if (stamp && stamp.lock === hashFile(join(root, 'package-lock.json'))) return false
  return !holdsWhatTheLockSays(root)
}

/** Notes what is installed, so that the next start need not look again. */
export function stampInstall(root) {
  const stamp = { lock: hashFile(join(root, 'package-lock.json')), machine: MACHINE }
  writeFileSync(join(root, INSTALL_STAMP), JSON.stringify(stamp))
}

/**
 * @param {string} root
 * @param {Record<string, string | undefined>} [env]
 * @returns {boolean} true when there is no finished build of exactly these sources
 */
export function needsBuild(root, env = process.env) {
  if (!existsSync(serverEntry(root, env))) return true
  return readJson(join(outputDir(root, env), BUILD_STAMP))?.sources !== hashSources(root)
}

/**
 * @param {string} root
 * @returns {string} one hash over the path and content of every source file
 */
export function hashSources(root) {
  const hash = createHash('sha256')
  for (const file of SOURCES.flatMap((name) => filesUnder(join(root, name)))) {
    const content = readFileSync(file)
    // The length keeps the end of one file from passing for the beginning of the next.
    hash.update(`${relative(root, file).split(sep).join('/')}\0${content.length}\0`).update(content)
  }
  return hash.digest('hex')
}

/** Installs when needed. Throws a PlainStop when npm fails; npm has said why by then. */
export async function install(root) {
  if (needsInstall(root)) {
    console.log('Installing packages (a few minutes the first time: the database is compiled here).')
    // Building needs the development packages even where NODE_ENV says production.
    const done = await run(...npm('ci', '--include=dev'), { cwd: root })
    if (done.code !== 0) throw new PlainStop('The packages could not be installed: npm says why above.')
  }
  stampInstall(root)
}

/**
 * Builds, whether or not it is needed.
 * @param {string} root
 * @param {{ env?: Record<string, string | undefined>, timeoutMs?: number }} [options]
 * @returns {Promise<boolean>} false when the build failed; its output has said why
 */
export async function build(root, { env = process.env, timeoutMs } = {}) {
  const stamp = join(outputDir(root, env), BUILD_STAMP)
  rmSync(stamp, { force: true })
  // Taken before, so that a file changed while building makes the next start build again.
  const sources = hashSources(root)
  const command = [process.execPath, nuxtBin(root), 'build']
  const done = await run(command, { cwd: root, env: { ...env, NODE_ENV: 'production' }, timeoutMs })
  if (done.code !== 0 || !existsSync(serverEntry(root, env))) return false
  writeFileSync(stamp, JSON.stringify({ sources }))
  return true
}

/** Where Nuxt's own command is. */
export const nuxtBin = (root) => join(root, 'node_modules', 'nuxt', 'bin', 'nuxt.mjs')

function npm(...args) {
  // Set by npm when it runs a script: works wherever npm does, also where `npm` is a .cmd file.
  const own = process.env.npm_execpath
  return [own && /npm-cli\.js$/.test(own) ? [process.execPath, own, ...args] : ['npm', ...args]]
}

/**
 * For folders that were installed by hand: compares the lock file with the list npm keeps of what it installed.
 * Packages for other machines are on the first list only.
 */
function holdsWhatTheLockSays(root) {
  const wanted = readJson(join(root, 'package-lock.json'))?.packages
  const held = readJson(join(root, 'node_modules', '.package-lock.json'))?.packages
  if (!wanted || !held) return false
  const names = Object.keys(wanted).filter((name) => name !== '')
  return (
    names.every((name) => (held[name] ? held[name].version === wanted[name].version : wanted[name].optional === true)) &&
    Object.keys(held).every((name) => name in wanted)
  )
}

function filesUnder(path) {
  if (!existsSync(path)) return []
  let entries
  try {
    entries = readdirSync(path, { withFileTypes: true })
  } catch (error) {
    if (error.code === 'ENOTDIR') return [path]
    throw error
  }
  return entries
    .filter((entry) => !entry.name.startsWith('.'))
    .sort((a, b) => (a.name < b.name ? -1 : 1))
    .flatMap((entry) => filesUnder(join(path, entry.name)))
}

const hashFile = (path) => createHash('sha256').update(readFileSync(path)).digest('hex')

function readJson(path) {
  try {
    return JSON.parse(readFileSync(path, 'utf8'))
  } catch {
    return null
  }
}
