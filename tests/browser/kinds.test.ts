import { v7 as uuid } from 'uuid'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Claim } from '~/utils/contracts/production'
import type { ShotFacts, ShotPage } from '~/utils/contracts/take'
import { openPage } from '../helpers/browser'
import type { Client } from '../helpers/client'
import { carriedList, carriedSpans, flightPoints } from '../helpers/kinds'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'
import { shows, visible } from './seen'
import { as, asColumns, PRODUCTION } from './tower'

/** Claims of several laws and of points, from the claim form to the posted take. */

let server: TestServer
let animator: Client
let supervisor: Client

beforeAll(async () => {
  server = await startServer()
  ;[animator, supervisor] = [await as(server.url, 'animator'), await as(server.url, 'supervisor')]
})
afterAll(async () => {
  await server.stop()
})

const api = (code: string) => `/api/productions/${PRODUCTION}/shots/${code}`
const home = (code: string) => `/p/${PRODUCTION}/shots/${code}`
/** A shot of the demo's animator; unclaimed where no claim is given. */
async function hang(code: string, claim: Claim | null = null): Promise<void> {
  const coordinator = await as(server.url, 'coordinator')
  const made = await coordinator.post<ShotFacts>(`/api/productions/${PRODUCTION}/shots`, {
    clientId: uuid(), code, title: 'A cart is pushed along the quay', sequence: 'CLK', firstFrame: 1001, lastFrame: 1031, fps: 24,
    animator: animator.me?.id, supervisor: supervisor.me?.id,
  })
  expect(made.status).toBe(201)
  if (claim) expect((await supervisor.put(`${api(code)}/claim`, { claim, version: made.body.version })).status).toBe(200)
}
const open = async (who: Client, path: string) => {
  const { page } = await openPage({ url: server.url, as: who, path, reducedMotion: 'reduce' })
  await page.waitForLoadState('networkidle')
  return page
}
const claimOf = async (code: string) => (await animator.get<ShotPage>(api(code))).body.claim
const cart = { law: 'odd-rule', measure: 'distance', unit: 'px', slop: 1, tolerance: 0.1 } as const satisfies Claim
const pointColumns = ['frame\tx\ty', ...flightPoints.map(({ frame, x, y }) => `${frame}\t${x}\t${y}`)].join('\n')

describe('several laws, one after the other', () => {
  it('are claimed by keyboard: a joint that is moved moves for both of its laws', async () => {
    await hang('CLK-301')
    const page = await open(supervisor, `${home('CLK-301')}/claim`)
    await page.getByRole('radio', { name: /^odd rule/i }).press('Space')
    await page.getByLabel('The motion starts from rest').check()
    await page.getByRole('radio', { name: 'Several laws, one after the other' }).focus()
    await page.keyboard.press('Space')
    const row = (i: number) => page.getByRole('listitem', { name: `Law ${i}` })
    await visible(row(2))
    const to = row(1).getByLabel('To frame (joint)')
    expect(await to.inputValue()).toBe('1016')
    await to.fill('1009')
    await shows(row(2), /From frame\s+1009/)
    await page.getByRole('button', { name: 'Add a law at the end' }).focus()
    await page.keyboard.press('Enter')
    // The new row has the focus on its law.
    await expect.poll(() => row(3).getByLabel('Law', { exact: true }).evaluate((field) => field === document.activeElement)).toBe(true)
    await row(3).getByLabel('Law', { exact: true }).selectOption('slow-in')
    await row(2).getByLabel('To frame (joint)').fill('soon')
    await page.getByRole('button', { name: 'Set the claim' }).click()
    await visible(row(2).getByText('This is not a number.'))
    await row(2).getByLabel('To frame (joint)').fill('1021')
    await page.getByRole('button', { name: 'Set the claim' }).click()
    await page.waitForURL(new RegExp(`${home('CLK-301')}/post$`))
    expect((await claimOf('CLK-301'))?.spans).toEqual(carriedSpans)
    await visible(page.getByText('The laws meet at frames 1009 and 1021: the list needs a drawing there.'))
    await shows(page.locator('dl').first(), 'slow out · steady · slow in, joints at 1009 and 1021')
  })

  it('are found in the list of the newest take, and told', async () => {
    await hang('CLK-305', cart)
    expect((await animator.post(`${api('CLK-305')}/takes`, { clientId: uuid(), keys: carriedList })).status).toBe(201)
    const page = await open(supervisor, `${home('CLK-305')}/claim`)
    await page.getByRole('radio', { name: 'Several laws, one after the other' }).press('Space')
    const find = page.getByRole('button', { name: 'Find the joints for me' })
    await find.focus()
    await page.keyboard.press('Enter')
    await shows(page.getByRole('status').filter({ hasText: 'reads as' }), /Take 1 reads as (?:odd rule|slow out) · steady · slow in, joints at 1009 and 1021\./)
    await page.getByRole('button', { name: 'Change the claim' }).click()
    await page.waitForURL((address) => address.pathname === home('CLK-305'))
    expect((await claimOf('CLK-305'))?.spans).toMatchObject(carriedSpans.map(({ from, to, law }) => ({ from, to, law })))
  })

  it('are judged while the list is typed, and want their joints before it is posted', async () => {
    await hang('CLK-302', { ...cart, spans: carriedSpans.map((span) => ({ ...span })) })
    const page = await open(animator, `${home('CLK-302')}/post`)
    const paste = async (text: string) => {
      await page.getByRole('button', { name: /^Paste/ }).first().click()
      await page.getByLabel('Two columns').fill(text)
      await page.getByRole('button', { name: /^Use these/ }).click()
    }
    await paste(asColumns(carriedList.filter(({ frame }) => frame !== 1021)))
    await page.getByRole('button', { name: 'Post take 1' }).click()
    await visible(page.getByText(/laws meet at frame 1021: the list needs a drawing there/).last())
    await paste(asColumns(carriedList))
    await shows(page.getByLabel('The judge’s answer'), /Holds/)
    await visible(page.getByRole('textbox', { name: 'frame, drawing 9, a joint' }))
    await page.getByRole('button', { name: 'Post take 1' }).click()
    await page.waitForURL((address) => address.pathname === home('CLK-302'))
    expect((await animator.get<ShotPage>(api('CLK-302'))).body.take?.answer.spans?.map(({ verdict }) => verdict)).toEqual(['holds', 'holds', 'holds'])
  })
})

describe('points on the drawing', () => {
  it('are claimed with what makes sense of them', async () => {
    await hang('CLK-303')
    const page = await open(supervisor, `${home('CLK-303')}/claim`)
    await page.getByRole('radio', { name: /^pendulum/i }).press('Space')
    await page.getByLabel('Readings are').selectOption('point')
    await page.getByLabel('Pivot x').fill('500')
    expect(await page.getByLabel('The points run along').count()).toBe(0)
    await page.getByRole('radio', { name: /^flight/i }).press('Space')
    expect(await page.getByLabel('Pivot x').count()).toBe(0)
    expect(await page.getByLabel('The motion starts from rest').count()).toBe(0)
    await page.getByLabel('y counts').selectOption('up')
    await page.getByRole('button', { name: 'Set the claim' }).click()
    await page.waitForURL(new RegExp(`${home('CLK-303')}/post$`))
    expect(await claimOf('CLK-303')).toMatchObject({ law: 'flight', measure: 'point', yAxis: 'up' })
    expect(await claimOf('CLK-303')).not.toHaveProperty('pivot')
  })

  it('are pasted, kept over a reload, corrected by keyboard, judged and posted', async () => {
    await hang('CLK-304', { law: 'flight', measure: 'point', unit: 'px', slop: 1, tolerance: 0.1 })
    const page = await open(animator, `${home('CLK-304')}/post`)
    await page.getByRole('button', { name: 'Paste from a sheet…' }).click()
    await page.getByLabel('Three columns').fill(pointColumns.replace(String(flightPoints[6]!.y), '900'))
    await page.getByRole('button', { name: `Use these ${flightPoints.length} keys` }).click()
    const answer = page.getByLabel('The judge’s answer')
    await shows(answer, /Breaks/)
    // The draft is kept a moment after the last stroke.
    await expect.poll(() => page.evaluate(() => Object.entries(localStorage).some(([key, text]) => key.startsWith('tiltyard:take:') && text.includes('"y":"900"')))).toBe(true)
    await page.reload()
    await page.waitForLoadState('networkidle')
    const cell = page.getByRole('textbox', { name: 'y, drawing 7' })
    await expect.poll(() => cell.inputValue()).toBe('900')
    const from = page.getByRole('textbox', { name: 'x, drawing 7' })
    await from.focus()
    // The caret stands at the end of the figure: the next step to the right is the next cell.
    await from.evaluate((field) => (field as HTMLInputElement).setSelectionRange((field as HTMLInputElement).value.length, (field as HTMLInputElement).value.length))
    await page.keyboard.press('ArrowRight')
    await expect.poll(() => cell.evaluate((field) => field === document.activeElement)).toBe(true)
    await page.keyboard.press('Control+A')
    await page.keyboard.type(String(flightPoints[6]!.y))
    await shows(answer, /Holds/)
    await page.getByRole('button', { name: 'Post take 1' }).click()
    await page.waitForURL((address) => address.pathname === home('CLK-304'))
    const { take } = (await animator.get<ShotPage>(api('CLK-304'))).body
    expect(take?.answer.keys.map(({ frame, point }) => ({ frame, ...point }))).toEqual(flightPoints)

    // The next take may start from the law's own points.
    await page.goto(`${home('CLK-304')}/post`)
    await page.waitForLoadState('networkidle')
    await page.getByRole('button', { name: 'From the ruled list of take 1' }).click()
    await shows(page.getByRole('form', { name: 'The list' }), `${flightPoints.length} keys`)
    await shows(answer, /Holds/)
  })
})
