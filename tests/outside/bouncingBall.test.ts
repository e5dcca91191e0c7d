/**
 * A ball that keeps a share e of its speed at every contact: the published sums of its bounces. From a drop h, with t₀ = √(2h/g), the
 * contacts come at t₀(1 + 2e + 2e² + …), all bouncing is over at t₀(1 + e)/(1 − e), and the whole way is h(1 + e²)/(1 − e²)
 * (geometric series; any mechanics textbook). The k-th hop rises h·e²ᵏ (Newton's law of restitution).
 */
import { describe, expect, it } from 'vitest'
import { STANDARD_GRAVITY, judge, plannedList, secondsFor } from '../../utils/motion'
import type { Plan } from '../../utils/motion'

const SCALE = 100
const plan = (drop: number, restitution: number, bounces: number, more: Partial<Plan> = {}): Plan => ({
  law: 'bounce', fps: 240, exposure: 1, subject: { unitsPerMetre: SCALE }, drop, restitution, bounces, ...more,
} as Plan)
const fall = (drop: number) => Math.sqrt(2 * drop / SCALE / STANDARD_GRAVITY)

describe('a planned bounce', () => {
  it.each([[300, 0.5], [120, 0.8], [700, 0.9], [50, 0.3]])('from %d units at e = %d is over when the series says', (drop, e) => {
    const t0 = fall(drop)
    expect(secondsFor(plan(drop, e, 0))).toBeCloseTo(t0, 12)
    expect(secondsFor(plan(drop, e, 2))).toBeCloseTo(t0 * (1 + 2 * e + 2 * e * e), 12)
    expect(secondsFor(plan(drop, e, 400))).toBeCloseTo(t0 * (1 + e) / (1 - e), 9)
  })

  it('without loss every hop lasts as long; without bounce it stays where it landed', () => {
    expect(secondsFor(plan(200, 1, 3))).toBeCloseTo(7 * fall(200), 12)
    const { keys } = plannedList(plan(200, 0, 2))
    // The last drawing before the landing, less than a frame away from it.
    expect(200 - (keys.at(-1)?.reading ?? NaN)).toBeLessThan(STANDARD_GRAVITY * SCALE * fall(200) / 240)
    expect(keys.every(({ reading }) => Number.isFinite(reading))).toBe(true)
  })

  it.each([0.6, 0.75])('at e = %d rises to e², e⁴, e⁶ of the drop and travels the series’ way', (e) => {
    const { keys } = plannedList(plan(400, e, 30))
    const heights = keys.map(({ reading }) => 400 - reading)
    const apexes = heights.filter((h, i) => i > 0 && h > (heights[i - 1] as number) && h >= (heights[i + 1] ?? Infinity))
    for (let k = 1; k <= 3; k++) expect((apexes[k - 1] as number) / 400).toBeCloseTo(e ** (2 * k), 3)
    const way = heights.reduce((sum, h, i) => sum + Math.abs(h - (heights[i - 1] ?? h)), 0)
    // Drawn 240 times a second, the tips of the flights fall between drawings.
    expect(way / (400 * (1 + e * e) / (1 - e * e))).toBeCloseTo(1, 1)
  })
})

describe('a judged bounce', () => {
  it.each([[300, 0.8, 2], [500, 0.6, 1], [-240, 0.45, 2]])('dropped %d units at e = %d reads its restitution, its contacts and its scale', (drop, e, exposure) => {
    const { keys } = plannedList(plan(drop, e, 3, { fps: 24, exposure, step: 0.5, firstFrame: 101 }))
    const result = judge({ law: 'bounce', fps: 24, measure: 'distance', unit: 'px', slop: 1, tolerance: 0.1, keys })
    expect(result.verdict).toBe('holds')
    const restitution = result.figures?.find(({ kind }) => kind === 'restitution')
    expect(restitution?.value).toBeCloseTo(e, 2)
    const t0 = 24 * fall(Math.abs(drop))
    const contacts = result.figures?.filter(({ kind }) => kind === 'contact') ?? []
    const told = [1, 1 + 2 * e, 1 + 2 * e + 2 * e * e].map(times => 101 + times * t0)
    expect(contacts.length).toBeGreaterThanOrEqual(3)
    told.forEach((frame, i) => expect(contacts[i]?.value).toBeCloseTo(frame, 1))
    expect(result.size?.unit).toBe('px/m')
    expect((result.size?.value ?? NaN) / SCALE).toBeCloseTo(1, 2)
  })

  it('on a slope a rolling ball falls by 5/7 of g·sin α', () => {
    const { keys } = plannedList(plan(300, 0.7, 3, { fps: 24, exposure: 1, step: 0.5 }))
    const subject = { slope: 30, roll: 'ball' } as const
    const { size } = judge({ law: 'bounce', fps: 24, measure: 'distance', unit: 'px', slop: 1, tolerance: 0.1, keys, subject })
    expect((size?.value ?? NaN) / (SCALE / (0.5 * 5 / 7))).toBeCloseTo(1, 2)
  })
})
