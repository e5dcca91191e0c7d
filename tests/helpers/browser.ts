import { setTimeout } from 'node:timers/promises'
import { chromium } from 'playwright-core'
import type { Browser, BrowserContext, BrowserContextOptions, Page, Request } from 'playwright-core'
import { afterAll, afterEach, expect, onTestFinished } from 'vitest'
import { CHROMIUM_FLAGS, findChromium } from '../../scripts/lib/chromium.mjs'
import type { Client } from './client'

export interface OpenPageOptions {
  /** The server under test; `page.goto('/sign-in')` goes there. */
  url: string
  /** Path to open at once. Left out: the page stays empty. */
  path?: string
  /** Continues this client's session. */
  as?: Client
  viewport?: { width: number; height: number }
  colorScheme?: 'light' | 'dark'
  reducedMotion?: 'reduce' | 'no-preference'
  /** Addresses whose refusal (4xx, 5xx) or failure belongs to the test. More can be added with `allow`. */
  expected?: RegExp[]
  /** Anything else of a browser window. */
  context?: Omit<BrowserContextOptions, 'baseURL' | 'viewport' | 'colorScheme' | 'reducedMotion'>
}

export interface OpenPage {
  page: Page
  context: BrowserContext
  /** From now on, requests to matching addresses may fail. */
  allow(address: RegExp): void
  /** What has gone wrong so far, one sentence each. The test fails by itself when there is any. */
  problems(): string[]
  close(): Promise<void>
}

interface Watched {
  context: BrowserContext
  problems: string[]
  close(): Promise<void>
}

const HEAR_OUT_MS = 2_000
let shared: Promise<Browser> | null = null
const watched = new Set<Watched>()

/** The one browser of this test file, started when first asked for. */
export function browser(): Promise<Browser> {
  const executablePath = findChromium()
  if (!executablePath) throw new Error('There is no Chromium: install it, or set CHROMIUM to its path.')
  shared ??= chromium.launch({ executablePath, args: CHROMIUM_FLAGS })
  return shared
}

/**
 * Opens a window of its own, with nobody else's cookies. The running test fails on any console error, hydration
 * warning, error on the page, failed or refused request, request to another host, or CSP report, unless expected.
 * Opened within a test, it closes with the test; opened in a hook, with the file.
 */
export async function openPage(options: OpenPageOptions): Promise<OpenPage> {
  const context = await (await browser()).newContext({
    locale: 'en-GB',
    ...options.context,
    baseURL: options.url,
    viewport: options.viewport ?? { width: 1440, height: 900 },
    colorScheme: options.colorScheme ?? 'light',
    reducedMotion: options.reducedMotion ?? 'no-preference',
  })
  if (options.as) await context.addCookies(cookiesOf(options.as))

  const expected = [...(options.expected ?? [])]
  const problems: string[] = []
  const isExpected = (address: string) => expected.some((pattern) => pattern.test(address))
  const note = (problem: string) => problems.push(problem)

  await context.exposeFunction('__noteCspReport', (text: string) => note(`CSP report: ${text}`))
  await context.addInitScript(reportCsp)
  context.on('page', (page) => watch(page, new URL(options.url), note, isExpected))

  const page = await context.newPage()
  const entry: Watched = {
    context,
    problems,
    close: () => context.close(),
  }
  watched.add(entry)
  closeWithTest(entry)
  if (options.path) await page.goto(options.path)

  return {
    page,
    context,
    allow: (address) => void expected.push(address),
    problems: () => [...problems],
    close: entry.close,
  }
}

function watch(page: Page, server: URL, note: (problem: string) => void, isExpected: (address: string) => boolean) {
  page.on('pageerror', (problem) => note(`Error on ${page.url()}: ${problem.stack ?? problem.message}`))
  page.on('console', (message) => {
    const bad = message.type() === 'error' || (message.type() === 'warning' && /hydrat/i.test(message.text()))
    // Chromium says once more in the console what `response` and `requestfailed` tell below.
    const echo = /^Failed to load resource|^WebSocket connection to/.test(message.text())
    if (bad && !(echo && (isExpected(message.location().url) || isExpected(message.text())))) {
      note(`Console on ${page.url()}: ${message.text()}`)
    }
  })
  page.on('request', (request) => {
    const { protocol, host } = new URL(request.url())
    if (/^(https?|wss?):$/.test(protocol) && host !== server.host) note(`A request left the house: ${request.url()}`)
  })
  page.on('requestfailed', (request) => {
    if (!isExpected(request.url()) && !isGivenUp(request)) {
      note(`${request.method()} ${request.url()} failed: ${request.failure()?.errorText}`)
    }
  })
  page.on('response', (response) => {
    if (response.status() >= 400 && !isExpected(response.url())) {
      note(`${response.request().method()} ${response.url()} answered ${response.status()}`)
    }
  })
  page.on('websocket', (socket) => {
    if (new URL(socket.url()).host !== server.host) note(`A socket left the house: ${socket.url()}`)
    socket.on('socketerror', (problem) => {
      if (!isExpected(socket.url())) note(`Socket ${socket.url()} failed: ${problem}`)
    })
  })
}

/** The page itself gave it up, by leaving or by aborting: nobody refused anything. */
const isGivenUp = (request: Request) => request.failure()?.errorText === 'net::ERR_ABORTED'

/** Runs in the page, before any of its own scripts. */
function reportCsp() {
  document.addEventListener('securitypolicyviolation', ({ violatedDirective, blockedURI, sourceFile, lineNumber }) => {
    const noted = (window as unknown as { __noteCspReport: (text: string) => void }).__noteCspReport
    noted(`${violatedDirective} blocked ${blockedURI} (${sourceFile}:${lineNumber})`)
  })
}

function cookiesOf(client: Client) {
  return client.cookie.split('; ').map((pair) => {
    const cut = pair.indexOf('=')
    return { name: pair.slice(0, cut), value: pair.slice(cut + 1), url: client.url, httpOnly: true, sameSite: 'Lax' as const }
  })
}

function closeWithTest(entry: Watched) {
  try {
    onTestFinished(async () => {
      await entry.close()
      watched.delete(entry)
    })
  } catch {
    // Called from a hook: there is no test yet, and the window stays open for all of them.
  }
}

/** Waits until each page has said what it had to say: its complaints arrive in order, before the answer. */
async function hearOut() {
  const pages = [...watched].flatMap(({ context }) => context.pages())
  const answers = Promise.allSettled(pages.map((page) => page.evaluate(() => document.readyState)))
  await Promise.race([answers, setTimeout(HEAR_OUT_MS, undefined, { ref: false })])
}

// `afterEach` runs before `onTestFinished`, so that it still sees the windows of the test.
afterEach(async () => {
  await hearOut()
  const problems = [...watched].flatMap((entry) => entry.problems.splice(0))
  expect(problems, 'what the browser complained about').toEqual([])
})

afterAll(async () => {
  await Promise.all([...watched].map((entry) => entry.close()))
  watched.clear()
  await (await shared)?.close()
  shared = null
})
