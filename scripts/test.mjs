/**
 * `npm test`: lint, type check, build, then every suite against that build. `npm test -- unit api` runs only those.
 * All steps run, whatever fails; the last line counts tests as the runners' JSON reports do, and every step that is
 * no test but failed as one more.
 */
import { mkdirSync, mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join, relative } from 'node:path'
import { ensureChromium } from './lib/chromium.mjs'
import { countLine, countLint, countTests, failedOnce, sum } from './lib/count.mjs'
import { build, install, needsBuild, nuxtBin } from './lib/prepare.mjs'
import { endChildrenOnSignals, run } from './lib/processes.mjs'
import { PlainStop, requireNode, runScript } from './lib/say.mjs'
import { projectRoot as root } from './lib/serve.mjs'
import { withoutSettings } from './lib/settings.mjs'

const MINUTE = 60_000
/** CI stops everything at 90 minutes; a run that names the step that hung is worth more. */
const deadline = Date.now() + 85 * MINUTE
const reports = join(root, '.reports')
const nothing = { passed: 0, failed: 0, skipped: 0 }

// Tests clean up behind themselves, except those that are stopped: one folder for all is gone in either case.
const scratch = mkdtempSync(join(tmpdir(), 'tiltyard-tests-'))
process.on('exit', () => rmSync(scratch, { recursive: true, force: true }))

// What somebody has set for their own installation must not reach the tests.
const env = { ...withoutSettings(process.env), TZ: 'UTC', TMPDIR: scratch }
// ESLint and the type check read what Nuxt generates in its usual place.
const usualPlace = { ...env, TILTYARD_BUILD_DIR: undefined }

const node = (script, ...args) => [process.execPath, join(root, 'node_modules', ...script.split('/')), ...args]

/** Runs one command within its minutes and what is left of the whole. */
async function step(command, minutes, environment = env) {
  const timeoutMs = Math.min(minutes * MINUTE, deadline - Date.now())
  if (timeoutMs <= 0) return { code: 1, timedOut: true }
  return run(command, { cwd: root, env: environment, timeoutMs })
}

async function lint() {
  const prepared = await step([process.execPath, nuxtBin(root), 'prepare'], 5, usualPlace)
  if (prepared.code !== 0) return failedOnce('Nuxt could not prepare what ESLint reads.')
  const file = freshReport('lint')
  const { code } = await step(node('eslint/bin/eslint.js', '.', '--format', 'json', '--output-file', file), 10, usualPlace)
  const { messages, ...count } = countLint(read(file), code)
  for (const message of messages) console.log(message.replace(`${root}/`, ''))
  return count
}

async function typecheck() {
  const { code } = await step([process.execPath, nuxtBin(root), 'typecheck'], 15, usualPlace)
  return code === 0 ? nothing : failedOnce(`The type check ended with ${code}.`)
}

let built
/** @param {{ always: boolean }} how `always` builds even when the sources have not changed since the last time */
async function makeBuild({ always }) {
  built ??= always || needsBuild(root, env) ? await build(root, { env, timeoutMs: 15 * MINUTE }) : true
  return built ? nothing : failedOnce('The build failed.')
}

async function suite(name, { minutes, needs = [] }) {
  if (needs.includes('build') && (await makeBuild({ always: false })).failed) {
    return failedOnce('Not run: there is no build.')
  }
  const missing = needs.includes('chromium') ? await ensureChromium() : null
  if (missing) return failedOnce(missing)
  const file = freshReport(name)
  const args = ['run', `--project=${name}`, '--reporter=default', '--reporter=json', `--outputFile.json=${file}`]
  const { code, timedOut } = await step(node('vitest/vitest.mjs', ...args), minutes)
  const count = countTests(read(file), code)
  return timedOut ? { ...count, failed: count.failed || 1, why: `Stopped after ${minutes} minutes.` } : count
}

const steps = {
  lint,
  typecheck,
  build: () => makeBuild({ always: true }),
  unit: () => suite('unit', { minutes: 15 }),
  outside: () => suite('outside', { minutes: 15 }),
  api: () => suite('api', { minutes: 20, needs: ['build'] }),
  live: () => suite('live', { minutes: 20, needs: ['build'] }),
  browser: () => suite('browser', { minutes: 30, needs: ['build', 'chromium'] }),
}

function freshReport(name) {
  const file = join(reports, `${name}.json`)
  rmSync(file, { force: true })
  return file
}

function read(file) {
  try {
    return readFileSync(file, 'utf8')
  } catch {
    return null
  }
}

function chosenSteps(names) {
  const unknown = names.filter((name) => !Object.hasOwn(steps, name))
  if (unknown.length === 0) return names.length > 0 ? names : Object.keys(steps)
  throw new PlainStop(`There is no step called ${unknown.join(', ')}: choose from ${Object.keys(steps).join(', ')}.`)
}

await runScript(async () => {
  requireNode(process.versions.node)
  const names = chosenSteps(process.argv.slice(2))
  endChildrenOnSignals()
  mkdirSync(reports, { recursive: true })
  await install(root)

  const results = []
  for (const name of names) {
    console.log(`\n--- ${name} ---`)
    const began = Date.now()
    const count = await steps[name]()
    results.push({ name, seconds: Math.round((Date.now() - began) / 1000), ...count })
  }

  console.log(`\nReports are in ${relative(root, reports)}/`)
  for (const { name, seconds, why, ...count } of results) {
    console.log(`${name.padEnd(10)}${String(seconds).padStart(5)} s  ${resultWord(count)}${why ? `  ${why}` : ''}`)
  }
  const total = sum(results)
  console.log(countLine(total))
  return total.failed > 0 ? 1 : 0
})

/** Steps that are no tests have nothing to count. */
function resultWord(count) {
  if (count.passed + count.skipped === 0) return count.failed > 0 ? 'failed' : 'in order'
  return countLine(count)
}
