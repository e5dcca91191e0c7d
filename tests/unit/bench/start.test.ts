import { describe, expect, it } from 'vitest'
import { listIn, motionIn } from '~/utils/bench/planning'
import { freshSetup } from '~/utils/bench/setup'
import { draftFrom, fitsClaim, keysFor, shotsFor, writtenIn } from '~/utils/bench/start'
import type { Claim, Sheet } from '~/utils/contracts/production'
import { readDraft } from '~/utils/posting/draft'
import { readRows } from '~/utils/posting/rows'

const claim: Claim = { law: 'topple', measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1 }
const rod = { ...freshSetup(), height: 1, lean: 1 }

describe('from the bench into a draft', () => {
  it('counts from the shot’s own first frame', () => {
    const keys = keysFor(rod, { claim, fps: 24, firstFrame: 1001 })
    expect(keys[0]).toEqual({ frame: 1001, reading: 1 })
    expect(keys.map((key) => 'reading' in key && key.reading)).toEqual(listIn(rod).map(({ reading }) => reading))
  })

  it('plans at the shot’s rate and in its drawing scale', () => {
    expect(keysFor(rod, { claim, fps: 48, firstFrame: 1 }).length).toBe(33)
    const drop = { ...freshSetup(), law: 'odd-rule' as const, way: 1 }
    const scaled: Claim = { ...claim, law: 'odd-rule', measure: 'distance', unit: 'px', subject: { unitsPerMetre: 400 } }
    const last = keysFor({ ...drop, on: 1 }, { claim: scaled, fps: 24, firstFrame: 1 }).at(-1)!
    const exact = motionIn({ ...drop, on: 1, scale: 400 }).moments.at(-1)!.reading
    expect(last).toMatchObject({ reading: expect.closeTo(exact, 0) })
  })

  it('tells angles along an arc, and from the drawing that reads 0', () => {
    const [first] = keysFor(rod, { claim: { ...claim, measure: 'arc', unit: 'px', radius: 180 / Math.PI, zeroAt: 0.4 }, fps: 24, firstFrame: 1 })
    expect(first).toMatchObject({ reading: expect.closeTo(0.6, 6) })
  })

  it('offers only shots that it can be told to, that aren’t settled, and where one may post', () => {
    const sheet = (code: string, part: Partial<Sheet>) => ({ code, desk: 'animator', claim, animator: null, ...part }) as Sheet
    const sheets = [sheet('A-1', {}), sheet('A-2', { desk: 'settled' }), sheet('A-3', { claim: null }), sheet('A-4', { claim: { ...claim, law: 'steady', measure: 'distance', unit: 'px' } }), sheet('A-5', {})]
    expect(shotsFor(rod, sheets, ({ code }) => code !== 'A-5').map(({ code }) => code)).toEqual(['A-1'])
    expect(fitsClaim({ ...rod, law: 'steady' }, { measure: 'distance' })).toBe(true)
  })

  it('is a draft that the posting form can read, and says how much is written in one', () => {
    const stored = JSON.stringify(draftFrom(listIn(rod), '0190a2a4-9c8e-7b61-8a3e-1f2d3c4b5a69', '2026-01-01T00:00:00.000Z'))
    expect(readRows(readDraft(stored)!.rows).keys).toEqual(listIn(rod))
    expect(writtenIn(stored)).toBe(17)
    expect(writtenIn(null)).toBe(0)
    expect(writtenIn('not a draft')).toBe(0)
  })
})
