/** What must be true of every answer on a divided list, whatever the list and the division. */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { claim } from '../../../utils/contracts/check'
import { MEASURES, judge } from '../../../utils/motion'
import type { CheckResult, Key, Law, ReadingCheck, Span } from '../../../utils/motion'

const RUNS = { numRuns: 120, seed: 4712 }

const frames = fc.array(fc.integer({ min: 1, max: 4 }), { minLength: 2, maxLength: 40 }).map((steps) => {
  let frame = 101
  return [frame, ...steps.map(step => (frame += step))]
})

/** Wild readings, and motions that change their law on the way. */
const keys: fc.Arbitrary<Key[]> = frames.chain((at) => {
  const wild = fc.array(fc.oneof(fc.integer({ min: -30, max: 30 }), fc.double({ min: -1e6, max: 1e6, noNaN: true })), { minLength: at.length, maxLength: at.length })
  const motion = fc.tuple(fc.integer({ min: 1, max: 60 }), fc.integer({ min: -30, max: 30 }), fc.integer({ min: 0, max: 9 })).map(([speed, turn, salt]) =>
    at.map((frame, i) => {
      const t = (frame - 101) / 10
      const reading = t < 4 ? speed * t * t / 8 : 2 * speed + (t - 4) * (turn + speed)
      return Math.round(10 * reading + Math.sin(i * i + salt)) / 10
    }))
  return fc.oneof(wild, motion, motion).map(readings => at.map((frame, i) => ({ frame, reading: readings[i] as number })))
})

const LAWS = (Object.keys(MEASURES) as Law[]).filter(law => MEASURES[law].some(measure => measure !== 'point'))

const requests: fc.Arbitrary<ReadingCheck> = fc.tuple(
  keys, fc.constantFrom<ReadingCheck['measure']>('angle', 'distance', 'arc'), fc.constantFrom(0, 0.3, 1, 50), fc.constantFrom(0, 0.1, 0.5),
  fc.uniqueArray(fc.integer({ min: 90, max: 230 }), { minLength: 3, maxLength: 5 }),
  fc.array(fc.tuple(fc.nat(), fc.boolean(), fc.boolean()), { minLength: 4, maxLength: 4 }),
).map(([list, measure, slop, tolerance, ends, choices]) => {
  const laws = LAWS.filter(law => MEASURES[law].includes(measure))
  const order = [...ends].sort((a, b) => a - b)
  const spans = order.slice(1).map((to, i): Span => {
    const [which, contact, rest] = choices[i] ?? [0, false, false]
    const law = laws[which % laws.length] as Law
    return { from: order[i] as number, to, law, ...(contact ? { contact } : {}), ...(rest && law === 'odd-rule' ? { start: 'rest' as const } : {}) }
  })
  const request: ReadingCheck = {
    law: spans[0]?.law ?? 'steady', fps: 24, measure, unit: measure === 'angle' ? 'deg' : 'px', slop, tolerance, keys: list, spans,
  }
  if (measure === 'arc') request.radius = 300
  return request
})

function everyNumber(value: unknown, visit: (number: number) => void): void {
  if (typeof value === 'number') visit(value)
  else if (Array.isArray(value)) value.forEach(item => everyNumber(item, visit))
  else if (value && typeof value === 'object') Object.values(value).forEach(item => everyNumber(item, visit))
}

const outline = ({ verdict, findings, spans, joints }: CheckResult) => ({
  verdict, kinds: findings.map(({ kind }) => kind), spans: spans?.map(({ law, verdict: of }) => [law, of]), joints: joints?.map(({ holds }) => holds),
})

const later = (request: ReadingCheck, by: number): ReadingCheck => ({
  ...request,
  keys: request.keys.map(key => ({ ...key, frame: key.frame + by })),
  spans: Array.isArray(request.spans) ? request.spans.map(span => ({ ...span, from: span.from + by, to: span.to + by })) : request.spans,
})

describe('every answer on a divided list', () => {
  it('is finite, complete, and the same twice', () => {
    fc.assert(fc.property(requests, (request) => {
      // A claim is made before its lists: its joints need not be drawings of this one.
      const { keys: _keys, fps: _fps, ...claimed } = request
      expect(claim.safeParse(claimed).error?.issues).toBeUndefined()
      const result = judge(request)
      everyNumber(result, number => expect(Number.isFinite(number)).toBe(true))
      expect(result.keys.map(({ frame }) => frame)).toEqual(request.keys.map(({ frame }) => frame))
      expect(result.reason === null).toBe(result.verdict !== 'undecided')
      expect(result.joints).toHaveLength((result.spans?.length ?? 0) - 1)
      if (result.verdict === 'holds') {
        expect(result.findings).toEqual([])
        expect(result.keys.some(({ breaks }) => breaks)).toBe(false)
        expect(result.spans?.every(({ verdict }) => verdict === 'holds')).toBe(true)
      }
      if (result.verdict === 'breaks') expect(result.findings.length).toBeGreaterThan(0)
      for (const { text, frames: told } of result.findings) {
        expect(text).not.toMatch(/NaN|undefined|Infinity/)
        expect(told.length).toBeGreaterThan(0)
        for (const frame of told) expect(request.keys.some(key => key.frame === frame)).toBe(true)
      }
      expect(JSON.stringify(judge(request))).toBe(JSON.stringify(result))
    }), RUNS)
  })

  it('does not depend on which number the first frame has', () => {
    fc.assert(fc.property(requests, (request) => {
      expect(outline(judge(later(request, 5000)))).toEqual(outline(judge(request)))
    }), RUNS)
  })

  it('calls a joint broken exactly where it says so', () => {
    fc.assert(fc.property(requests, (request) => {
      const { joints, findings } = judge(request)
      const told = findings.filter(({ kind }) => kind === 'broken-joint').flatMap(({ frames: at }) => at)
      expect(told).toEqual(joints?.filter(({ holds }) => !holds).map(({ frame }) => frame))
    }), RUNS)
  })
})

describe('every search for joints', () => {
  const searches = requests.map(({ spans: _spans, ...request }): ReadingCheck => ({ ...request, spans: 'find' }))

  it('is finite, complete, and the same twice', () => {
    fc.assert(fc.property(searches, (request) => {
      const result = judge(request)
      everyNumber(result, number => expect(Number.isFinite(number)).toBe(true))
      expect(result.keys.map(({ frame }) => frame)).toEqual(request.keys.map(({ frame }) => frame))
      const spans = result.spans ?? []
      expect(spans.length).toBeGreaterThanOrEqual(1)
      expect(spans.length).toBeLessThanOrEqual(4)
      expect(spans[0]?.from).toBe(request.keys[0]?.frame)
      expect(spans[spans.length - 1]?.to).toBe(request.keys[request.keys.length - 1]?.frame)
      spans.slice(1).forEach(({ from }, i) => expect(from).toBe(spans[i]?.to))
      expect(JSON.stringify(judge(request))).toBe(JSON.stringify(result))
    }), { ...RUNS, numRuns: 40 })
  })

  it('does not depend on which number the first frame has', () => {
    fc.assert(fc.property(searches, (request) => {
      expect(outline(judge(later(request, 5000)))).toEqual(outline(judge(request)))
    }), { ...RUNS, numRuns: 40 })
  })
})
