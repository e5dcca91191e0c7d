/** Child processes that end: by themselves, on time, or with the script that started them. */
import { spawn } from 'node:child_process'

/** Groups of children that still run, by the process id of their first member. */
const running = new Set()

/**
 * Runs a command to its end in a process group of its own, and ends what it leaves behind.
 * @param {string[]} command the program and its arguments
 * @param {object} [options]
 * @param {string} [options.cwd]
 * @param {Record<string, string | undefined>} [options.env]
 * @param {number} [options.timeoutMs] the whole group is killed after that
 * @param {boolean} [options.quiet] true keeps the output instead of showing it
 * @returns {Promise<{ code: number, timedOut: boolean, output: string }>} code 1 when it ended by a signal
 */
export function run([program, ...args], { cwd, env = process.env, timeoutMs, quiet = false } = {}) {
  return new Promise((resolve) => {
    const stdio = quiet ? ['ignore', 'pipe', 'pipe'] : ['ignore', 'inherit', 'inherit']
    const child = spawn(program, args, { cwd, env, stdio, detached: true })
    const chunks = []
    let timedOut = false
    const timer = timeoutMs
      ? setTimeout(() => {
          timedOut = true
          endGroup(child.pid)
        }, timeoutMs)
      : undefined
    if (child.pid) running.add(child.pid)
    child.stdout?.on('data', (chunk) => chunks.push(chunk))
    child.stderr?.on('data', (chunk) => chunks.push(chunk))
    child.on('exit', () => endGroup(child.pid))
    const finish = (code, note = '') => {
      clearTimeout(timer)
      running.delete(child.pid)
      resolve({ code, timedOut, output: Buffer.concat(chunks).toString('utf8') + note })
    }
    child.on('error', (error) => finish(1, error.message))
    child.on('close', (code) => finish(code ?? 1))
  })
}

const STOP_SIGNALS = { SIGINT: 2, SIGTERM: 15, SIGHUP: 1 }

/**
 * From now on Ctrl-C and the like end the children too, then this script in the usual way: 128 + the signal's number.
 * @returns {() => void} gives the signals back
 */
export function endChildrenOnSignals() {
  const stopAs = (signal) => () => {
    for (const pid of running) endGroup(pid)
    process.exit(128 + STOP_SIGNALS[signal])
  }
  const handlers = Object.keys(STOP_SIGNALS).map((signal) => {
    const stop = stopAs(signal)
    process.once(signal, stop)
    return () => process.off(signal, stop)
  })
  handlers.push(whenAbandoned(stopAs('SIGTERM')))
  return () => handlers.forEach((giveBack) => giveBack())
}

const ABANDONED_CHECK_MS = 200

/**
 * npm passes a signal on to the shell it runs scripts in, and most shells die of it without telling the script. So a
 * script that npm started asks whether that shell is still its parent. One that somebody else started may outlive them.
 * @param {() => void} stop called once, when the shell is gone
 * @returns {() => void} stops asking
 */
export function whenAbandoned(stop, env = process.env) {
  if (!env.npm_lifecycle_event) return () => {}
  const parent = process.ppid
  const timer = setInterval(() => {
    if (process.ppid === parent) return
    clearInterval(timer)
    stop()
  }, ABANDONED_CHECK_MS)
  timer.unref()
  return () => clearInterval(timer)
}

function endGroup(pid) {
  if (!pid) return
  try {
    process.kill(-pid, 'SIGKILL')
  } catch {
    // Nobody of the group is left.
  }
}
