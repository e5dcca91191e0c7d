/** What must be true of every answer to a list of points, whatever the list. */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { judge, judgeInDepth } from '../../../utils/motion'
import type { CheckResult, PointCheck, PointKey } from '../../../utils/motion'
import { likely, numbersOf, requests } from './pointArbitraries'

const RUNS = { numRuns: 150, seed: 4713 }

/** What is told, and how much, without the readings. Sizes to a millionth: a turned or shifted drawing rounds its last bits anew. */
function outline({ verdict, findings, readsAs, size }: CheckResult) {
  return {
    verdict, found: findings.map(({ kind, frames }) => ({ kind, frames })), reads: readsAs.map(({ law }) => law),
    size: size && Number(size.value.toPrecision(6)),
  }
}

const mapped = (request: PointCheck, map: (place: { x: number, y: number }) => { x: number, y: number }): PointCheck => ({
  ...request,
  keys: request.keys.map((key): PointKey => ({ frame: key.frame, ...map(key) })),
  ...(request.pivot && { pivot: map(request.pivot) }),
})

describe('any list of points', () => {
  it('never throws, never answers NaN, tells only frames that are there, and answers the same twice', () => {
    fc.assert(fc.property(requests, (request) => {
      const result = judge(request)
      expect(numbersOf(result).some(Number.isNaN)).toBe(false)
      expect(numbersOf([result.keys, result.path, result.ruled, result.ruledPoints]).every(Number.isFinite)).toBe(true)
      expect(result.keys.map(key => key.frame)).toEqual(request.keys.map(key => key.frame))
      if (result.verdict === 'holds') {
        expect(result.findings).toEqual([])
        expect(result.keys.some(key => key.breaks)).toBe(false)
      }
      if (result.verdict === 'breaks') expect(result.findings.length).toBeGreaterThan(0)
      for (const { frames, text } of result.findings) {
        expect(text).not.toMatch(/NaN|undefined|Infinity/)
        for (const frame of frames) expect(request.keys.some(key => key.frame === frame)).toBe(true)
      }
      expect(JSON.stringify(judge(request))).toBe(JSON.stringify(result))
    }), RUNS)
  })

  it('draws the same places that it judged by', () => {
    fc.assert(fc.property(requests, (request) => {
      const { placesAt, result } = judgeInDepth(request)
      if (!placesAt) return
      placesAt(request.keys.map(key => key.frame)).forEach(({ x, y }, i) => {
        const law = result.keys[i]?.lawPoint
        const room = 1e-6 * (1 + Math.abs(x) + Math.abs(y))
        expect(Math.abs(x - (law?.x ?? NaN))).toBeLessThanOrEqual(room)
        expect(Math.abs(y - (law?.y ?? NaN))).toBeLessThanOrEqual(room)
      })
    }), RUNS)
  })

  it('is the same whichever way y counts', () => {
    fc.assert(fc.property(requests, (request) => {
      const other: PointCheck = { ...mapped(request, ({ x, y }) => ({ x, y: -y + 0 })), yAxis: request.yAxis === 'up' ? 'down' : 'up' }
      const [here, there] = [judge(request), judge(other)]
      expect(outline(there)).toEqual(outline(here))
      expect(there.keys.map(key => key.reading)).toEqual(here.keys.map(key => key.reading))
    }), RUNS)
  })

  it('is the same for a drawing and its mirror image', () => {
    fc.assert(fc.property(likely, (request) => {
      expect(outline(judge(mapped(request, ({ x, y }) => ({ x: -x + 0, y }))))).toEqual(outline(judge(request)))
    }), RUNS)
  })

  it('does not depend on where on the sheet the drawing sits, nor on the first frame’s number', () => {
    fc.assert(fc.property(likely, fc.integer({ min: -5000, max: 5000 }), (request, far) => {
      const moved = mapped(request, ({ x, y }) => ({ x: x + far, y: y - 3 * far }))
      const later = { ...moved, keys: moved.keys.map(key => ({ ...key, frame: key.frame + 700 })) }
      const there = outline(judge(later))
      expect({ ...there, found: there.found.map(({ kind, frames }) => ({ kind, frames: frames.map(frame => frame - 700) })) }).toEqual(outline(judge(request)))
    }), RUNS)
  })

  it('does not depend on the drawing unit', () => {
    fc.assert(fc.property(likely, (request) => {
      // A power of two scales every number exactly.
      const large = { ...mapped(request, ({ x, y }) => ({ x: 8 * x, y: 8 * y })), slop: 8 * request.slop }
      const [plain, other] = [outline(judge(request)), outline(judge(large))]
      expect({ ...other, size: null }).toEqual({ ...plain, size: null })
    }), RUNS)
  })

  it('does not depend on how a line or a spin is turned on the sheet', () => {
    fc.assert(fc.property(likely, fc.double({ min: 0.1, max: 6, noNaN: true }), (request, angle) => {
      if (!['steady', 'spin'].includes(request.law)) return
      const [c, s] = [Math.cos(angle), Math.sin(angle)]
      const turned = mapped(request, ({ x, y }) => ({ x: c * x - s * y, y: s * x + c * y }))
      expect(outline(judge(turned)).found).toEqual(outline(judge(request)).found)
    }), RUNS)
  })
})
