import type { Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { openPage } from '../helpers/browser'
import { DEMO_PASSWORD } from '../helpers/client'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'
import { shows, visible } from './seen'
import { hangTower, PRODUCTION, tippingList } from './tower'

/** The main flow with no pointer at all: only Tab, arrows, Enter, Space and letters. */

const CODE = 'CLK-116'
const SHOT = `/p/${PRODUCTION}/shots/${CODE}`
let server: TestServer

beforeAll(async () => {
  server = await startServer()
  await hangTower(server.url, CODE)
})
afterAll(async () => {
  await server.stop()
})

const focused = (page: Page) =>
  page.evaluate(() => {
    const at = document.activeElement
    if (!at || at === document.body) return ''
    const labels = 'labels' in at ? [...((at as HTMLInputElement).labels ?? [])].map((label) => label.textContent ?? '') : []
    const labelled = at.getAttribute('aria-labelledby')?.split(' ').map((id) => document.getElementById(id)?.textContent ?? '') ?? []
    return [at.getAttribute('aria-label'), ...labels, ...labelled, at.textContent].filter(Boolean).join(' ').replace(/\s+/g, ' ').trim()
  })

/** Presses Tab until the focus is on what has this name; fails when it never comes, as it would for a person. */
async function tabTo(page: Page, name: RegExp, key = 'Tab'): Promise<void> {
  const seen: string[] = []
  for (let i = 0; i < 150; i++) {
    await page.keyboard.press(key)
    const at = await focused(page)
    if (name.test(at)) {
      const outlined = await page.evaluate(() => {
        const ringed = (element: Element | null) => element !== null && getComputedStyle(element).outlineStyle !== 'none'
        const at = document.activeElement
        return ringed(at) || ringed(at?.closest('label, li, article, .choice, .card, .whole') ?? null) || ringed(at?.closest('.sheet') ?? null)
      })
      expect(outlined, `focus is visible on "${at}"`).toBe(true)
      return
    }
    seen.push(at.slice(0, 40))
  }
  throw new Error(`Tab never reached ${name}. It went: ${seen.slice(-40).join(' | ')}`)
}

async function signInByKeys(page: Page, role: string): Promise<void> {
  await page.goto('/sign-in')
  await page.waitForLoadState('networkidle')
  await tabTo(page, /mail address/i)
  await page.keyboard.type(`${role}@quayside.example`)
  await tabTo(page, /^password/i)
  await page.keyboard.type(DEMO_PASSWORD)
  await page.keyboard.press('Enter')
  await page.waitForURL(/\/p\//)
}

describe('by keyboard alone', () => {
  it('an animator signs in, finds the shot, types a list and posts it; a supervisor rules', async () => {
    const desk = (await openPage({ url: server.url })).page
    await signInByKeys(desk, 'animator')
    await desk.waitForLoadState('networkidle')
    await tabTo(desk, /find by code/i)
    await desk.keyboard.type(CODE)
    await desk.waitForURL(/words=/)
    await tabTo(desk, new RegExp(`^${CODE}`))
    await desk.keyboard.press('Enter')
    await desk.waitForURL((address) => address.pathname === SHOT)
    await tabTo(desk, /^Post take 1/)
    await desk.keyboard.press('Enter')
    await desk.waitForURL(/\/post$/)

    // Every fourth drawing of a true 38 m tower, typed cell by cell.
    const list = tippingList(38).filter((_, i) => i % 6 === 0)
    await tabTo(desk, /^Type the first key/)
    await desk.keyboard.press('Enter')
    await shows(desk.getByRole('grid'), 'frame')
    for (const [i, { frame, reading }] of list.entries()) {
      if (i > 0) await desk.keyboard.press('Enter')
      await desk.waitForFunction((n) => document.activeElement?.id.startsWith(`cell-${n}-`), i)
      await typeInto(desk, i, 'frame', String(frame))
      await typeInto(desk, i, 'reading', String(reading))
    }
    await shows(desk.getByRole('region', { name: 'The judge’s answer' }), 'Holds')
    await desk.keyboard.press('Escape')
    await expect.poll(() => focused(desk)).toMatch(/^Post take 1/)
    await desk.keyboard.press('Enter')
    await desk.waitForURL((address) => address.pathname === SHOT)
    await shows(desk.getByRole('article', { name: 'Take 1' }), `${list.length} drawings`)

    // The cursor walks through the drawings with the arrow keys, and the frame is always said.
    await tabTo(desk, /strip/i)
    await desk.keyboard.press('Home')
    await desk.keyboard.press('ArrowRight')
    await desk.waitForURL(new RegExp(`frame=${list[1]!.frame}\\b`))

    const office = (await openPage({ url: server.url })).page
    await signInByKeys(office, 'supervisor')
    await office.goto(SHOT)
    await office.waitForLoadState('networkidle')
    await tabTo(office, /^Stands/)
    await office.keyboard.press('Space')
    await tabTo(office, /note on take 1/i)
    await office.keyboard.type('Reads as big as it is.')
    await tabTo(office, /^Rule, and send/)
    await office.keyboard.press('Enter')
    await visible(office.getByRole('article', { name: 'Take 1' }).locator('.stamp'))
    await visible(desk.getByRole('article', { name: 'Take 1' }).locator('.stamp'))
  })
})

/** Moves within the row with the arrow keys to the column, and types over what is there. */
async function typeInto(page: Page, row: number, column: 'frame' | 'reading', text: string): Promise<void> {
  const id = `cell-${row}-${column}`
  for (let i = 0; i < 4 && (await page.evaluate(() => document.activeElement?.id)) !== id; i++) {
    await page.keyboard.press(column === 'frame' ? 'ArrowLeft' : 'ArrowRight')
  }
  await expect.poll(() => page.evaluate(() => document.activeElement?.id)).toBe(id)
  await page.keyboard.press('Control+A')
  await page.keyboard.type(text)
}
