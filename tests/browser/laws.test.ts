import AxeBuilder from '@axe-core/playwright'
import type { Page } from 'playwright-core'
import { v7 as uuid } from 'uuid'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { openPage } from '../helpers/browser'
import type { Client } from '../helpers/client'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'
import { swung } from '../bench/lists/motion'
import { counts, shows, visible } from './seen'
import { as, PRODUCTION } from './tower'
import type { Claim, Production } from '~/utils/contracts/production'
import type { Key, PointKey } from '~/utils/motion/types'

/** A take of points and a take under several laws: drawn, told, walked through and ruled on like any other. */

const BOB = 'CLK-201'
const THROW = 'CLK-202'
const shot = (code: string) => `/p/${PRODUCTION}/shots/${code}`
let server: TestServer
let supervisor: Client

beforeAll(async () => {
  server = await startServer()
  supervisor = await as(server.url, 'supervisor')
  await hang(BOB, bobClaim, bobPoints())
  await hang(THROW, throwClaim, thrown())
})
afterAll(async () => {
  await server.stop()
})

const bobClaim: Claim = { law: 'pendulum', measure: 'point', unit: 'px', slop: 1, tolerance: 0.1, yAxis: 'down', subject: { shape: 'bob', length: 2 } }
/** A bob on 2 m, drawn at 150 px to the metre about (640, 80), let go at 35°; its tenth drawing sits 16 px outside the arc. */
function bobPoints(): PointKey[] {
  const angles = swung(-1, 9.80665 / 2, (35 * Math.PI) / 180, 0, 24, 60)
  return Array.from({ length: 24 }, (_, i) => {
    const [angle, radius] = [angles[i * 2]!, i === 9 ? 316 : 300]
    return { frame: 1 + i * 2, x: Math.round(2 * (640 + radius * Math.sin(angle))) / 2, y: Math.round(2 * (80 + radius * Math.cos(angle))) / 2 }
  })
}

const throwClaim: Claim = {
  law: 'odd-rule', measure: 'distance', unit: 'px', slop: 1, tolerance: 0.1,
  spans: [{ from: 1, to: 15, law: 'odd-rule' }, { from: 15, to: 29, law: 'steady' }],
}
/** Falls at 1.2 px a frame squared for 14 frames (16.8 px a frame by then), and goes on at 10: the speed does not carry over. */
const thrown = (): Key[] =>
  Array.from({ length: 29 }, (_, i) => ({ frame: 1 + i, reading: Math.round(2 * (i <= 14 ? 0.6 * i * i : 117.6 + 10 * (i - 14))) / 2 }))

async function hang(code: string, claim: Claim, keys: Key[] | PointKey[]): Promise<void> {
  const [coordinator, animator] = [await as(server.url, 'coordinator'), await as(server.url, 'animator')]
  const { body: production } = await coordinator.get<Production>(`/api/productions/${PRODUCTION}`)
  const shots = `/api/productions/${PRODUCTION}/shots`
  const made = await coordinator.post(shots, {
    clientId: uuid(), code, title: 'More than one law', sequence: production.sequences[0]!.code, firstFrame: 1, lastFrame: 24, fps: 24,
    brief: '', dueOn: null, animator: animator.me?.id, supervisor: supervisor.me?.id,
  })
  expect(made.status).toBe(201)
  expect((await supervisor.put(`${shots}/${code}/claim`, { claim, version: (made.body as { version: number }).version })).status).toBe(200)
  expect((await animator.post(`${shots}/${code}/takes`, { clientId: uuid(), keys, note: '' })).status).toBe(201)
}
async function open(code: string, colorScheme: 'light' | 'dark' = 'light'): Promise<Page> {
  const { page } = await openPage({ url: server.url, as: supervisor, path: shot(code), reducedMotion: 'reduce', colorScheme })
  await page.waitForLoadState('networkidle')
  return page
}
const take = (page: Page) => page.getByRole('article', { name: 'Take 1' })
const cursorOf = (page: Page) => page.getByRole('slider', { name: 'Strip, frame by frame' }).getAttribute('aria-valuenow')

describe('a take of points', () => {
  it('draws the path of action, says which drawing has left it, and goes there', async () => {
    const page = await open(BOB)
    await shows(take(page).getByRole('heading', { level: 2 }), /Breaks\. Frame 19 sits 1[56](\.\d)?.px off the arc/)
    await visible(page.getByText('posted as dots where they are drawn, the law as ticks across the path'))
    await page.getByRole('button', { name: 'Go to frame 19' }).click()
    await expect.poll(() => cursorOf(page)).toBe('19')
    expect(await page.getByRole('slider', { name: 'Strip, frame by frame' }).getAttribute('aria-valuetext')).toMatch(/^Frame 19: 1[56]\.\d.px off the path$/)
    const table = page.getByRole('table', { name: /^Keys/ })
    for (const head of ['x px', 'y px', 'posted °', 'off the path px']) await visible(table.getByRole('columnheader', { name: head, exact: true }))
    await shows(table.getByRole('row', { name: /^19 / }), 'off the path')
    await visible(page.getByText('The list runs 23 frames past the shot’s last, 24.'))
  })

  it('plays the point on its path, and is drawn on the wall', async () => {
    const page = await open(BOB)
    await page.getByRole('button', { name: 'Play it beside the law' }).click()
    const posted = page.locator('[data-test="posted-pose"]')
    await posted.waitFor({ state: 'attached' })
    const before = await posted.getAttribute('d')
    await page.getByRole('slider', { name: 'Frame of the motion' }).focus()
    await page.keyboard.press('End')
    await expect.poll(() => posted.getAttribute('d')).not.toBe(before)
    await page.goto(`/p/${PRODUCTION}?words=${BOB}`)
    await visible(page.getByRole('img', { name: /Frame 19 sits/ }))
  })
})

describe('a take under several laws', () => {
  it('tells span by span, and that the speed does not carry over', async () => {
    const page = await open(THROW)
    const spans = page.getByRole('list', { name: 'Spans' })
    await counts(spans.getByRole('listitem'), 2)
    await shows(spans.getByRole('listitem').first(), /1–15\s+odd rule\sholds/i)
    await shows(spans.getByRole('listitem').first(), /does not carry over: 1[67]\.\d px a frame before, (9\.\d|10\.\d) after/)
    await spans.getByRole('button', { name: 'Go to frame 15', exact: true }).click()
    await expect.poll(() => cursorOf(page)).toBe('15')
    await shows(page.getByRole('table', { name: /^Keys/ }).getByRole('row', { name: /^15 / }), '¦ joint · ✕ broken joint')
  })

  it('turns the finding into a flag with one action', async () => {
    const page = await open(THROW)
    const finding = take(page).getByRole('listitem').filter({ has: page.getByRole('button', { name: 'Flag' }) }).first()
    await finding.getByRole('button', { name: 'Flag' }).click()
    const dialog = page.getByRole('dialog')
    await expect.poll(() => dialog.getByLabel('From frame').inputValue()).toBe('15')
    await dialog.getByRole('button', { name: 'Flag it' }).click()
    await shows(page.getByRole('complementary', { name: 'Ruling, flags and threads' }), /Frame 15\s/)
  })
})

it.each([[BOB, 'light'], [BOB, 'dark'], [THROW, 'light'], [THROW, 'dark']] as const)('%s has no axe violation (%s)', async (code, theme) => {
  const page = await open(code, theme)
  await page.getByRole('button', { name: 'Play it beside the law' }).click()
  await page.locator('[data-test="posted-pose"]').waitFor({ state: 'attached' })
  const { violations } = await new AxeBuilder({ page }).withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice']).analyze()
  expect(violations.map(({ id, nodes }) => `${id}: ${nodes.map(({ target }) => target.join(' ')).join('; ')}`)).toEqual([])
  const over = await page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth)
  expect(over).toBeLessThanOrEqual(0)
})
