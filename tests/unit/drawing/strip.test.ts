import { describe, expect, it } from 'vitest'
import { overlaps } from '~/utils/drawing/labels'
import { drawStrip, nearestSpot } from '~/utils/drawing/strip'
import type { StripClaim, StripKey } from '~/utils/drawing/strip'

const fall: StripClaim = { law: 'odd-rule', measure: 'distance', unit: 'px', slop: 1 }
const topple: StripClaim = { law: 'topple', measure: 'angle', unit: 'deg', slop: 0.3, subject: { shape: 'block', width: 6, height: 38 } }
const list = (count: number, reading: (i: number) => number, breaks: (i: number) => boolean = () => false): StripKey[] =>
  Array.from({ length: count }, (_, i) => ({
    frame: 1 + i,
    reading: reading(i) + (breaks(i) ? 9 : 0),
    law: reading(i),
    breaks: breaks(i),
    offset: breaks(i) ? 9 : 0,
    offsetFrames: breaks(i) ? 2.7 : 0,
    allowance: 1,
  }))
const strokes = (path: string) => path.split('M').length - 1

describe.each([320, 720, 1200])('a strip %d px wide', (width) => {
  it.each([
    ['fall', fall, list(40, (i) => i * i, (i) => i % 5 === 4)],
    ['topple', topple, list(40, (i) => (i * i) / 20, (i) => i % 5 === 4)],
    ['throw', fall, list(40, (i) => 400 - (i - 20) ** 2, (i) => i > 30)],
  ] as const)('writes words on a %s that touch nothing written', (_, claim, keys) => {
    const drawing = drawStrip(keys, claim, width)
    const words = [...drawing.frames, ...drawing.breaks]
    expect(drawing.breaks.length).toBeGreaterThan(0)
    for (const [i, a] of words.entries()) {
      expect(a.box.x).toBeGreaterThanOrEqual(0)
      expect(a.box.x + a.box.width).toBeLessThanOrEqual(width)
      expect(a.box.y).toBeGreaterThanOrEqual(0)
      expect(a.box.y + a.box.height).toBeLessThanOrEqual(drawing.height)
      for (const b of words.slice(i + 1)) expect(overlaps(a.box, b.box, 0)).toBe(false)
    }
  })
})

describe('a strip', () => {
  it('draws no late way of a dying bounce over its first', () => {
    // Nine ways there and back, each shorter than the one before.
    const turnsAt = [0, 200, 90, 200, 130, 200, 155, 200, 175, 200]
    const readings = turnsAt.flatMap((at, i) => (i === 0 ? [at] : [(turnsAt[i - 1]! + at) / 2, at]))
    const rows = drawStrip(list(readings.length, (i) => readings[i]!), fall, 720).spots.map(({ y }) => y)
    expect(new Set(rows).size).toBe(9)
    expect(rows).toEqual([...rows].sort((a, b) => a - b))
  })
  it('has one tick per drawing on either side, and moves breaking ones to their own stroke', () => {
    const drawing = drawStrip(list(12, (i) => i * i, (i) => i === 6), fall, 720)
    expect(strokes(drawing.posted)).toBe(11)
    expect(strokes(drawing.broken)).toBe(1)
    expect(strokes(drawing.law)).toBe(12)
    expect(drawing.breaks.map(({ text }) => text)).toEqual(['7 · 2.7 early'])
  })
  it('draws 2,000 drawings in paths, with few words, quickly', () => {
    const keys = list(2_000, (i) => (i / 2_000) ** 2 * 80, (i) => i % 9 === 0)
    const before = performance.now()
    const drawing = drawStrip(keys, topple, 720)
    // Some 20 ms on an idle machine; what must not come back is work that grows with the square of the list.
    expect(performance.now() - before).toBeLessThan(1_000)
    expect(drawing.frames.length).toBeLessThan(40)
    expect(strokes(drawing.posted) + strokes(drawing.broken)).toBe(2_000)
  })
  it('draws a list without a law: what was posted and nothing else', () => {
    const keys = list(3, (i) => i * 10).map((key) => ({ ...key, law: null }))
    const drawing = drawStrip(keys, topple, 720)
    expect(drawing.law).toBe('')
    expect(drawing.cursorAt(1)).toMatchObject({ law: null, lawBody: null })
  })
  it('gives the way down a line under the way up', () => {
    const drawing = drawStrip(list(9, (i) => 16 - (i - 4) ** 2), fall, 720)
    expect(drawing.spots[8]!.y).toBeGreaterThan(drawing.spots[0]!.y)
    expect(drawing.spots[8]!.x).toBeCloseTo(drawing.spots[0]!.x, 6)
  })
  it('finds the drawing under a pointer', () => {
    const drawing = drawStrip(list(12, (i) => i * i), fall, 720)
    const { x, y } = drawing.spots[7]!
    expect(nearestSpot(drawing.spots, { x: x + 3, y: y - 20 })).toBe(7)
    expect(nearestSpot([], { x, y })).toBe(-1)
  })
})
