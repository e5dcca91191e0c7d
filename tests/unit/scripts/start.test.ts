import { spawn } from 'node:child_process'
import type { ChildProcess } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { createServer } from 'node:net'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath, pathToFileURL } from 'node:url'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { PlainStop, requireNode } from '../../../scripts/lib/say.mjs'
import { welcome } from '../../../scripts/lib/serve.mjs'
import { readSettings, withoutSettings } from '../../../scripts/lib/settings.mjs'
import { freePort } from '../../helpers/server'

const root = fileURLToPath(new URL('../../..', import.meta.url))
let folder = ''
const started = new Set<ChildProcess>()
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'tiltyard-start-'))
})
afterEach(() => {
  for (const child of started) child.kill('SIGKILL')
  started.clear()
  rmSync(folder, { recursive: true })
})

function node(args: string[], env: Record<string, string> = {}) {
  const child = spawn(process.execPath, args, { cwd: root, env: { ...withoutSettings(process.env), ...env } })
  started.add(child)
  const said = { out: '', err: '' }
  child.stdout.setEncoding('utf8').on('data', (text) => (said.out += text))
  child.stderr.setEncoding('utf8').on('data', (text) => (said.err += text))
  const ended = new Promise<number | null>((resolve) => child.once('close', resolve))
  return { child, said, ended }
}

async function until(condition: () => boolean, what: string) {
  for (const deadline = Date.now() + 15_000; !condition(); ) {
    if (Date.now() > deadline) throw new Error(`Never happened: ${what}`)
    await new Promise((resolve) => setTimeout(resolve, 20))
  }
}

describe('npm start refuses at once, in one sentence', () => {
  const refusal = async (env: Record<string, string>) => {
    const { said, ended } = node(['scripts/start.mjs'], env)
    expect(await ended).toBe(1)
    expect(said.out).toBe('')
    expect(said.err.trim().split('\n')).toHaveLength(1)
    return said.err.trim()
  }

  it('a port in use', async () => {
    const port = await freePort()
    const other = createServer().listen(port, '127.0.0.1')
    const sentence = await refusal({ PORT: String(port), DATA_DIR: folder })
    other.close()
    expect(sentence).toBe(`Port ${port} on 127.0.0.1 is in use: stop what uses it, or set PORT to another one.`)
  })

  it('an address that is not this machine’s', async () => {
    const env = { HOST: '192.0.2.1', BASE_URL: 'https://board.studio.example', PORT: String(await freePort()) }
    expect(await refusal(env)).toMatch(/^HOST=192\.0\.2\.1 is not an address that this machine can listen on/)
  })

  it('a data folder that cannot be written', async () => {
    const file = join(folder, 'file')
    writeFileSync(file, '')
    const sentence = await refusal({ PORT: String(await freePort()), DATA_DIR: file })
    expect(sentence).toBe(`The data folder ${file} cannot be written (ENOTDIR): set DATA_DIR to one that can.`)
  })

  it('plain http beyond this machine', async () => {
    expect(await refusal({ BASE_URL: 'http://board.studio.example' })).toMatch(/or set ALLOW_PLAIN_HTTP=yes\.$/)
  })
})

describe('a Node.js that is too old', () => {
  it('is refused, others are not', () => {
    expect(() => requireNode('20.18.3')).toThrow(PlainStop)
    expect(() => requireNode('18.20.0')).toThrow('Tiltyard needs Node.js 20.19 or newer; this is 18.20.0.')
    for (const version of ['20.19.0', '20.20.2', '22.0.0']) expect(() => requireNode(version)).not.toThrow()
  })
})

/** A server that answers as the product does after a while, prints what happens to it, and stops when told. */
const board = (port: number, ends: string) => `
  import { createServer } from 'node:http'
  let asked = 0
  ${ends}
  const server = createServer((request, response) => {
    if (request.url === '/api/health') response.writeHead(++asked > 2 ? 200 : 503)
    response.end(JSON.stringify({ demo: true, empty: false, demoAccounts: [{ email: 'e@x.example', role: 'guest', name: 'Ann' }] }))
  }).listen(${port}, '127.0.0.1')
  process.on('SIGTERM', () => { console.log('board stops'); server.close(); server.closeAllConnections() })`

async function prepareServing(ends = '') {
  const port = await freePort()
  const script = join(folder, 'board.mjs')
  writeFileSync(script, board(port, ends))
  const lib = (name: string) => JSON.stringify(pathToFileURL(join(root, 'scripts/lib', name)).href)
  const starter = join(folder, 'start.mjs')
  writeFileSync(
    starter,
    `import { serve } from ${lib('serve.mjs')}
     import { runScript } from ${lib('say.mjs')}
     await runScript(() => serve({ args: [${JSON.stringify(script)}], env: process.env, cwd: '.',
       url: 'http://127.0.0.1:${port}', onReady: (session) => console.log('ready', JSON.stringify(session)) }))`,
  )
  return { port, script: starter, said: { out: '', err: '' } }
}

async function serving(ends = '') {
  const { port, script } = await prepareServing(ends)
  return { port, ...node([script]) }
}

describe('the server’s keeper', () => {
  it('waits for its health, then stops it gently when told to stop', async () => {
    const { child, said, ended } = await serving()
    await until(() => said.out.includes('ready'), 'ready')
    expect(said.out).toContain('"email":"e@x.example"')
    child.kill('SIGTERM')
    expect(await ended).toBe(0)
    expect(said.out).toMatch(/board stops\n$/)
    expect(said.err).toBe('')
  })

  it('ends as the server ended, and adds nothing to what it said', async () => {
    const { said, ended } = await serving(`console.error('The database is from a newer version.'); process.exit(1)`)
    expect(await ended).toBe(1)
    expect(said).toEqual({ out: '', err: 'The database is from a newer version.\n' })
  })

  it('stops it when npm’s shell dies of a signal without passing it on', async () => {
    const { script, said } = await prepareServing()
    // A shell that does something after the command stays its parent, as npm's does.
    const shell = spawn('sh', ['-c', `"${process.execPath}" "${script}"; true`], {
      env: { ...withoutSettings(process.env), npm_lifecycle_event: 'start' },
    })
    started.add(shell)
    shell.stdout.setEncoding('utf8').on('data', (text) => (said.out += text))
    await until(() => said.out.includes('ready'), 'ready')
    shell.kill('SIGTERM')
    await new Promise((resolve) => shell.once('close', resolve))
    expect(said.out).toMatch(/board stops\n$/)
  })

  it('takes the server along when it is killed itself', async () => {
    const { child, said, ended, port } = await serving()
    await until(() => said.out.includes('ready'), 'ready')
    child.kill('SIGKILL')
    // Ends when the server, too, has let go of the output.
    await ended
    expect(said.out).toMatch(/board stops\n$/)
    await expect(fetch(`http://127.0.0.1:${port}/api/health`)).rejects.toThrow()
  })
})

describe('the welcome', () => {
  const settings = readSettings({ DATA_DIR: '/srv/data' }, '/srv')
  const accounts = [{ email: 'animator@quayside.example', role: 'animator', name: 'Ann' }]

  it('tells the address, and the demo accounts with their password', () => {
    const text = welcome(settings, { demo: true, empty: false, demoAccounts: accounts })
    expect(text).toContain('Tiltyard is at http://127.0.0.1:4310\n')
    expect(text).toContain('password: cranes walk at night\n  animator@quayside.example  animator, Ann')
  })

  it('tells no account of a real installation, but what to do first', () => {
    const text = welcome(settings, { demo: false, empty: true, demoAccounts: accounts })
    expect(text).not.toContain('cranes')
    expect(text).not.toContain('quayside')
    expect(text).toContain('make the first keeper')
  })

  it('names the setting that lets passwords travel in the open', () => {
    expect(welcome(settings, null)).not.toContain('ALLOW_PLAIN_HTTP')
    expect(welcome({ ...settings, plainHttpAllowed: true }, null)).toContain('ALLOW_PLAIN_HTTP=yes')
  })
})
