import AxeBuilder from '@axe-core/playwright'
import type { Locator, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { openPage } from '../helpers/browser'
import type { Client } from '../helpers/client'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'
import { counts, shows, visible } from './seen'
import { as, PRODUCTION } from './tower'

/** Play on a take, and what a broken drawing says of itself: by pointer, by keyboard, and for whoever asked for less motion. */

const shot = (code: string) => `/p/${PRODUCTION}/shots/${code}`
/** A 14 m mast on twos, one drawing skipped. */
const MAST = shot('BRK-110')
/** A bollard on ones, its eighth drawing misplaced. */
const BOLLARD = shot('BRK-020')
let server: TestServer
let supervisor: Client

beforeAll(async () => {
  server = await startServer()
  supervisor = await as(server.url, 'supervisor')
})
afterAll(async () => {
  await server.stop()
})

async function open(path: string, reducedMotion: 'reduce' | 'no-preference' = 'reduce', colorScheme: 'light' | 'dark' = 'light'): Promise<Page> {
  const { page } = await openPage({ url: server.url, as: supervisor, path, reducedMotion, colorScheme })
  await page.waitForLoadState('networkidle')
  return page
}
const opener = (page: Page) => page.getByRole('button', { name: 'Play it beside the law' })
const deck = (page: Page) => page.getByRole('group', { name: 'Play' })
const scrubber = (page: Page) => page.getByRole('slider', { name: 'Frame of the motion' })
const pose = (page: Page, whose: 'posted' | 'ruled') => page.locator(`[data-test="${whose}-pose"]`).getAttribute('d')
const cursorOf = (page: Page, drawing: string) => page.getByRole('slider', { name: `${drawing}, frame by frame` }).getAttribute('aria-valuenow')
const button = (page: Page, name: 'Play' | 'Stop') => deck(page).getByRole('button', { name, exact: true })

describe('Play on a take', () => {
  it('is loaded when it is opened, runs by itself, and stops when less motion is asked for', async () => {
    const page = await open(MAST, 'no-preference')
    await counts(deck(page), 0)
    const brought: string[] = []
    page.on('response', (response) => response.url().endsWith('.js') && brought.push(response.url()))
    await opener(page).click()
    await visible(button(page, 'Stop'))
    expect(brought.length).toBeGreaterThan(0)
    const before = await pose(page, 'posted')
    await expect.poll(() => pose(page, 'posted'), { timeout: 10_000 }).not.toBe(before)

    await page.emulateMedia({ reducedMotion: 'reduce' })
    await visible(button(page, 'Play'))
    const still = await pose(page, 'posted')
    await page.waitForTimeout(500)
    expect(await pose(page, 'posted')).toBe(still)
    await button(page, 'Play').click()
    await expect.poll(() => pose(page, 'posted'), { timeout: 10_000 }).not.toBe(still)
  })

  it('waits under reduced motion at the frame of the cursor; keys walk it, and the drawings follow', async () => {
    const page = await open(MAST)
    const first = Number(await scrubberAfterOpening(page))
    await page.waitForTimeout(300)
    expect(await cursorOf(page, 'Strip')).toBe(String(first))
    await scrubber(page).focus()
    await page.keyboard.press('Home')
    await expect.poll(() => cursorOf(page, 'Strip')).toBe('1')
    const [posted, ruled] = [await pose(page, 'posted'), await pose(page, 'ruled')]
    // On twos: the second frame still shows the first drawing, on both sides.
    await page.keyboard.press('ArrowRight')
    await shows(deck(page).locator('[data-test="now"]'), /frame 2 /)
    expect([await pose(page, 'posted'), await pose(page, 'ruled')]).toEqual([posted, ruled])
    await page.keyboard.press('End')
    await expect.poll(() => pose(page, 'posted')).not.toBe(posted)
    expect(await pose(page, 'ruled')).not.toBe(ruled)
    expect(await scrubber(page).getAttribute('aria-valuetext')).toMatch(/^frame \d+ of \d+, [\d.]+ seconds: posted [\d.]+°, ruled [\d.]+°$/)
    await page.keyboard.press('Space')
    await visible(button(page, 'Stop'))
    await page.keyboard.press('Space')
    await visible(button(page, 'Play'))
  })

  it('goes where a finding points, and stops there', async () => {
    const page = await open(MAST, 'no-preference')
    await opener(page).click()
    await visible(button(page, 'Stop'))
    const finding = page.getByRole('button', { name: /^Go to frame \d+$/ }).first()
    const frame = /\d+/.exec(await finding.innerText())![0]
    await finding.click()
    await visible(button(page, 'Play'))
    await shows(deck(page).locator('[data-test="now"]'), `frame ${frame} `)
    await opener(page).or(page.getByRole('button', { name: 'Put Play away' })).click()
    await counts(deck(page), 0)
  })

  it.each(['light', 'dark'] as const)('has no axe violation when it is open (%s)', async (theme) => {
    const page = await open(BOLLARD, 'reduce', theme)
    await opener(page).click()
    await visible(button(page, 'Play'))
    const { violations } = await new AxeBuilder({ page }).withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice']).analyze()
    expect(violations.map(({ id, nodes }) => `${id}: ${nodes.map(({ target }) => target.join(' ')).join('; ')}`)).toEqual([])
  })

  async function scrubberAfterOpening(page: Page): Promise<string> {
    await opener(page).focus()
    await page.keyboard.press('Enter')
    await visible(button(page, 'Play'))
    const at = await scrubber(page).inputValue()
    return String(Number(at) + 1)
  }
})

describe('a broken drawing', () => {
  const STRAY = /Frame 8: posted [\d.]+.px, should sit at [\d.]+.px, [\d.]+.px past, [\d.]+ frames? early/

  it.each(['Strip', 'Curve', 'Gaps'])('says on the %s where it should sit, under the pointer and under the focus', async (name) => {
    const page = await open(BOLLARD)
    const drawing = page.getByRole('figure').filter({ has: page.getByRole('slider', { name: `${name}, frame by frame` }) })
    const surface = drawing.getByRole('slider')
    await surface.focus()
    await page.keyboard.press('Home')
    await counts(drawing.locator('[data-test="stray"]'), 0)
    for (let i = 0; i < 7; i++) await page.keyboard.press('ArrowRight')
    await shows(drawing.locator('[data-test="stray"]'), STRAY)
    expect(await surface.getAttribute('aria-valuetext')).toMatch(STRAY)
    await page.keyboard.press('Home')
    await page.getByRole('heading', { level: 1 }).click()
    const at = await spotOf(surface, 7 / 13)
    await page.mouse.move(at.x, at.y)
    if (name === 'Strip') await sweepTo(page, surface, drawing.locator('[data-test="stray"]'))
    await shows(drawing.locator('[data-test="stray"]'), STRAY)
  })

  it('says it over the table too, and the heading stays in sight of a long list', async () => {
    const page = await open(BOLLARD)
    const table = page.getByRole('table', { name: /^Keys/ })
    await table.getByRole('row', { name: /^8 / }).hover()
    await shows(page.locator('p [data-test="stray"]'), STRAY)
    await table.getByRole('button', { name: '8', exact: true }).focus()
    await shows(page.locator('p [data-test="stray"]'), STRAY)
  })

  /** Where a share of the frames lies on the curve and the gaps. */
  async function spotOf(surface: Locator, share: number) {
    await surface.scrollIntoViewIfNeeded()
    const box = (await surface.boundingBox())!
    return { x: box.x + 46 + (box.width - 60) * share, y: box.y + box.height / 2 }
  }
  /** On the strip drawings lie where their readings are: the pointer is moved along until the broken one is under it. */
  async function sweepTo(page: Page, surface: Locator, said: Locator) {
    const box = (await surface.boundingBox())!
    for (let x = 0; x < box.width && (await said.count()) === 0; x += 6) await page.mouse.move(box.x + x, box.y + box.height / 2)
  }
})
