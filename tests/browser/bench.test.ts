import type { Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { openPage } from '../helpers/browser'
import type { Client } from '../helpers/client'
import { startServer } from '../helpers/server'
import type { TestServer } from '../helpers/server'
import { counts, shows, visible } from './seen'
import { as, hangTower, PRODUCTION } from './tower'
import type { Claim } from '~/utils/contracts/production'

/** The bench: planned by keyboard, sent as an address, set going, and carried into a take. */

const BENCH = `/p/${PRODUCTION}/bench`
const CODE = 'CLK-117'
let server: TestServer
let animator: Client
let guest: Client

beforeAll(async () => {
  server = await startServer()
  await hangTower(server.url, CODE)
  ;[animator, guest] = [await as(server.url, 'animator'), await as(server.url, 'guest')]
})
afterAll(async () => {
  await server.stop()
})

const said = (page: Page, what: string) => page.locator(`[data-test="${what}"]`)
async function type(page: Page, label: string | RegExp, value: string): Promise<void> {
  const field = page.getByLabel(label)
  await field.focus()
  await page.keyboard.press('Control+A')
  await page.keyboard.type(value)
}
const open = async (as: Client, path: string, reducedMotion: 'reduce' | 'no-preference' = 'reduce') => {
  const window = await openPage({ url: server.url, as, path, reducedMotion })
  await window.page.waitForLoadState('networkidle')
  return window.page
}
const poses = (page: Page) => said(page, 'pose').evaluateAll((paths) => paths.map((path) => path.getAttribute('d')).join(' '))

describe('the bench', () => {
  it('plans by keyboard, and the address opens the same in another window', async () => {
    const page = await open(animator, BENCH)
    await page.getByRole('navigation', { name: 'Places' }).getByRole('link', { name: 'Bench' }).and(page.locator('[aria-current="page"]')).waitFor()
    await type(page, 'Height, m', '1')
    await shows(said(page, 'frames'), '32.8 frames')
    await shows(said(page, 'seconds'), '1.37 s')
    await shows(said(page, 'drawings'), '17 drawings')
    await type(page, 'Height, m', '4')
    await shows(said(page, 'frames'), '65.7 frames')
    await shows(page.getByRole('table', { name: /Spacing list/ }), /\b65\b/)

    // What can't be read is told, and changes nothing.
    await type(page, 'Lean, degrees', 'steep')
    await visible(page.getByText('This is not a number.'))
    await shows(said(page, 'frames'), '65.7 frames')
    await type(page, 'Lean, degrees', '2')
    await shows(said(page, 'frames'), '57.0 frames')

    await page.getByRole('radio', { name: 'Moon' }).focus()
    await page.keyboard.press('Space')
    await shows(said(page, 'frames'), '140.2 frames')
    await type(page, /^Or: frames I have/, '57')
    await shows(said(page, 'reads'), /^0\.66/)
    await type(page, 'The same at, m', '1 16')
    await counts(page.getByRole('table', { name: 'Frames that each size needs' }).locator('tbody tr'), 3)
    await page.waitForURL((address) => address.searchParams.get('beside') === '1,16')
    const address = new URL(page.url())
    expect(Object.fromEntries(address.searchParams)).toEqual({ law: 'topple', body: 'rod', height: '4', lean: '2', gravity: 'moon', have: '57', beside: '1,16' })

    const other = await open(guest, address.pathname + address.search)
    for (const what of ['frames', 'seconds', 'drawings', 'reads']) expect(await said(other, what).innerText()).toBe(await said(page, what).innerText())
    expect(await other.getByRole('table').allInnerTexts()).toEqual(await page.getByRole('table').allInnerTexts())
    await counts(other.getByRole('button', { name: /Start a take/ }), 0)
  })

  it('chooses every law by keyboard, from groups that say what they are', async () => {
    const page = await open(animator, BENCH)
    for (const group of ['Along a path', 'Thrown', 'Turning']) await visible(page.getByRole('group', { name: group }))
    await page.getByRole('radio', { name: 'Topple' }).focus()
    const seen = new Set<string>()
    for (let i = 0; i < 10; i++) {
      await page.keyboard.press('ArrowDown')
      const law = await page.locator('input[name="bench-law"]:checked').inputValue()
      await page.waitForURL((address) => address.searchParams.get('law') === law)
      await visible(page.getByRole('table', { name: /Spacing list/ }))
      await shows(said(page, 'frames'), /^[\d.]+ frames$/)
      seen.add(law)
    }
    expect(seen.size).toBe(10)
  })

  // School formulas, standard gravity: fall √(2h/g), restitution by e; range v²·sin 2α/g; way = ½·v·t; rod over a brink 53.13° (motion sheet).
  it.each([
    ['law=bounce&way=4.903325&back=50&bounces=2&on=1', '48.0 frames', ['Contact 1\nframe 25.0, comes back to 1.23 m', 'Contact 2\nframe 49.0, the last']],
    ['law=flight&speed=9.80665&angle=30&landing=0&on=1', '24.0 frames', ['Apex\nframe 13.0, 1.23 m above the hand', 'Lands\nframe 25.0, 8.49 m away']],
    ['law=slow-in&way=3&seconds=1.5&on=1', '36.0 frames', ['Starts with\n4 m/s', 'Stands\nframe 37.0, after 1.50 s']],
    ['law=spin&rate=2&turns=2.75&on=1', '33.0 frames', ['From drawing to drawing\n30.0°', 'One turn\n12 frames']],
    ['law=over-edge&body=rod&height=1&lean=0.01&brink=5', / frames$/, [/Lets go of the brink\nframe [\d.]+, at 53.1° from balance/, /Touches the ground\nframe [\d.]+, turned to [\d.]+°/]],
    ['law=swing-decay&body=bob&length=1&amplitude=10&swings=2&lost=10', / frames$/, [/Amplitude left\nframe [\d.]+, 8.1°/]],
  ] as const)('%s says what happens when, in another window too', async (query, frames, told) => {
    const page = await open(guest, `${BENCH}?${query}`)
    await shows(said(page, 'frames'), frames as string)
    for (const words of told) await shows(said(page, 'happenings'), words)
    await visible(page.getByText('For drawing only; stunts and rigs are for a licensed engineer and local rules.'))
    const slider = page.getByRole('slider', { name: 'Frame of the motion' })
    const before = await poses(page)
    await slider.focus()
    await page.keyboard.press('End')
    await expect.poll(() => poses(page), { timeout: 10_000 }).not.toBe(before)
    expect(await poses(page)).not.toContain('NaN')
  })

  it('says that a block’s topple is planned until its side meets the ground', async () => {
    const page = await open(guest, `${BENCH}?law=topple&body=block&width=1&height=1&lean=2`)
    await shows(said(page, 'early'), /45\.0° past balance.*The judge counts a topple up to 90°/)
  })

  it('goes the other way round: frames to a range, frames to a rate, and plans at it', async () => {
    const page = await open(animator, `${BENCH}?law=flight&speed=9.80665&angle=30&landing=0&on=1&have=48`)
    // Twice the time: four times the range, twice the speed.
    await shows(said(page, 'reads'), '34 m')
    await page.getByRole('button', { name: 'Plan at that size' }).click()
    await page.waitForURL((address) => address.searchParams.get('speed') === '19.61')
    await page.goto(`${BENCH}?law=spin&rate=2&turns=3&have=72`)
    await page.waitForLoadState('networkidle')
    await shows(said(page, 'reads'), '1 turn/s')
    await page.getByRole('button', { name: 'Plan at that rate' }).click()
    await shows(said(page, 'frames'), '72.0 frames')
  })

  it('an address that nobody can read opens a bench all the same', async () => {
    const page = await open(animator, `${BENCH}?law=gallop&height=tall&fps=-1&on=9`)
    await shows(said(page, 'frames'), '46.4 frames')
  })

  it('moves by itself, stops when less motion is asked for, and goes again when asked', async () => {
    const page = await open(animator, `${BENCH}?law=topple&body=rod&height=4&lean=1&on=1&beside=1`, 'no-preference')
    await visible(page.getByRole('button', { name: 'Stop', exact: true }))
    const before = await poses(page)
    await expect.poll(() => poses(page), { timeout: 10_000 }).not.toBe(before)

    await page.emulateMedia({ reducedMotion: 'reduce' })
    const play = page.getByRole('button', { name: 'Play', exact: true })
    await visible(play)
    const still = await poses(page)
    await page.waitForTimeout(600)
    expect(await poses(page)).toBe(still)

    await play.focus()
    await page.keyboard.press('Space')
    await visible(page.getByRole('button', { name: 'Stop', exact: true }))
    await expect.poll(() => poses(page), { timeout: 10_000 }).not.toBe(still)
  })

  it('waits under reduced motion; Space and arrows go by keyboard', async () => {
    const page = await open(animator, `${BENCH}?law=topple&body=rod&height=1&lean=1&on=2`)
    const slider = page.getByRole('slider', { name: 'Frame of the motion' })
    await page.waitForTimeout(400)
    expect(await slider.inputValue()).toBe('0')
    await slider.focus()
    for (let i = 0; i < 3; i++) await page.keyboard.press('ArrowRight')
    await shows(said(page, 'now'), /frame 4 /)
    expect(await slider.getAttribute('aria-valuetext')).toBe('frame 4 of 34, 0.13 seconds')
    await page.keyboard.press('ArrowLeft')
    await shows(said(page, 'now'), /frame 3 /)
    // The other drawings follow to the drawing that is held.
    await expect.poll(() => page.getByRole('slider', { name: 'Strip, frame by frame' }).getAttribute('aria-valuenow')).toBe('3')
    await page.keyboard.press('End')
    await shows(said(page, 'now'), /frame 34 /)
    await page.keyboard.press('Space')
    await visible(page.getByRole('button', { name: 'Stop', exact: true }))
    await page.keyboard.press('Space')
    await visible(page.getByRole('button', { name: 'Play', exact: true }))
  })

  it('starts a take: the list lands in the posting form, and a draft goes only when told to', async () => {
    const page = await open(animator, `${BENCH}?law=topple&body=block&height=38&width=6&lean=1.5`)
    const count = Number((await said(page, 'drawings').innerText()).split(' ')[0])
    expect(count).toBeGreaterThan(60)
    const start = async () => {
      await page.getByRole('button', { name: /Start a take with this/ }).focus()
      await page.keyboard.press('Enter')
      await page.getByLabel('Shot', { exact: true }).selectOption(CODE)
      await shows(page.getByRole('dialog'), `${count} drawings, from frame 1`)
    }
    await start()
    await page.getByRole('button', { name: 'Carry the list over' }).click()
    await page.waitForURL(new RegExp(`/shots/${CODE}/post$`))
    await shows(page.getByRole('form', { name: 'The list' }), `${count} keys`)
    await shows(page.getByLabel('The judge’s answer'), /Holds/)

    await page.goto(`${BENCH}?law=topple&body=block&height=38&width=6&lean=1.5`)
    await page.waitForLoadState('networkidle')
    await start()
    const carry = page.getByRole('button', { name: 'Carry the list over' })
    await visible(page.getByText(`with ${count} rows`))
    expect(await carry.isDisabled()).toBe(true)
    await page.getByRole('checkbox', { name: /Replace it/ }).check()
    expect(await carry.isDisabled()).toBe(false)
    await page.keyboard.press('Escape')
    await counts(page.getByRole('dialog'), 0)
  })

  const points = { measure: 'point', unit: 'px', slop: 1, tolerance: 0.1 } as const
  const angles = { measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1 } as const
  const ways = { measure: 'distance', unit: 'px', slop: 1, tolerance: 0.1 } as const
  const carried: [string, string, Claim][] = [
    ['CLK-201', 'law=flight&speed=8&angle=40&landing=2', { ...points, law: 'flight', subject: { unitsPerMetre: 150 } }],
    ['CLK-202', 'law=over-edge&body=block&width=0.6&height=2&lean=2&brink=6', { ...angles, law: 'over-edge', subject: { shape: 'block', width: 0.6, height: 2 } }],
    ['CLK-203', 'law=slow-in&way=4&seconds=2', { ...ways, law: 'slow-in' }],
    ['CLK-204', 'law=bounce&way=2&back=70&bounces=3&on=1', { ...ways, law: 'bounce', subject: { unitsPerMetre: 150 } }],
    ['CLK-205', 'law=spin&rate=0.5&turns=2', { ...angles, law: 'spin' }],
  ]
  it.each(carried)('%s takes %s, and it holds there', async (code, query, claim) => {
    await hangTower(server.url, code, claim)
    const page = await open(animator, `${BENCH}?${query}`)
    const count = Number((await said(page, 'drawings').innerText()).split(' ')[0])
    await page.getByRole('button', { name: /Start a take with this/ }).click()
    await page.getByLabel('Shot', { exact: true }).selectOption(code)
    await shows(page.getByRole('dialog'), `${count} drawings, from frame 1`)
    await page.getByRole('button', { name: 'Carry the list over' }).click()
    await page.waitForURL(new RegExp(`/shots/${code}/post$`))
    await shows(page.getByRole('form', { name: 'The list' }), `${count} keys`)
    await shows(page.getByLabel('The judge’s answer'), /Holds/)
  })

  it('offers no shot that can’t take the list', async () => {
    const page = await open(animator, `${BENCH}?law=flight`)
    await page.getByRole('button', { name: /Start a take with this/ }).click()
    await visible(page.getByLabel('Shot', { exact: true }))
    const codes = await page.getByLabel('Shot', { exact: true }).locator('option').evaluateAll((options) => options.map((option) => (option as HTMLOptionElement).value))
    expect(codes).toContain('CLK-201')
    expect(codes).not.toContain(CODE)
  })
})
