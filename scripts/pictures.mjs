/** `npm run pictures`: takes the README's pictures from a fresh demo, with headless Chromium. Kept small: one JPEG each. */
import { mkdirSync, mkdtempSync, rmSync } from 'node:fs'
import { createServer } from 'node:net'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { CHROMIUM_FLAGS, ensureChromium, findChromium } from './lib/chromium.mjs'
import { prepareDataDir, sessionSecret } from './lib/data.mjs'
import { build, install, needsBuild, serverEntry } from './lib/prepare.mjs'
import { PlainStop, requireNode, runScript } from './lib/say.mjs'
import { DEMO_PASSWORD, projectRoot as root, serve } from './lib/serve.mjs'
import { readSettings, serverEnv, withoutSettings } from './lib/settings.mjs'

const folder = join(root, 'docs', 'pictures')
const PRODUCTION = '/p/quayside-giants'
const SHOT = `${PRODUCTION}/shots/CLK-110`

await runScript(async () => {
  requireNode(process.versions.node)
  await install(root)
  const missing = await ensureChromium()
  if (missing) throw new PlainStop(missing)
  if (needsBuild(root) && !(await build(root))) throw new PlainStop('The build failed, so there is nothing to take a picture of.')

  const dataDir = mkdtempSync(join(tmpdir(), 'tiltyard-pictures-'))
  const settings = readSettings({ DATA_DIR: dataDir, PORT: String(await freePort()) }, root)
  prepareDataDir(settings.dataDir)
  let problem = null
  await serve({
    args: [serverEntry(root)],
    env: { ...withoutSettings(process.env), NODE_ENV: 'production', ...serverEnv(settings, sessionSecret(settings.dataDir)) },
    cwd: root,
    url: settings.baseUrl,
    onReady: () => {
      takeAll(settings.baseUrl)
        .catch((error) => (problem = error))
        .finally(() => process.kill(process.pid, 'SIGTERM'))
    },
  })
  rmSync(dataDir, { recursive: true, force: true })
  if (problem) throw problem
  return 0
})

async function takeAll(url) {
  const { chromium } = await import('playwright-core')
  mkdirSync(folder, { recursive: true })
  const browser = await chromium.launch({ executablePath: findChromium(), args: CHROMIUM_FLAGS })
  try {
    const context = await browser.newContext({ baseURL: url, viewport: { width: 1280, height: 860 }, reducedMotion: 'reduce' })
    await context.request.post('/api/session', {
      data: { email: 'supervisor@quayside.example', password: DEMO_PASSWORD },
      headers: { origin: url },
    })
    const page = await context.newPage()
    const open = (path) => page.goto(path, { waitUntil: 'networkidle' })
    const take = async (name, clip) => {
      await page.screenshot({ path: join(folder, `${name}.jpg`), type: 'jpeg', quality: 80, clip })
      console.log(`docs/pictures/${name}.jpg`)
    }

    await open(PRODUCTION)
    await take('wall')
    await open(`${SHOT}?take=1&frame=61`)
    await page.setViewportSize({ width: 1280, height: 1250 })
    await take('shot')
    await page.setViewportSize({ width: 1280, height: 620 })
    await page.getByText('Goes back', { exact: true }).click()
    await page.getByLabel('Note on take 1').fill('Give it the time its size needs. Keep the lean, redo 61.')
    await page.evaluate(() => document.activeElement?.blur())
    await take('ruling')
  } finally {
    await browser.close()
  }
}

function freePort() {
  return new Promise((resolve, reject) => {
    const probe = createServer()
    probe.once('error', reject)
    probe.listen(0, '127.0.0.1', () => {
      const { port } = probe.address()
      probe.close(() => resolve(port))
    })
  })
}
