import { spawn } from 'node:child_process'
import { fileURLToPath } from 'node:url'

const followParent = new URL('../../../scripts/lib/follow-parent.mjs', import.meta.url).href

/** A bare server in a process of its own, on a free port of 127.0.0.1. */
export async function startBare(name: 'wall' | 'sockets', ...args: string[]): Promise<{ url: string; stop: () => void }> {
  const script = fileURLToPath(new URL(`./${name}.mjs`, import.meta.url))
  const child = spawn(process.execPath, ['--import', followParent, script, ...args], { stdio: ['ignore', 'pipe', 'inherit', 'ipc'] })
  const port = await new Promise<number>((resolve, reject) => {
    child.stdout?.once('data', (text: Buffer) => resolve(Number(text.toString())))
    child.once('exit', (code) => reject(new Error(`The bare server ended with ${code}.`)))
  })
  return { url: `http://127.0.0.1:${port}`, stop: () => void child.kill('SIGTERM') }
}

export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b)
  const middle = sorted.length / 2
  return ((sorted[Math.ceil(middle) - 1] ?? NaN) + (sorted[Math.floor(middle)] ?? NaN)) / 2
}
