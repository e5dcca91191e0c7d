/** Drawings of the centre of a body over a brink: what is told of them, and what every answer must be. */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { judge, judgeInDepth } from '../../../utils/motion'
import type { PointCheck, PointKey } from '../../../utils/motion'
import { overEdgeStates } from '../../bench/lists/edgeMotion'

const G = 9.80665
const DEGREE = 180 / Math.PI
const brink = { x: 400, y: 300 }
const claim = { law: 'over-edge', fps: 24, measure: 'point', unit: 'px', slop: 1, tolerance: 0.1 } as const

interface Told { leavesAt?: number, sideways?: boolean, until?: number, perMetre?: number, lean?: number }

/** The centre of a rod by integration (see `edgeMotion.ts`), y down, to half a pixel; `until` metres below the brink. */
function rod(height: number, { leavesAt, sideways = true, until = height, perMetre = 150 / height, lean = 2 }: Told = {}): PointKey[] {
  const body = { d: height / 2, inertia: height ** 2 / 12, gravity: G }
  const { states } = overEdgeStates(
    body, lean / DEGREE, 0, 1 / 24, 300, ({ y }) => y < -until, { sideways, ...(leavesAt !== undefined && { leavesAt: leavesAt / DEGREE }) },
  )
  const half = (value: number) => Math.round(2 * value) / 2
  return states.slice(0, -1).map(({ x, y }, i) => ({ frame: 1 + i, x: half(brink.x + perMetre * x), y: half(brink.y - perMetre * y) }))
}

describe('the centre of a body over the edge', () => {
  it.each([['given', brink], ['found', undefined]] as const)('holds with its brink %s: size, leaving angle, arc', (_way, pivot) => {
    const result = judge({ ...claim, keys: rod(3), ...(pivot && { pivot }) })
    expect(result.findings).toEqual([])
    expect(result.verdict).toBe('holds')
    expect(Math.abs((result.size?.value ?? 0) / 3 - 1)).toBeLessThan(0.03)
    const angle = result.figures?.find(({ kind }) => kind === 'release-angle')
    // cos θ = 0.6·cos 2° for a thin rod (motion.md).
    expect(Math.abs((angle?.value ?? 0) - Math.acos(0.6 * Math.cos(2 / DEGREE)) * DEGREE)).toBeLessThan(2)
    const { path } = result
    expect(path?.kind).toBe('circle')
    if (path?.kind !== 'circle') return
    expect(Math.hypot(path.centre.x - brink.x, path.centre.y - brink.y)).toBeLessThan(4)
    expect(Math.abs(path.radius - 75)).toBeLessThan(4)
    // The angle of the first drawing, from the x axis towards y as posted, and the way round that the body goes.
    expect(Math.abs(path.zeroAt + 88)).toBeLessThan(3)
    expect(path.counts).toBe(1)
  })

  it('draws the law’s own points where the drawings are', () => {
    const { result, placesAt } = judgeInDepth({ ...claim, pivot: brink, keys: rod(3) })
    result.keys.forEach((key, i) => {
      expect(Math.hypot((key.lawPoint?.x ?? 0) - (key.point?.x ?? 0), (key.lawPoint?.y ?? 0) - (key.point?.y ?? 0))).toBeLessThan(1)
      expect(result.ruledPoints?.fit[i]).toEqual({ frame: key.frame, ...key.lawPoint })
    })
    expect(placesAt?.([result.keys[4]?.frame ?? 0])[0]).toEqual(result.keys[4]?.lawPoint)
    expect(result.reads).toEqual({ measure: 'distance', unit: 'px' })
  })

  it.each([41, 66])('is told that it lets go at %d°, once', (leavesAt) => {
    const result = judge({ ...claim, pivot: brink, keys: rod(3, { leavesAt }) })
    expect(result.findings.map(({ kind }) => kind)).toEqual(['wrong-release'])
    expect(Math.abs((result.findings[0]?.amount ?? 0) - (leavesAt - 53.15))).toBeLessThan(1.5)
    expect(result.findings[0]?.text).toMatch(leavesAt < 53 ? /^Lets go at 4[012]°, 1\d° too early: this body leaves the edge at 53°\.$/ : /too late/)
  })

  it.each([32, 41, 45])('is told that it lets go at %d° where brink and size could give way to hide it', (leavesAt) => {
    const result = judge({ ...claim, subject: { shape: 'rod', height: 3 }, keys: rod(3, { leavesAt }) })
    expect(result.findings.map(({ kind }) => kind)).toEqual(['wrong-release'])
    expect(Math.abs((result.findings[0]?.amount ?? 0) - (leavesAt - 53.15))).toBeLessThan(1.5)
  })

  it('is told that it falls straight down the side', () => {
    const result = judge({ ...claim, pivot: brink, keys: rod(3, { sideways: false }) })
    expect(result.findings.map(({ kind }) => kind)).toEqual(['wrong-release'])
    expect(result.findings[0]?.text).toContain('straight down the side')
  })

  it('is told of one drawing beside the arc and of one off the parabola', () => {
    const keys = rod(3)
    const last = keys.length - 4
    for (const [i, name] of [[Math.round(last / 2), 'arc'], [last, 'parabola']] as const) {
      const here = keys[i] as PointKey
      const [before, after] = [keys[i - 1] as PointKey, keys[i + 1] as PointKey]
      const gap = Math.hypot(after.x - before.x, after.y - before.y)
      const moved = { frame: here.frame, x: here.x + 14 * (after.y - before.y) / gap, y: here.y - 14 * (after.x - before.x) / gap }
      const result = judge({ ...claim, pivot: brink, keys: keys.map((key, at) => (at === i ? moved : key)) })
      expect(result.findings.map(({ kind, frames }) => [kind, frames])).toEqual([['off-path', [here.frame]]])
      expect(result.findings[0]?.text).toContain(`off the ${name}`)
      expect(Math.abs((result.findings[0]?.amount ?? 0) - 14)).toBeLessThan(1.5)
    }
  })

  it('can’t be told where there is no arc: all in the air, or all on a straight line', () => {
    const keys = rod(3, { until: 12 })
    const air = judge({ ...claim, keys: keys.slice(-14) })
    expect(air.verdict).toBe('undecided')
    const even = judge({ ...claim, keys: Array.from({ length: 16 }, (_, i) => ({ frame: i, x: 10 * i, y: 4 * i })) })
    expect(even.reason).toBe('No arc about a brink can be made out.')
  })
})

const RUNS = { numRuns: 8, seed: 4713 }
const drawn = fc.tuple(fc.double({ min: 0.5, max: 10, noNaN: true }), fc.double({ min: 1, max: 12, noNaN: true }), fc.constantFrom(undefined, 40, 65), fc.boolean(), fc.integer({ min: 0, max: 9 }))
  .map(([height, lean, leavesAt, sideways, salt]) => rod(height, { lean, sideways, ...(leavesAt && { leavesAt }) }).slice(-40)
    .map((key, i) => ({ ...key, x: key.x + (salt === 9 && i === 8 ? 12 : 0) })))
  .filter(keys => keys.length >= 8)
const anything: fc.Arbitrary<PointKey[]> = fc.array(fc.tuple(
  fc.integer({ min: 1, max: 4 }), fc.oneof(fc.integer({ min: -500, max: 500 }), fc.constantFrom(0, 1e6, -1e6, 1e-9)), fc.integer({ min: -500, max: 500 }),
), { minLength: 3, maxLength: 20 }).map((rows) => {
  let frame = 0
  return rows.map(([step, x, y]) => ({ frame: frame += step, x, y }))
})
const requests = (keys: fc.Arbitrary<PointKey[]>): fc.Arbitrary<PointCheck> => fc.record({
  keys, slop: fc.constantFrom(0, 1), pivot: fc.constantFrom(undefined, brink), start: fc.constantFrom('any' as const, 'rest' as const),
  yAxis: fc.constantFrom('down' as const, 'up' as const),
}).map(({ pivot, ...rest }) => ({ ...claim, ...rest, ...(pivot && { pivot }) }))

function everyNumber(value: unknown, visit: (number: number) => void): void {
  if (typeof value === 'number') visit(value)
  else if (Array.isArray(value)) value.forEach(item => everyNumber(item, visit))
  else if (value && typeof value === 'object') Object.values(value).forEach(item => everyNumber(item, visit))
}

describe('every answer about points over the edge', () => {
  it('is finite and complete', () => {
    fc.assert(fc.property(requests(fc.oneof(drawn, anything)), (request) => {
      const result = judge(request)
      everyNumber(result, number => expect(Number.isFinite(number)).toBe(true))
      expect(result.keys.map(key => key.frame)).toEqual(request.keys.map(key => key.frame))
      expect(result.reason === null).toBe(result.verdict !== 'undecided')
      if (result.verdict === 'breaks') expect(result.findings.length).toBeGreaterThan(0)
      for (const { text } of result.findings) expect(text).not.toMatch(/NaN|undefined|Infinity/)
    }), RUNS)
  })

  it('is the same for a fall to the left, for y counted up, and on a drawing four times as large', () => {
    const told = (request: PointCheck) => judge(request).findings.map(({ kind, frames }) => ({ kind, frames }))
    fc.assert(fc.property(drawn, (keys) => {
      const request: PointCheck = { ...claim, keys, pivot: brink }
      const plain = told(request)
      const left = keys.map(key => ({ ...key, x: 2 * brink.x - key.x }))
      expect(told({ ...request, keys: left })).toEqual(plain)
      const up = keys.map(key => ({ ...key, y: -key.y }))
      expect(told({ ...request, keys: up, yAxis: 'up', pivot: { x: brink.x, y: -brink.y } })).toEqual(plain)
      const large = keys.map(key => ({ ...key, x: 4 * key.x, y: 4 * key.y }))
      expect(told({ ...request, slop: 4, keys: large, pivot: { x: 4 * brink.x, y: 4 * brink.y } })).toEqual(plain)
    }), RUNS)
  })
})
