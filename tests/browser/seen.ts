import type { Locator } from 'playwright-core'
import { expect } from 'vitest'

/** What a person would wait for. The machine may be busy; nobody measures time here. */
const PATIENCE = { timeout: 20_000, interval: 100 }

/** Waits until the element shows the text. */
export async function shows(place: Locator, text: string | RegExp): Promise<void> {
  const said = expect.poll(() => place.first().innerText({ timeout: 1_000 }).catch(() => ''), PATIENCE)
  await (typeof text === 'string' ? said.toContain(text) : said.toMatch(text))
}

/** Waits until so many of them are there. */
export async function counts(place: Locator, count: number): Promise<void> {
  await expect.poll(() => place.count(), PATIENCE).toBe(count)
}

export const visible = (place: Locator) => place.first().waitFor({ state: 'visible', timeout: PATIENCE.timeout })
