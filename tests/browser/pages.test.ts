import { readdirSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { AxeBuilder } from '@axe-core/playwright'
import type { Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { openPage } from '../helpers/browser'
import type { Client } from '../helpers/client'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'
import type { Letter, LettersAnswer } from '~/utils/contracts/letter'
import { places } from './places'
import type { Place } from './places'
import { as } from './tower'

/**
 * Every page by day and by night: no violation of WCAG 2.2 A or AA that axe can find, nothing in the console, no failed
 * request, and nothing wider than the window from 320 to 1920 px.
 */

const WCAG = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice']
const WIDTHS = [320, 360, 768, 1024, 1440, 1920]
let demo: TestServer
let bare: TestServer
let letter = ''
const people = new Map<string, Client>()

beforeAll(async () => {
  ;[demo, bare] = await Promise.all([startServer(), startServer({ demo: 'off' })])
  for (const role of ['animator', 'supervisor', 'coordinator', 'guest', 'keeper']) people.set(role, await as(demo.url, role))
  letter = (await people.get('keeper')!.get<LettersAnswer>('/api/letters')).body.letters[0]!.id
})
afterAll(async () => {
  await Promise.all([demo.stop(), bare.stop()])
})

const pathOf = (place: Place) => place.path.replace(':letter', letter)
const nameOf = (place: Place) => `${place.path} as ${place.as ?? 'nobody'}`
const open = (place: Place, colorScheme: 'light' | 'dark') =>
  openPage({
    url: (place.empty ? bare : demo).url,
    path: pathOf(place),
    colorScheme,
    reducedMotion: 'reduce',
    ...(place.as ? { as: people.get(place.as)! } : {}),
  })

/** What axe has against the page, one line each. */
async function violationsOf(page: Page): Promise<string[]> {
  const { violations } = await new AxeBuilder({ page }).withTags(WCAG).analyze()
  return violations.map(({ id, nodes }) => `${id}: ${nodes.map(({ target, failureSummary }) => `${target.join(' ')} (${failureSummary})`).join('; ')}`)
}

/** A letter is shown in a frame that may run no script, axe's own included: the frame's name is checked, the letter by itself below. */
async function takeFramesOut(page: Page): Promise<void> {
  const titles = await page.locator('iframe').evaluateAll((frames) => frames.map((frame) => frame.getAttribute('title')))
  expect(titles.every(Boolean)).toBe(true)
  await page.locator('iframe').evaluateAll((frames) => frames.forEach((frame) => frame.remove()))
}

/** Settled means alive: Vue has taken the server's page over, and the fonts are there. */
async function settle(page: Page): Promise<void> {
  await page.waitForLoadState('networkidle').catch(() => undefined)
  await page.evaluate(() => document.fonts.ready.then(() => undefined))
}

describe('every page', () => {
  it('is in the list of places', () => {
    const folder = fileURLToPath(new URL('../../pages', import.meta.url))
    const files = readdirSync(folder, { recursive: true, encoding: 'utf8' }).filter((name) => name.endsWith('.vue'))
    expect([...new Set(places.map(({ page }) => `${page}.vue`))].sort()).toEqual(files.sort())
  })

  describe.each(['light', 'dark'] as const)('%s', (theme) => {
    it.each(places.map((place) => [nameOf(place), place] as const))('%s has no axe violation', async (_, place) => {
      const { page } = await open(place, theme)
      await settle(page)
      await takeFramesOut(page)
      expect(await violationsOf(page)).toEqual([])
    })

    it('a letter as it goes out has no axe violation', async () => {
      const { body } = await people.get('keeper')!.get<Letter>(`/api/letters/${letter}`)
      const { page } = await openPage({ url: demo.url, colorScheme: theme })
      await page.setContent(body.html)
      expect(await violationsOf(page)).toEqual([])
    })
  })

  it.each(places.map((place) => [nameOf(place), place] as const))('%s fits windows of 320 to 1920 px', async (_, place) => {
    const { page } = await open(place, 'light')
    await settle(page)
    const tooWide: string[] = []
    for (const width of WIDTHS) {
      await page.setViewportSize({ width, height: 900 })
      await page.waitForTimeout(120)
      const over = await page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth)
      if (over > 0) tooWide.push(`${width} px: ${over} px too wide`)
    }
    expect(tooWide).toEqual([])
  })

  it('shows a page of its own for what is not there, and for a production of other people', async () => {
    for (const path of ['/no-such-page', '/p/somebody-elses']) {
      const window = await openPage({ url: demo.url, as: people.get('animator')!, expected: [/no-such-page|somebody-elses/] })
      const answer = await window.page.goto(path)
      expect(answer?.status()).toBe(404)
      await window.page.getByRole('heading', { name: 'There is nothing here' }).waitFor()
      expect(await window.page.locator('body').innerText()).not.toMatch(/\bat .*\.m?js:\d+/)
    }
  })
})
