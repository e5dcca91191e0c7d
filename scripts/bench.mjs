/**
 * `npm run bench`: runs every tests/bench/*.bench.ts in turn, each in a process of its own. A benchmark's default export
 * is an async function that prints its table. `npm run bench -- wall` runs those whose name contains "wall".
 */
import { existsSync, mkdirSync, readdirSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { pathToFileURL } from 'node:url'
import { build, install, needsBuild } from './lib/prepare.mjs'
import { endChildrenOnSignals, run } from './lib/processes.mjs'
import { PlainStop, requireNode, runScript } from './lib/say.mjs'
import { projectRoot as root } from './lib/serve.mjs'
import { withoutSettings } from './lib/settings.mjs'

const SUFFIX = '.bench.ts'
const folder = join(root, 'tests', 'bench')
// Inside node_modules, so that the bundles find the packages and git does not see them.
const bundles = join(root, 'node_modules', '.cache', 'tiltyard-bench')

/** Helpers find the project's files from their own address, which bundling would change. */
const keepOwnAddress = {
  name: 'keep-own-address',
  setup({ onLoad }) {
    onLoad({ filter: /\.(ts|mjs)$/ }, async ({ path }) => {
      if (path.includes('node_modules') && !path.startsWith(bundles)) return undefined
      const { readFile } = await import('node:fs/promises')
      const text = await readFile(path, 'utf8')
      const contents = text.replaceAll('import.meta.url', JSON.stringify(pathToFileURL(path).href))
      return { contents, loader: path.endsWith('.ts') ? 'ts' : 'js' }
    })
  },
}

await runScript(async () => {
  requireNode(process.versions.node)
  const names = chosen(process.argv.slice(2))
  endChildrenOnSignals()
  await install(root)
  const env = { ...withoutSettings(process.env), TZ: 'UTC', NODE_ENV: 'production' }
  if (needsBuild(root, env) && !(await build(root, { env }))) throw new PlainStop('The build failed, so nothing was measured.')

  const failed = []
  for (const name of names) {
    console.log(`\n--- ${name} ---`)
    const { code } = await run([process.execPath, '--expose-gc', await bundle(name)], { cwd: root, env })
    if (code !== 0) failed.push(name)
  }
  if (failed.length > 0) throw new PlainStop(`Failed: ${failed.join(', ')}.`)
})

function chosen(wanted) {
  const all = existsSync(folder) ? readdirSync(folder).filter((file) => file.endsWith(SUFFIX)) : []
  const names = all.map((file) => file.slice(0, -SUFFIX.length)).sort()
  const some = wanted.length > 0 ? names.filter((name) => wanted.some((part) => name.includes(part))) : names
  if (some.length === 0) throw new PlainStop('There is no such benchmark in tests/bench.')
  return some
}

/** @returns {Promise<string>} the path of a script that runs the benchmark */
async function bundle(name) {
  const { build: esbuild } = await import('esbuild')
  const outfile = join(bundles, `${name}.mjs`)
  const entry = join(bundles, `${name}.entry.ts`)
  rmSync(outfile, { force: true })
  mkdirSync(bundles, { recursive: true })
  const source = JSON.stringify(join(folder, name + SUFFIX))
  writeFileSync(entry, `import run from ${source}\nawait run()\nprocess.exit(0)\n`)
  await esbuild({
    entryPoints: [entry],
    outfile,
    bundle: true,
    platform: 'node',
    format: 'esm',
    target: 'node20',
    packages: 'external',
    sourcemap: 'inline',
    alias: { '~': root },
    plugins: [keepOwnAddress],
    logLevel: 'warning',
  })
  return outfile
}
