import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import type { Locator, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { openPage } from '../helpers/browser'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'
import type { LettersAnswer } from '~/utils/contracts/letter'
import { counts, shows, visible } from './seen'
import { as, asColumns, hangTower, PRODUCTION, tippingList } from './tower'

/** The day of product.md, in three windows at once, with the mail at its end. */

const CODE = 'CLK-115'
const SHOT = `/p/${PRODUCTION}/shots/${CODE}`
let server: TestServer

beforeAll(async () => {
  server = await startServer()
  await hangTower(server.url, CODE)
})
afterAll(async () => {
  await server.stop()
})

const stamp = (page: Page | Locator, word: string) => page.locator('.stamp', { hasText: new RegExp(`^${word}$`, 'i') })
const sheetOnWall = (page: Page) => page.getByRole('article', { name: CODE })

describe('a day on the clock tower', () => {
  it('goes from the first list to the stamp that stands, and to everybody’s mail', async () => {
    const { url } = server
    const [animator, supervisor, coordinator, keeper] = await Promise.all([as(url, 'animator'), as(url, 'supervisor'), as(url, 'coordinator'), as(url, 'keeper')])
    const desk = await openPage({ url: server.url, path: SHOT, as: animator })
    const office = await openPage({ url: server.url, path: `/p/${PRODUCTION}?words=${CODE}`, as: supervisor })
    const wall = await openPage({ url: server.url, path: `/p/${PRODUCTION}?words=${CODE}`, as: coordinator })
    await shows(sheetOnWall(office.page), 'not started')

    // The animator posts 45-odd drawings on twos, timed for an 8 m tower, one of them off its place.
    const toy = tippingList(8)
    const offAt = toy.find(({ frame }) => frame === 61)!
    const posted = toy.map((key) => (key === offAt ? { ...key, reading: Math.round((key.reading + 2) * 10) / 10 } : key))
    await desk.page.getByRole('link', { name: 'Post take 1' }).first().click()
    await desk.page.waitForURL(/\/post$/)
    await desk.page.getByRole('button', { name: 'Paste from a sheet…' }).click()
    await desk.page.getByLabel('Two columns').fill(asColumns(posted))
    await desk.page.getByRole('button', { name: `Use these ${posted.length} keys` }).click()
    const answer = desk.page.getByRole('region', { name: 'The judge’s answer' })
    await shows(answer, 'Breaks')
    await shows(answer, /reads as (7\.9\d*|8(\.\d+)?) m/i)
    await shows(answer, '61')
    await desk.page.getByRole('button', { name: 'Post take 1' }).click()
    await desk.page.waitForURL((address) => address.pathname === SHOT)
    await shows(desk.page.getByRole('article', { name: 'Take 1' }), `${posted.length} drawings, on twos`)

    // The supervisor's wall moves by itself; the supervisor opens the sheet.
    await shows(sheetOnWall(office.page), 'supervisor’s desk')
    await shows(sheetOnWall(wall.page), 'supervisor’s desk')
    await sheetOnWall(office.page).getByRole('link', { name: CODE }).click()
    await office.page.waitForURL((address) => address.pathname === SHOT)
    await visible(office.page.getByText('looking now'))

    // A flag from the finding on frame 61, and a question in the margin at that frame.
    const finding = office.page.getByRole('article', { name: 'Take 1' }).getByRole('listitem').filter({ hasText: 'Frame 61' }).filter({ has: office.page.getByRole('button', { name: 'Flag' }) })
    await finding.getByRole('button', { name: 'Flag' }).click()
    await office.page.getByRole('button', { name: 'Flag it' }).click()
    await shows(office.page.getByRole('region', { name: 'Flags' }), 'Frame 61')
    await finding.getByRole('button', { name: 'Go to frame 61' }).click()
    await office.page.getByLabel('Start a thread').fill('Is the jump at 61 the bell breaking loose, or a *slip*?')
    await office.page.getByRole('button', { name: 'Start the thread' }).click()

    // The animator sees it without a reload, and answers; the supervisor sees the answer.
    const threadAtDesk = desk.page.getByRole('article', { name: 'Thread, frame 61' })
    await shows(threadAtDesk, 'breaking loose, or a slip?')
    await threadAtDesk.getByLabel('Answer on frame 61').fill('Slip. The in-between was traced from the old chart.')
    await threadAtDesk.getByRole('button', { name: 'Answer' }).click()
    await shows(office.page.getByRole('article', { name: 'Thread, frame 61' }), 'traced from the old chart')

    // One ruling; the stamp is on both pages and on the wall at once.
    await office.page.getByText('Goes back', { exact: true }).click()
    await office.page.getByLabel('Note on take 1').fill('Give it the time its size needs. Redo 61.')
    await office.page.getByRole('button', { name: 'Rule, and send the letters' }).click()
    for (const window of [office, desk]) await visible(stamp(window.page.getByRole('article', { name: 'Take 1' }), 'Goes back'))
    await visible(stamp(wall.page, 'Goes back'))
    await shows(sheetOnWall(wall.page), 'animator’s desk')

    // Letters: the animator and the coordinator, once each, and nobody who ruled; with the frame and a link to it.
    const letters = await settledLetters(keeper, 2)
    expect(letters.map(({ to }) => to).sort()).toEqual(['animator@quayside.example', 'coordinator@quayside.example'])
    const files = readdirSync(join(server.dataDir, 'mail')).map((name) => readFileSync(join(server.dataDir, 'mail', name), 'utf8'))
    const toAnimator = files.filter((text) => text.includes(CODE) && /^To:.*animator@quayside\.example/im.test(text))
    expect(toAnimator).toHaveLength(1)
    expect(toAnimator[0]!.replace(/=\r?\n/g, '').replace(/=3D/g, '=')).toContain(`${SHOT}?take=1&frame=61`)
    const mailRoom = await openPage({ url: server.url, path: '/mail-room', as: keeper })
    await counts(mailRoom.page.getByRole('listitem').filter({ hasText: CODE }), 2)

    // Take 2 starts from the ruled list for the claimed size. It stands.
    await desk.page.getByRole('link', { name: 'Post take 2' }).click()
    await desk.page.waitForURL(/\/post$/)
    const starts = desk.page.getByRole('button', { name: /claim|38 m/i })
    await starts.first().click()
    await shows(desk.page.getByRole('region', { name: 'The judge’s answer' }), 'Holds')
    await desk.page.getByRole('button', { name: 'Post take 2' }).click()
    const second = office.page.getByRole('navigation', { name: 'Takes' }).getByRole('link', { name: 'Take 2' })
    await visible(second)
    await second.click()
    await office.page.getByText('Stands', { exact: true }).click()
    await office.page.getByRole('button', { name: 'Rule, and send the letters' }).click()
    await visible(stamp(wall.page, 'Stands'))
    await shows(sheetOnWall(wall.page), 'settled')
  })
})

/** The letters about the shot, once the mail worker has sent them. */
async function settledLetters(keeper: Awaited<ReturnType<typeof as>>, count: number) {
  const deadline = Date.now() + 20_000
  for (;;) {
    const { body } = await keeper.get<LettersAnswer>('/api/letters?state=sent')
    const own = body.letters.filter(({ subject }) => subject.includes(CODE))
    if (own.length >= count || Date.now() > deadline) return own
    await new Promise((resolve) => setTimeout(resolve, 200))
  }
}
