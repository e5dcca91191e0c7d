/** The browser that tests and pictures drive: Debian's Chromium, or the one that CHROMIUM names. */
import { existsSync } from 'node:fs'
import { delimiter, join } from 'node:path'
import { run } from './processes.mjs'

/** Headless in a container, without a graphics card, and without a request that the product did not make. */
export const CHROMIUM_FLAGS = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
]

/** @returns {string | null} the path of the program */
export function findChromium(env = process.env) {
  if (env.CHROMIUM) return existsSync(env.CHROMIUM) ? env.CHROMIUM : null
  const folders = ['/usr/bin', ...(env.PATH ?? '').split(delimiter)].filter(Boolean)
  const places = folders.flatMap((folder) => ['chromium', 'chromium-browser'].map((name) => join(folder, name)))
  return places.find((place) => existsSync(place)) ?? null
}

/**
 * Installs Chromium where that can be done without asking anybody: as root on Debian.
 * @returns {Promise<string | null>} why there is none, as one sentence; null when there is one
 */
export async function ensureChromium() {
  if (findChromium()) return null
  if (process.getuid?.() === 0 && existsSync('/usr/bin/apt-get')) {
    console.log('Installing Chromium for the browser tests.')
    const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' }
    const updated = await run(['apt-get', 'update'], { env })
    if (updated.code === 0) await run(['apt-get', 'install', '-y', 'chromium'], { env })
    if (findChromium()) return null
  }
  return 'The browser tests need Chromium: install it (apt-get install chromium), or set CHROMIUM to its path.'
}
