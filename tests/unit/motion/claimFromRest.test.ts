import { describe, expect, it } from 'vitest'
import { judge } from '../../../utils/motion'
import type { ReadingCheck } from '../../../utils/motion'

const even = (count: number, gap: number, from = 0) => Array.from({ length: count }, (_, i) => ({ frame: 1 + i, reading: from + i * gap }))
const drop: ReadingCheck = {
  law: 'odd-rule', fps: 24, measure: 'distance', unit: 'px', slop: 1, tolerance: 0.08, keys: even(16, 26), subject: { unitsPerMetre: 80, slope: 90 },
}

describe('a list under another law is ruled by the claim’s own size, from rest', () => {
  it('falls ½·g·t² from the first drawing: 25 frames at 80 px/m, by school algebra', () => {
    const { findings, ruled } = judge({ ...drop, keys: even(25, 26, 100) })
    expect(findings.map(({ kind }) => kind)).toEqual(['wrong-law'])
    // One second of free fall, standard gravity: 9.80665 / 2 m.
    expect(ruled.claim?.at(-1)?.reading).toBeCloseTo(100 + (80 * 9.80665) / 2, 9)
    expect(ruled.claim?.map(({ frame }) => frame)).toEqual(even(25, 1).map(({ frame }) => frame))
  })

  it('falls the way the posted list goes, and holds when it is posted itself', () => {
    const upside = judge({ ...drop, keys: even(16, -26) })
    expect(upside.ruled.claim!.at(-1)!.reading).toBeLessThan(0)
    expect(judge({ ...drop, keys: judge(drop).ruled.claim! }).verdict).toBe('holds')
  })

  it('topples from the first lean at the claimed height, and says nothing from perfect balance or without a size', () => {
    const rod: ReadingCheck = { ...drop, law: 'topple', measure: 'angle', unit: 'deg', slop: 0.3, keys: even(20, 4, 5), subject: { shape: 'rod', height: 1 } }
    const { findings, ruled } = judge(rod)
    expect(findings.map(({ kind }) => kind)).toEqual(['wrong-law'])
    // motion.md's table: a 1 m rod takes 0.948478638 s from 5° to flat, so frame 1 + 24·0.9485 = 23.8; at frame 20 it is on its way.
    expect(ruled.claim!.at(-1)!.reading).toBeGreaterThan(30)
    expect(ruled.claim!.at(-1)!.reading).toBeLessThan(90)
    expect(judge({ ...rod, keys: even(20, 4) }).ruled.claim).toBeNull()
    expect(judge({ ...rod, subject: undefined }).ruled.claim).toBeNull()
  })
})
