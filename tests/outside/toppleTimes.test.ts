/** Times of a topple: the table of the project's motion sheet (30-digit arithmetic), its limits and what the trade knows. */
import { describe, expect, it } from 'vitest'
import { edgeRatio, framesFor, leavesEdgeAt, paceOf, plannedList, toppleMeasure, toppleTime } from '../../utils/motion'
import { freeSwing } from '../../utils/motion/swing'

const rod = { shape: 'rod', height: 1 } as const

/** lean °, k·T, T in seconds, angle at T/2 in degrees. */
const TABLE: [number, number, number, number][] = [
  [0.1, 7.548881117, 1.96823349679, 2.1797366],
  [0.5, 5.939462052, 1.54860673821, 4.8836984],
  [1, 5.246361530, 1.36789337920, 6.9236221],
  [2, 4.553361387, 1.18720619194, 9.8394349],
  [5, 3.637755629, 0.948478638292, 15.782380],
  [10, 2.945974783, 0.768109360781, 22.838141],
  [20, 2.254151868, 0.587729114381, 33.710329],
]

function angleAt(lean: number, tau: number): number {
  const angle = new Float64Array(1)
  freeSwing(lean * Math.PI / 180, 0, true, [tau], 1, angle, new Float64Array(1))
  return (angle[0] as number) * 180 / Math.PI
}

describe('a rod of one metre from rest to flat', () => {
  it.each(TABLE)('lean %d°', (lean, measure, seconds, half) => {
    // Half a unit of the last digit printed.
    expect(Math.abs(toppleMeasure(lean) - measure)).toBeLessThan(6e-10)
    expect(Math.abs(toppleTime(rod, lean) - seconds)).toBeLessThan(6e-12)
    expect(Math.abs(angleAt(lean, toppleMeasure(lean) / 2) - half)).toBeLessThan(6e-7)
    expect(Math.abs(angleAt(lean, toppleMeasure(lean)) - 90)).toBeLessThan(1e-9)
  })

  it('has not turned ten degrees at half its time when it started from one (common practice)', () => {
    expect(angleAt(1, toppleMeasure(1) / 2)).toBeLessThan(10)
  })

  it('takes twice the frames at four times the height (common practice; exact here)', () => {
    for (const lean of [0.5, 2, 12]) {
      expect(toppleTime({ shape: 'rod', height: 4 }, lean) / toppleTime(rod, lean)).toBeCloseTo(2, 13)
    }
    const plan = { law: 'topple', fps: 24, exposure: 1, lean: 2 } as const
    const small = framesFor({ ...plan, subject: { shape: 'rod', height: 2 } })
    const large = framesFor({ ...plan, subject: { shape: 'rod', height: 8 } })
    // Each is rounded up to a whole frame.
    expect(Math.abs(large - 2 * small)).toBeLessThanOrEqual(1)
  })

  it('goes as ln(…/θ₀) from a small lean: each tenth of the lean costs ln 10 of k·t', () => {
    expect(toppleMeasure(0.001) - toppleMeasure(0.01)).toBeCloseTo(Math.log(10), 6)
  })

  it('never ends from perfect balance', () => expect(toppleTime(rod, 0)).toBe(Infinity))

  it('moves at first like cosh: θ = θ₀·cosh kt for small angles', () => {
    expect(angleAt(0.01, 1) / (0.01 * Math.cosh(1))).toBeCloseTo(1, 7)
  })

  it('keeps its planned list on the same curve', () => {
    const list = plannedList({ law: 'topple', subject: rod, lean: 5, fps: 24, exposure: 2 })
    const last = list.keys[list.keys.length - 1]
    expect(list.keys[0]).toEqual({ frame: 1, reading: expect.closeTo(5, 12) as number })
    expect(list.frames).toBeCloseTo(0.948478638292 * 24, 8)
    expect(last?.reading).toBeCloseTo(angleAt(5, ((last?.frame ?? 0) - 1) / 24 * paceOf(rod)), 10)
  })
})

describe('leaving the edge', () => {
  it('at the angles that textbooks give', () => {
    // Thin rod cos = 3/5; solid ball over an edge of no radius cos = 10/17; sliding point cos = 2/3.
    expect(leavesEdgeAt(edgeRatio(rod) ?? NaN)).toBeCloseTo(53.13010235, 8)
    // d = r and L = I/(m·d) = (7/5)·r.
    expect(leavesEdgeAt(2 / (7 / 5))).toBeCloseTo(Math.acos(10 / 17) * 180 / Math.PI, 12)
    expect(leavesEdgeAt(2 / (7 / 5))).toBeCloseTo(53.97, 2)
    expect(leavesEdgeAt(2)).toBeCloseTo(48.19, 2)
  })
})
