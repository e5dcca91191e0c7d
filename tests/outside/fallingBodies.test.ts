/** Falling: Galileo's own distances, and a free fall in inches. */
import { describe, expect, it } from 'vitest'
import { judge, plannedList } from '../../utils/motion'
import type { ReadingCheck } from '../../utils/motion'

/**
 * Folio 107v of Galileo's notes on motion: distances in points at equal times 1 to 8 of a ball on a grooved ramp.
 * S. Drake, Scientific American 228(5), 1973, 84–92. The last is also read 2123.
 */
const FOLIO = [33, 130, 298, 526, 824, 1192, 1620, 2104]

function folio(last: number): ReadingCheck {
  const readings = [0, ...FOLIO.slice(0, -1), last]
  // Slop: Galileo read whole points off a ruler; two and a half allow for the groove. The mark of one time unit is not a frame, but
  // one frame a second makes it one.
  return {
    law: 'odd-rule', fps: 1, measure: 'distance', unit: 'points', slop: 2.5, tolerance: 0.1,
    keys: readings.map((reading, frame) => ({ frame, reading })),
  }
}

describe('Galileo, folio 107v', () => {
  it.each([2104, 2123])('holds under the odd rule, last distance %d', (last) => {
    const result = judge(folio(last))
    expect(result.verdict).toBe('holds')
    expect(result.findings).toEqual([])
    expect(result.readsAs[0]?.law).toBe('odd-rule')
  })

  it('breaks as even spacing', () => {
    const result = judge({ ...folio(2104), law: 'steady' })
    expect(result.verdict).toBe('breaks')
    expect(result.findings.map(finding => finding.kind)).toEqual(['wrong-law'])
    expect(result.readsAs[0]?.law).toBe('odd-rule')
  })

  it('reads a rate whose interval holds 32.9 points per unit of time squared', () => {
    // r = ct² with c = 2104/64 = 32.9; the judge answers in acceleration, twice c, here with a "metre" chosen so that the claimed
    // gravity of 2 units makes c the size.
    const result = judge({ ...folio(2104), subject: { gravity: 2 } })
    expect(result.size?.low).toBeLessThan(32.9)
    expect(result.size?.high).toBeGreaterThan(32.9)
    expect(result.size?.value).toBeCloseTo(32.9, 0)
  })
})

describe('free fall', () => {
  it('covers 0.33515 inch in the first 24th of a second', () => {
    const { keys } = plannedList({ law: 'odd-rule', subject: { unitsPerMetre: 1 / 0.0254 }, travel: 200, fps: 24, exposure: 1 })
    expect(keys[1]?.reading).toBeCloseTo(0.33515, 5)
  })

  it('has gaps 1 : 3 : 5 : 7 from the apex', () => {
    const { keys } = plannedList({ law: 'odd-rule', subject: { unitsPerMetre: 100, slope: 30, roll: 'ball' }, travel: 300, fps: 24, exposure: 2 })
    const gaps = keys.slice(1).map((key, i) => key.reading - (keys[i]?.reading ?? 0))
    gaps.forEach((gap, i) => expect(gap / (gaps[0] ?? NaN)).toBeCloseTo(2 * i + 1, 9))
  })
})
