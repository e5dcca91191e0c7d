import { beforeAll, describe, expect, it } from 'vitest'
import type { Refusal } from '~/utils/contracts/common'
import type { CheckResult } from '~/utils/contracts/check'
import { judge } from '~/utils/motion'
import type { CheckRequest } from '~/utils/motion/types'
import { signIn } from '../helpers/client'
import type { Client } from '../helpers/client'
import { temporaryFolder } from '../helpers/folder'
import { emailOf, seedHouse, SEED_PASSWORD } from '../helpers/seed'
import { startServer } from '../helpers/server'
import { openStore, rowCounts } from '../helpers/store'

let animator: Client
let guest: Client

beforeAll(async () => {
  const dataDir = temporaryFolder()
  await openStore(dataDir)
  await seedHouse()
  const { url } = await startServer({ demo: 'off', dataDir })
  animator = await signIn(url, emailOf('animator'), SEED_PASSWORD)
  guest = await signIn(url, emailOf('guest'), SEED_PASSWORD)
})

// Folio 107v of Galileo's notes on motion, at equal times 1…8 of a ball on a grooved ramp (S. Drake, Scientific American 228(5), 1973).
const folio = [33, 130, 298, 526, 824, 1192, 1620, 2104]
const ramp: CheckRequest = {
  law: 'odd-rule', fps: 24, measure: 'distance', unit: 'points', slop: 8, tolerance: 0.05,
  keys: folio.map((reading, i) => ({ frame: i + 1, reading })),
}

describe('POST /api/check', () => {
  it('answers as the judge does in the browser, to the last digit, and stores nothing', async () => {
    const before = await rowCounts()
    const { status, body } = await animator.post<CheckResult>('/api/check', ramp)
    expect(status).toBe(200)
    expect(body).toEqual(JSON.parse(JSON.stringify(judge(ramp))))
    expect(body.verdict).toBe('holds')
    expect(Object.keys(body).sort()).toEqual(['claim', 'figures', 'findings', 'keys', 'readsAs', 'reason', 'ruled', 'size', 'verdict'])
    expect(Object.keys(body.keys[0]!).sort()).toEqual(['allowance', 'breaks', 'frame', 'gap', 'law', 'lawGap', 'offset', 'offsetFrames', 'reading'])
    expect(await rowCounts()).toEqual(before)
  })

  it('breaks the same list as a steady motion', async () => {
    const { body } = await animator.post<CheckResult>('/api/check', { ...ramp, law: 'steady' })
    expect(body.verdict).toBe('breaks')
  })

  it('takes the smallest and the largest list that the contract allows, and 23.976 frames per second', async () => {
    const keys = (count: number) => Array.from({ length: count }, (_, i) => ({ frame: i, reading: i * i * 0.01 }))
    for (const list of [keys(3), keys(2000)]) {
      const { status, body } = await animator.post<CheckResult>('/api/check', { ...ramp, fps: 23.976, keys: list })
      expect(status).toBe(200)
      expect(body.keys).toHaveLength(list.length)
    }
  })

  it('2.4.1: is limited for one person, and for nobody else with them', async () => {
    const answers: number[] = []
    let last: Refusal | null = null
    while (answers.length < 320 && answers.at(-1) !== 429) {
      const { status, body } = await guest.post<Refusal>('/api/check', { ...ramp, keys: ramp.keys.slice(0, 3) })
      answers.push(status)
      last = body
    }
    expect(answers.at(-1)).toBe(429)
    expect(new Set(answers.slice(0, -1))).toEqual(new Set([200]))
    expect(last).toMatchObject({ statusCode: 429, message: expect.stringMatching(/\S/) })
    expect((await animator.post('/api/check', ramp)).status).toBe(200)
  })

  it('2.4.1: a long list counts as several, for it takes as long', async () => {
    const keys = Array.from({ length: 2000 }, (_, i) => ({ frame: i, reading: i }))
    const supervisor = await signIn(animator.url, emailOf('supervisor'), SEED_PASSWORD)
    const answers: number[] = []
    while (answers.length < 50 && answers.at(-1) !== 429) answers.push((await supervisor.post('/api/check', { ...ramp, keys })).status)
    // 300 in a minute at eight for each list.
    expect(answers).toEqual([...Array.from({ length: 37 }, () => 200), 429])
  })
})
