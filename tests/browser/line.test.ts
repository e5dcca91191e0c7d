import { beforeAll, expect, it } from 'vitest'
import type { Page } from 'playwright-core'
import type { ShotPage } from '~/utils/contracts/take'
import type { Wall } from '~/utils/contracts/production'
import { openPage } from '../helpers/browser'
import { signInDemo } from '../helpers/client'
import type { Client } from '../helpers/client'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'

/** The line between pages and server: what comes without a reload, what outlives a broken line, and what ends at once. */
let server: TestServer
let animator: Client
let supervisor: Client
let production: string
let shot: ShotPage
let path: string

beforeAll(async () => {
  server = await startServer()
  animator = await signInDemo(server.url, 'animator')
  supervisor = await signInDemo(server.url, 'supervisor')
  production = animator.me!.memberships[0]!.production
  const { body: wall } = await animator.get<Wall>(`/api/productions/${production}/wall`)
  const talked = wall.sheets.find(({ openThreads }) => openThreads > 0)!
  path = `/p/${production}/shots/${talked.code}`
  shot = (await animator.get<ShotPage>(`/api/productions/${production}/shots/${talked.code}`)).body
})

const onPage = (page: Page, text: string) => page.getByRole('listitem').filter({ hasText: text })
async function answer(page: Page, text: string) {
  const field = page.getByRole('textbox', { name: /^Answer on/ }).first()
  await field.fill(text)
  await field.press('Control+Enter')
}
/** How often the server holds a comment with this text. */
async function held(text: string): Promise<number> {
  const { body } = await supervisor.get<ShotPage>(`/api/productions/${production}/shots/${shot.code}`)
  return body.threads.flatMap(({ comments }) => comments).filter((comment) => comment.body === text).length
}
const becomesLive = (page: Page) =>
  page.waitForFunction(() => performance.getEntriesByType('resource').some(({ name }) => name.includes('/events?after=')))

it('shows a comment, and who is looking, without a reload', async () => {
  const { page } = await openPage({ url: server.url, path, as: animator })
  const other = await openPage({ url: server.url, path, as: supervisor })
  const name = supervisor.me!.name
  const looking = page.getByText('looking now').getByRole('img', { name })
  await looking.waitFor()
  await answer(other.page, 'Two frames more before it goes.')
  await onPage(page, 'Two frames more before it goes.').waitFor()
  await other.close()
  await looking.waitFor({ state: 'detached' })
})

it('keeps what is written while the server is down, says so, and sends it once when it is back', async () => {
  const { page } = await openPage({ url: server.url, as: animator, expected: [/./] })
  await page.goto(path)
  await becomesLive(page)
  await server.kill('SIGKILL')
  await page.getByText('Offline.').waitFor({ timeout: 20_000 })
  await answer(page, 'Written on a dead line.')
  await onPage(page, 'Written on a dead line.').waitFor()
  await server.restart()
  await page.getByText('Offline.').waitFor({ state: 'detached', timeout: 30_000 })
  await expect.poll(() => held('Written on a dead line.'), { timeout: 40_000 }).toBe(1)
  await expect.poll(() => onPage(page, 'Written on a dead line.').count()).toBe(1)
})

it('sends after a reload what could not be sent before, under the same id', async () => {
  const { page, context } = await openPage({ url: server.url, path, as: animator, expected: [/\/comments$/] })
  const ids: string[] = []
  page.on('request', (request) => {
    if (request.method() === 'POST' && request.url().endsWith('/comments')) ids.push((request.postDataJSON() as { clientId: string }).clientId)
  })
  await becomesLive(page)
  // It arrives, and the answer gets lost.
  await context.route('**/comments', async (route) => {
    await route.fetch()
    await route.abort()
  })
  await answer(page, 'Sent into the fog.')
  await expect.poll(() => held('Sent into the fog.')).toBe(1)
  // One that does not even arrive.
  await context.unroute('**/comments')
  await context.route('**/comments', (route) => route.abort())
  await answer(page, 'Never left the house.')
  await expect.poll(() => ids.length).toBeGreaterThan(1)
  await context.unroute('**/comments')
  await page.reload()
  await expect.poll(() => held('Never left the house.'), { timeout: 10_000 }).toBe(1)
  expect(await held('Sent into the fog.')).toBe(1)
  await expect.poll(() => onPage(page, 'Never left the house.').count()).toBe(1)
  expect(await onPage(page, 'Sent into the fog.').count()).toBe(1)
  expect(new Set(ids).size).toBe(2)
})

it('shows the sign-in page as soon as the session has ended elsewhere', async () => {
  const person = await signInDemo(server.url, 'guest')
  const { page } = await openPage({ url: server.url, path, as: person, expected: [/./] })
  await becomesLive(page)
  expect((await person.delete('/api/session')).status).toBe(200)
  await page.waitForURL(/\/sign-in\?to=/)
})

it('leaves the production as soon as the membership is over', async () => {
  const guest = await signInDemo(server.url, 'guest')
  const { page } = await openPage({ url: server.url, path, as: guest, expected: [/./] })
  await becomesLive(page)
  expect((await supervisor.delete(`/api/productions/${production}/members/${guest.me!.id}`)).status).toBeLessThan(300)
  await page.waitForURL((address) => !address.pathname.startsWith(`/p/${production}`))
  await page.getByText('You are no longer on that production').waitFor()
})

it('takes a shot’s code in small letters, and puts the address right', async () => {
  const { page } = await openPage({ url: server.url, path: path.toLowerCase(), as: animator })
  await page.waitForURL((address) => address.pathname === path)
})
