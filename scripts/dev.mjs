/** `npm run dev`: the same settings as `npm start`, with Nuxt's development server. */
import { prepareDataDir, sessionSecret } from './lib/data.mjs'
import { install, nuxtBin } from './lib/prepare.mjs'
import { endChildrenOnSignals } from './lib/processes.mjs'
import { requireNode, runScript } from './lib/say.mjs'
import { projectRoot as root, requireFreePort, serve, welcome } from './lib/serve.mjs'
import { localUrl, readSettings, serverEnv } from './lib/settings.mjs'

await runScript(async () => {
  requireNode(process.versions.node)
  const settings = readSettings(process.env, root)
  await requireFreePort(settings.host, settings.port)
  prepareDataDir(settings.dataDir)
  const release = endChildrenOnSignals()
  await install(root)
  release()
  return serve({
    args: [nuxtBin(root), 'dev', '--host', settings.host, '--port', String(settings.port)],
    env: { ...process.env, ...serverEnv(settings, sessionSecret(settings.dataDir)) },
    cwd: root,
    url: localUrl(settings),
    onReady: (session) => console.log(welcome(settings, session)),
  })
})
