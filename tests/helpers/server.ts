import { spawn } from 'node:child_process'
import type { ChildProcess } from 'node:child_process'
import { existsSync, mkdtempSync, rmSync } from 'node:fs'
import { createServer } from 'node:net'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { setTimeout } from 'node:timers/promises'
import { fileURLToPath, pathToFileURL } from 'node:url'
import { prepareDataDir, sessionSecret } from '../../scripts/lib/data.mjs'
import { serverEntry } from '../../scripts/lib/prepare.mjs'
import { readSettings, serverEnv, SETTING_NAMES, withoutSettings } from '../../scripts/lib/settings.mjs'

const root = fileURLToPath(new URL('../..', import.meta.url)).replace(/\/$/, '')
const followParent = pathToFileURL(join(root, 'scripts/lib/follow-parent.mjs')).href
/** The first start migrates and seeds, on a machine that may be busy with other tests. */
const READY_WITHIN_MS = 60_000
const STOPS_WITHIN_MS = 15_000
const LOG_CHARS = 200_000

export interface ServerOptions {
  /** Seed the demo production at the first start. Default: on. */
  demo?: 'on' | 'off'
  /** Settings by their README names (MAIL_URL, BASE_URL, …) or any other environment variable of the server. */
  env?: Record<string, string>
  /** Kept when the server stops. Default: a new temporary folder, removed at the end. */
  dataDir?: string
}

export interface Ended {
  code: number | null
  signal: NodeJS.Signals | null
  /** True when it had to be killed because it did not stop in time. */
  forced: boolean
}

export interface TestServer {
  url: string
  port: number
  dataDir: string
  /** Of the running process; changes with `restart`. */
  readonly pid: number
  /** Asks it to stop (SIGTERM) and waits. Safe to call twice. */
  stop(): Promise<Ended>
  /** Sends a signal, SIGKILL unless told otherwise, and waits for the end. */
  kill(signal?: NodeJS.Signals): Promise<Ended>
  /** Starts it again on the same port and data, after a stop if it still runs. */
  restart(env?: Record<string, string>): Promise<void>
  /** What it has printed since the first start. */
  logs(): string
}

interface Running {
  child: ChildProcess
  ended: Promise<Ended>
}

const open = new Set<TestServer>()
const temporary = new Set<string>()

/**
 * Starts the built server on a free port of 127.0.0.1, exactly as `npm start` sets it up, and waits for its health.
 * @throws with the server's own output when it ends or stays silent instead
 */
export async function startServer(options: ServerOptions = {}): Promise<TestServer> {
  const entry = serverEntry(root)
  if (!existsSync(entry)) throw new Error(`There is no build at ${entry}: run \`npm run build\` first.`)
  const dataDir = options.dataDir ?? mkdtempSync(join(tmpdir(), 'tiltyard-test-'))
  if (!options.dataDir) temporary.add(dataDir)

  const port = await freePort()
  const url = `http://127.0.0.1:${port}`
  let log = ''
  let running: Running
  let last: Ended | null = null

  const launch = async (more: Record<string, string> = {}) => {
    last = null
    running = spawnServer(entry, envFor(port, dataDir, { ...options, env: { ...options.env, ...more } }), (text) => {
      log = (log + text).slice(-LOG_CHARS)
    })
    void running.ended.then((ended) => (last = ended))
    const state = await waitForHealth(url, running.ended)
    if (state === 'ready') return
    running.child.kill('SIGKILL')
    throw new Error(`The server ${state === 'ended' ? 'ended' : 'did not answer'} at ${url}. It printed:\n${log}`)
  }

  const end = async (signal: NodeJS.Signals): Promise<Ended> => {
    if (last) return last
    running.child.kill(signal)
    const inTime = await Promise.race([running.ended, pause(STOPS_WITHIN_MS)])
    if (inTime) return inTime
    running.child.kill('SIGKILL')
    return { ...(await running.ended), forced: true }
  }

  const server: TestServer = {
    url,
    port,
    dataDir,
    get pid() {
      return running.child.pid ?? 0
    },
    stop: () => end('SIGTERM'),
    kill: (signal = 'SIGKILL') => end(signal),
    restart: async (more) => {
      await end('SIGTERM')
      await launch(more)
    },
    logs: () => log,
  }
  await launch()
  open.add(server)
  return server
}

/** Stops every server of this test file and removes the temporary data. */
export async function stopServers(): Promise<void> {
  await Promise.all([...open].map((server) => server.stop()))
  open.clear()
  for (const folder of temporary) rmSync(folder, { recursive: true, force: true })
  temporary.clear()
}

/**
 * A port that nobody uses at the moment, from below the range that systems give to outgoing connections: one of those
 * could otherwise take it while a test has its server down.
 */
export async function freePort(): Promise<number> {
  for (let attempt = 0; attempt < 100; attempt += 1) {
    const port = 20_000 + Math.floor(Math.random() * 12_000)
    if (await isFree(port)) return port
  }
  throw new Error('A hundred ports between 20000 and 32000 are all in use.')
}

function isFree(port: number): Promise<boolean> {
  return new Promise((resolve) => {
    const probe = createServer()
    probe.once('error', () => resolve(false))
    probe.listen({ port, host: '127.0.0.1', exclusive: true }, () => probe.close(() => resolve(true)))
  })
}

function envFor(port: number, dataDir: string, { demo = 'on', env = {} }: ServerOptions): NodeJS.ProcessEnv {
  const asSetting = (name: string) => SETTING_NAMES.includes(name)
  const pick = (wanted: boolean) => Object.fromEntries(Object.entries(env).filter(([name]) => asSetting(name) === wanted))
  const settings = readSettings({ DEMO: demo, ...pick(true), PORT: String(port), DATA_DIR: dataDir }, root)
  prepareDataDir(settings.dataDir)
  const set = serverEnv(settings, sessionSecret(settings.dataDir))
  return { ...withoutSettings(process.env), NODE_ENV: 'production', ...set, ...pick(false) }
}

function spawnServer(entry: string, env: NodeJS.ProcessEnv, onText: (text: string) => void): Running {
  // The channel is never written to: it closes when this process dies, and follow-parent.mjs then stops the server.
  const child = spawn(process.execPath, ['--import', followParent, entry], {
    cwd: root,
    env,
    stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
  })
  child.stdout?.setEncoding('utf8').on('data', onText)
  child.stderr?.setEncoding('utf8').on('data', onText)
  const ended = new Promise<Ended>((resolve) => {
    child.once('error', (problem) => {
      onText(`${problem.message}\n`)
      resolve({ code: 1, signal: null, forced: false })
    })
    child.once('close', (code, signal) => resolve({ code, signal, forced: false }))
  })
  return { child, ended }
}

async function waitForHealth(url: string, ended: Promise<Ended>): Promise<'ready' | 'ended' | 'silent'> {
  let over = false
  void ended.then(() => (over = true))
  const deadline = Date.now() + READY_WITHIN_MS
  while (!over && Date.now() < deadline) {
    const answer = await fetch(`${url}/api/health`, { signal: AbortSignal.timeout(10_000) }).catch(() => null)
    await answer?.arrayBuffer()
    if (answer?.ok) return 'ready'
    await pause(50)
  }
  return over ? 'ended' : 'silent'
}

/** Does not keep the process alive by itself. */
const pause = (ms: number) => setTimeout(ms, undefined, { ref: false })

// Benchmarks use this file too, outside of Vitest: they call stopServers themselves.
if (process.env.VITEST) {
  const { afterAll } = await import('vitest')
  afterAll(stopServers, 60_000)
}
