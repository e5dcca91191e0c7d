/** What must be true of every answer, whatever the list. */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { judge, judgeInDepth, lawCurve, lawsFor, MEASURES } from '../../../utils/motion'
import type { CheckResult, Key, Law, ReadingCheck } from '../../../utils/motion'

const RUNS = { numRuns: 150, seed: 4711 }

const gaps = fc.array(fc.integer({ min: 1, max: 5 }), { minLength: 2, maxLength: 45 })

function keysOf(reading: fc.Arbitrary<number>): fc.Arbitrary<Key[]> {
  return gaps.chain(steps => fc.tuple(
    fc.constantFrom(0, 1, 101, 1001), fc.array(reading, { minLength: steps.length + 1, maxLength: steps.length + 1 }),
  ).map(([first, readings]) => {
    let frame = first
    return readings.map((value, i) => {
      if (i > 0) frame += steps[i - 1] ?? 1
      return { frame, reading: value }
    })
  }))
}

const wild = fc.oneof(
  fc.double({ min: -1e6, max: 1e6, noNaN: true }), fc.integer({ min: -3, max: 3 }), fc.constantFrom(0, 90, 180, -180, 360, 1e6, -1e6, 1e-9),
)

/** Lists that look like a motion: a parabola, a wave or a growth, with some pencil. */
const likely = fc.tuple(gaps, fc.constantFrom('parabola', 'wave', 'growth', 'line'), fc.double({ min: 0.2, max: 3, noNaN: true }), fc.integer({ min: 0, max: 1000 }))
  .map(([steps, shape, pace, salt]) => {
    let frame = 1001
    return [0, ...steps].map((step, i) => {
      frame += step
      const t = (frame - 1001) / 24
      const value = shape === 'parabola' ? 40 * pace * t * t : shape === 'wave' ? 40 * Math.cos(3 * pace * t) : shape === 'growth' ? 2 * Math.cosh(Math.min(4, pace * t * 2)) : 30 * t
      return { frame, reading: Math.round(10 * value + 2 * Math.sin(i * i + salt)) / 10 }
    })
  })

const requests: fc.Arbitrary<ReadingCheck> = fc.record({
  measure: fc.constantFrom<ReadingCheck['measure']>('angle', 'distance', 'arc'),
  fps: fc.constantFrom(1, 12, 23.976, 24, 60, 240),
  slop: fc.constantFrom(0, 0.3, 1, 50),
  tolerance: fc.constantFrom(0, 0.1, 0.5),
  keys: fc.oneof(keysOf(wild), likely, likely),
  zeroAt: fc.constantFrom(undefined, 0, 30, -180),
  radius: fc.constantFrom(1, 300),
  which: fc.nat(),
  body: fc.boolean(),
}).map(({ measure, which, radius, body, zeroAt, ...rest }) => {
  const laws = lawsFor(measure)
  const law = laws[which % laws.length] as Law
  const request: ReadingCheck = { ...rest, law, measure, unit: measure === 'angle' ? 'deg' : 'px' }
  if (zeroAt !== undefined) request.zeroAt = zeroAt
  if (measure === 'arc') request.radius = radius
  if (body) request.subject = MEASURES[law].includes('distance') ? { unitsPerMetre: 80 } : { shape: 'rod', height: 2 }
  return request
})

function everyNumber(value: unknown, visit: (number: number) => void): void {
  if (typeof value === 'number') visit(value)
  else if (Array.isArray(value)) value.forEach(item => everyNumber(item, visit))
  else if (value && typeof value === 'object') Object.values(value).forEach(item => everyNumber(item, visit))
}

const outline = (result: CheckResult) => ({
  verdict: result.verdict, kinds: result.findings.map(finding => finding.kind), first: result.readsAs[0]?.law,
})

describe('every answer', () => {
  it('is finite, complete and the same twice', () => {
    fc.assert(fc.property(requests, (request) => {
      const result = judge(request)
      everyNumber(result, number => expect(Number.isFinite(number)).toBe(true))
      expect(result.keys.map(key => key.frame)).toEqual(request.keys.map(key => key.frame))
      expect(result.reason === null).toBe(result.verdict !== 'undecided')
      if (result.verdict === 'holds') {
        expect(result.findings).toEqual([])
        expect(result.keys.some(key => key.breaks)).toBe(false)
      }
      if (result.verdict === 'breaks') expect(result.findings.length).toBeGreaterThan(0)
      if (result.size) {
        expect(result.size.low).toBeLessThanOrEqual(result.size.value)
        expect(result.size.high).toBeGreaterThanOrEqual(result.size.value)
      }
      for (const { frames, text } of result.findings) {
        expect(text).not.toMatch(/NaN|undefined|Infinity/)
        for (const frame of frames) expect(request.keys.some(key => key.frame === frame)).toBe(true)
      }
      expect(JSON.stringify(judge(request))).toBe(JSON.stringify(result))
    }), RUNS)
  })

  it('breaks a key exactly where its offset is beyond its allowance', () => {
    fc.assert(fc.property(requests, (request) => {
      for (const key of judge(request).keys) {
        if (key.offset === null || key.allowance === null) expect(key.breaks).toBe(false)
        else expect(key.breaks).toBe(Math.abs(key.offset) > key.allowance)
      }
    }), RUNS)
  })

  it('draws the same line that it judged by', () => {
    fc.assert(fc.property(requests, (request) => {
      const { line, result } = judgeInDepth(request)
      if (!line) return
      const drawn = lawCurve(line, request, request.keys.map(key => key.frame))
      result.keys.forEach((key, i) => expect(drawn[i]).toBe(key.law))
    }), RUNS)
  })

  it('does not depend on which number the first frame has', () => {
    fc.assert(fc.property(requests, (request) => {
      const moved = { ...request, keys: request.keys.map(key => ({ ...key, frame: key.frame + 5000 })) }
      expect(outline(judge(moved))).toEqual(outline(judge(request)))
    }), RUNS)
  })

  it('does not depend on the drawing unit', () => {
    const straight = requests.filter(request => request.measure === 'distance' && !request.subject)
    fc.assert(fc.property(straight, (request) => {
      // A power of two scales every number exactly, so the answers may not differ in a single bit.
      const doubled = { ...request, slop: 8 * request.slop, keys: request.keys.map(key => ({ ...key, reading: 8 * key.reading })) }
      const plain = judge(request)
      const large = judge(doubled)
      expect(outline(large).verdict).toBe(outline(plain).verdict)
      large.keys.forEach((key, i) => {
        const law = plain.keys[i]?.law
        if (law !== null && law !== undefined && key.law !== null) expect(key.law / 8).toBeCloseTo(law, 5)
      })
    }), { ...RUNS, numRuns: 80 })
  })

  it('is the same for a motion and its mirror image', () => {
    fc.assert(fc.property(likely, fc.constantFrom<Law>('odd-rule', 'pendulum', 'steady', 'topple', 'slow-in', 'spin', 'swing-decay'), (keys, law) => {
      const request: ReadingCheck = { law, fps: 24, measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1, keys }
      const mirrored = { ...request, keys: keys.map(key => ({ ...key, reading: -key.reading })) }
      expect(outline(judge(mirrored))).toEqual(outline(judge(request)))
    }), RUNS)
  })

  it('never breaks fewer keys under less tolerance where the line stays', () => {
    let stayed = 0
    fc.assert(fc.property(likely, fc.constantFrom<Law>('odd-rule', 'pendulum', 'steady', 'topple'), fc.constantFrom(0.3, 1, 2), (keys, law, slop) => {
      const request: ReadingCheck = { law, fps: 24, measure: 'angle', unit: 'deg', slop, tolerance: 0.2, keys }
      const loose = judge(request)
      const tight = judge({ ...request, tolerance: 0.1 })
      const count = (result: CheckResult) => result.keys.filter(key => key.breaks).length
      const sameLine = loose.keys.every((key, i) => Math.abs((key.law ?? 0) - (tight.keys[i]?.law ?? 0)) < 1e-9)
      if (!sameLine) return
      if (loose.keys[0]?.law !== null) stayed++
      expect(count(tight)).toBeGreaterThanOrEqual(count(loose))
    }), RUNS)
    // A property that hardly ever applies would hold of anything.
    expect(stayed).toBeGreaterThan(RUNS.numRuns / 3)
  })
})
