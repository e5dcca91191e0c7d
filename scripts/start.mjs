/** `npm start`: installs and builds what is missing, then serves. Every setting is in README.md's table. */
import { prepareDataDir, sessionSecret } from './lib/data.mjs'
import { build, install, needsBuild, serverEntry } from './lib/prepare.mjs'
import { endChildrenOnSignals } from './lib/processes.mjs'
import { PlainStop, requireNode, runScript } from './lib/say.mjs'
import { projectRoot as root, requireFreePort, serve, welcome } from './lib/serve.mjs'
import { localUrl, readSettings, serverEnv } from './lib/settings.mjs'

await runScript(async () => {
  requireNode(process.versions.node)
  // What can be refused at once is refused before the minutes of installing and building.
  const settings = readSettings(process.env, root)
  await requireFreePort(settings.host, settings.port)
  prepareDataDir(settings.dataDir)

  const release = endChildrenOnSignals()
  await install(root)
  if (needsBuild(root)) {
    console.log('Building (a minute or two, only after the sources changed).')
    if (!(await build(root))) throw new PlainStop('Tiltyard could not be built: the reason is above.')
  }
  release()

  return serve({
    args: [serverEntry(root)],
    env: { ...process.env, NODE_ENV: 'production', ...serverEnv(settings, sessionSecret(settings.dataDir)) },
    cwd: root,
    url: localUrl(settings),
    onReady: (session) => console.log(welcome(settings, session)),
  })
})
