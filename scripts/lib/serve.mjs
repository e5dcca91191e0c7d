/** Starting a server as a child, waiting until it answers, and saying where it is. */
import { spawn } from 'node:child_process'
import { createServer } from 'node:net'
import { fileURLToPath } from 'node:url'
import { whenAbandoned } from './processes.mjs'
import { PlainStop } from './say.mjs'

const FOLLOW_PARENT = new URL('./follow-parent.mjs', import.meta.url).href
/** The first start also makes the database and the demo production. */
const READY_WITHIN_MS = 120_000
export const DEMO_PASSWORD = 'cranes walk at night'

export const projectRoot = fileURLToPath(new URL('../..', import.meta.url)).replace(/[\\/]$/, '')

/** Throws a PlainStop when `host:port` cannot be listened on. */
export function requireFreePort(host, port) {
  return new Promise((resolve, reject) => {
    const probe = createServer()
    probe.once('error', (error) => reject(new PlainStop(portSentence(error.code, host, port))))
    probe.listen({ host, port, exclusive: true }, () => probe.close(() => resolve()))
  })
}

function portSentence(code, host, port) {
  if (code === 'EADDRINUSE') return `Port ${port} on ${host} is in use: stop what uses it, or set PORT to another one.`
  if (code === 'EACCES') return `Port ${port} on ${host} needs more rights than this user has: set PORT to one above 1023.`
  return `HOST=${host} is not an address that this machine can listen on (${code}).`
}

/**
 * Starts a server, forwards the signals that mean "stop", waits for its health and tells the address.
 * @param {object} how
 * @param {string[]} how.args what Node.js is to run
 * @param {Record<string, string | undefined>} how.env
 * @param {string} how.cwd
 * @param {string} how.url where this machine reaches it
 * @param {(session: unknown) => void} how.onReady gets the answer of GET /api/session, or null
 * @returns {Promise<number>} the exit code to end with
 */
export async function serve({ args, env, cwd, url, onReady }) {
  // The channel is there to be closed: see follow-parent.mjs.
  const child = spawn(process.execPath, ['--import', FOLLOW_PARENT, ...args], {
    cwd,
    env,
    stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
  })
  let stopping = false
  const stop = () => {
    // Ctrl-C reaches the child by itself as well, and npm passes signals on a second time: once is enough.
    if (!stopping) child.kill('SIGTERM')
    stopping = true
  }
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, stop)
  whenAbandoned(stop)
  const ended = new Promise((resolve) => {
    child.once('error', () => resolve(1))
    child.once('exit', (code) => resolve(code ?? (stopping ? 0 : 1)))
  })
  const ready = await Promise.race([waitForHealth(url, ended), ended.then(() => 'ended')])
  if (ready === 'ready' && !stopping) onReady(await askSession(url))
  if (ready === 'late') {
    child.kill('SIGKILL')
    throw new PlainStop(`The server did not answer at ${url}/api/health within ${READY_WITHIN_MS / 1000} seconds.`)
  }
  return ended
}

async function waitForHealth(url, ended) {
  let over = false
  ended.then(() => (over = true))
  const deadline = Date.now() + READY_WITHIN_MS
  while (!over && Date.now() < deadline) {
    const answer = await get(`${url}/api/health`)
    if (answer?.ok) return 'ready'
    await new Promise((resolve) => setTimeout(resolve, 150))
  }
  return 'late'
}

async function askSession(url) {
  const answer = await get(`${url}/api/session`)
  return answer?.ok ? answer.json().catch(() => null) : null
}

const get = (url) => fetch(url, { signal: AbortSignal.timeout(5_000) }).catch(() => null)

/**
 * What a person needs to know once it runs.
 * @param {import('./settings.mjs').Settings} settings
 * @param {{ demo?: boolean, empty?: boolean, demoAccounts?: { email: string, role: string, name: string }[] } | null} session
 * @returns {string} several lines
 */
export function welcome(settings, session) {
  const lines = ['', `Tiltyard is at ${settings.baseUrl}`, `Its data are in ${settings.dataDir}`]
  if (settings.plainHttpAllowed) {
    lines.push('ALLOW_PLAIN_HTTP=yes: passwords and sessions cross the network unencrypted.')
  }
  if (settings.mailUrl && !settings.mailFrom) {
    lines.push('MAIL_FROM is not set: letters come from a made-up address, which many mail servers refuse.')
  }
  if (session?.empty) lines.push('Nobody is here yet: open the address to make the first keeper.')
  const accounts = session?.demo ? (session.demoAccounts ?? []) : []
  if (accounts.length > 0) {
    const width = Math.max(...accounts.map(({ email }) => email.length))
    lines.push('', `Demo accounts, all with the password: ${DEMO_PASSWORD}`)
    lines.push(...accounts.map(({ email, role, name }) => `  ${email.padEnd(width)}  ${role}, ${name}`))
  }
  return [...lines, ''].join('\n')
}
