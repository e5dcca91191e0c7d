/**
 * A throw without air against the textbook: range R = v² sin 2α/g, height H = v² sin² α/2g, time aloft 2v sin α/g over level ground
 * (Galileo, Two New Sciences, fourth day; any mechanics textbook).
 */
import { describe, expect, it } from 'vitest'
import { plannedFlight } from '../../utils/motion'
import type { FlightPlan } from '../../utils/motion'

const G = 9.80665
const plan = (more: Partial<FlightPlan>): FlightPlan => ({
  subject: { unitsPerMetre: 40 }, throw: { speed: 12, angle: 35 }, drop: 0, fps: 24, exposure: 1, ...more,
})

describe('a planned throw', () => {
  it.each([[5, 10], [12, 35], [20, 45], [9, 80], [3, 90]])('%d m/s at %d° has the textbook range, height and time', (speed, angle) => {
    const planned = plannedFlight(plan({ throw: { speed, angle } }))
    const radians = angle * Math.PI / 180
    expect(planned.range).toBeCloseTo(speed * speed * Math.sin(2 * radians) / G, 9)
    expect(planned.height).toBeCloseTo((speed * Math.sin(radians)) ** 2 / (2 * G), 9)
    expect(planned.seconds).toBeCloseTo(2 * speed * Math.sin(radians) / G, 9)
  })

  it('goes furthest at 45°, and equally far at 45° ± d', () => {
    const range = (angle: number) => plannedFlight(plan({ throw: { speed: 10, angle } })).range
    for (const d of [1, 7, 20, 40]) {
      expect(range(45 - d)).toBeCloseTo(range(45 + d), 9)
      expect(range(45 - d)).toBeLessThan(range(45))
    }
  })

  it('falls from a table as if it had been dropped: √(2h/g), whatever its sideways speed', () => {
    for (const sideways of [-4, 0, 2.5]) {
      const planned = plannedFlight(plan({ throw: { sideways }, drop: 0.75 }))
      expect(planned.seconds).toBeCloseTo(Math.sqrt(1.5 / G), 12)
      expect(planned.landing.x).toBeCloseTo(40 * sideways * Math.sqrt(1.5 / G), 9)
      expect(planned.landing.y).toBeCloseTo(30, 9)
      expect(planned.apex).toBeNull()
    }
  })

  it('keeps its energy at every drawing: ½v² + gh from the gaps’ own mid-speeds', () => {
    const { keys } = plannedFlight(plan({ exposure: 2, yAxis: 'up', origin: { x: 100, y: 50 } }))
    const energies = keys.slice(1, -1).map((key, i) => {
      const [before, after] = [keys[i]!, keys[i + 2]!]
      // Over a parabola the chord's slope is the speed at its middle, exactly.
      const speed = [(after.x - before.x), (after.y - before.y)].map(d => d / 40 / (4 / 24))
      return (speed[0]! ** 2 + speed[1]! ** 2) / 2 + G * (key.y - 50) / 40
    })
    for (const energy of energies) expect(energy).toBeCloseTo(72, 9)
  })

  it('counts y down on a screen and up where the list says so', () => {
    const down = plannedFlight(plan({})).keys
    const up = plannedFlight(plan({ yAxis: 'up' })).keys
    expect(up.map(({ y }) => -y + 0)).toEqual(down.map(({ y }) => y + 0))
    expect(Math.min(...down.map(({ y }) => y))).toBeLessThan(-50)
  })

  it('stops at its highest point where it never gets as high as it was to land', () => {
    const planned = plannedFlight(plan({ throw: { speed: 4, angle: 30 }, drop: -5 }))
    expect(planned.landing).toEqual(planned.apex)
  })

  it('rounds to the paper and numbers its frames', () => {
    const { keys } = plannedFlight(plan({ step: 0.5, exposure: 2, firstFrame: 1001 }))
    expect(keys.map(key => key.frame).slice(0, 3)).toEqual([1001, 1003, 1005])
    for (const { x, y } of keys) expect([2 * x, 2 * y].every(Number.isInteger)).toBe(true)
  })
})
