import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { frameTicks, nearest, paddedRange, readingTicks, tickDecimals } from '~/utils/drawing/axis'
import { drawCurve } from '~/utils/drawing/curve'
import { brokenRunsPath, drawGaps, gapsOf, thinGaps } from '~/utils/drawing/gaps'
import { keyTable } from '~/utils/drawing/keyRows'
import { textWidth } from '~/utils/drawing/labels'
import { frameScale } from '~/utils/drawing/plot'
import { sizeRuler } from '~/utils/drawing/sizeRuler'
import type { JudgedKey } from '~/utils/motion/types'

const key = (frame: number, reading: number, law: number, breaks = false): JudgedKey => ({
  frame,
  reading,
  law,
  offset: reading - law,
  offsetFrames: breaks ? 2.71 : 0,
  gap: null,
  lawGap: null,
  allowance: 1,
  breaks,
})
const linked = (keys: JudgedKey[]): JudgedKey[] =>
  keys.map((one, i) => {
    const next = keys[i + 1]
    return next ? { ...one, gap: next.reading - one.reading, lawGap: next.law! - one.law! } : one
  })
const fall = linked([key(1, 0, 0), key(3, 4, 4), key(5, 26, 16, true), key(7, 36, 36), key(9, 64, 64)])

describe('rulers', () => {
  it('numbers frames from the first to the last without crowding', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 2_000 }),
        fc.integer({ min: 1, max: 5_000 }),
        fc.integer({ min: 240, max: 1_400 }),
        (first, span, width) => {
          const ticks = frameTicks(first, first + span, width)
          expect(ticks[0]).toBe(first)
          expect(ticks.at(-1)).toBe(first + span)
          const room = textWidth(String(first + span))
          ticks.slice(1).forEach((tick, i) => expect(((tick - ticks[i]!) / span) * width).toBeGreaterThan(room))
        },
      ),
    )
  })
  it('rules degrees by the protractor', () => {
    expect(readingTicks(0, 90, 5, 'deg')).toEqual([0, 30, 60, 90])
    expect(readingTicks(-110, 110, 5, 'deg')).toEqual([-90, -45, 0, 45, 90])
    expect(tickDecimals([0, 0.5, 1])).toBe(1)
  })
  it('keeps zero in sight where the list starts near it, and opens a list that stands still', () => {
    expect(paddedRange([1.5, 80])[0]).toBe(0)
    expect(paddedRange([4, 4])).toEqual([3, 5])
    expect(paddedRange([])).toEqual([0, 1])
  })
  it('finds the nearest frame', () => {
    expect([-5, 0, 3.9, 4.2, 99].map((at) => nearest([1, 3, 5, 7], at))).toEqual([0, 0, 1, 2, 3])
    expect(nearest([], 3)).toBe(-1)
  })
  it('reads back the frame that it places', () => {
    const scale = frameScale([1001, 1013, 1049], 720)
    expect(scale.invert(scale.at(1013))).toBeCloseTo(1013, 9)
  })
})

describe('curve', () => {
  const { at } = frameScale([1, 9], 500)
  it('sets a cross where a drawing breaks, dots elsewhere, and a hair to the line', () => {
    const curve = drawCurve(fall, at, 20, 220)
    expect(curve.dots.split('M')).toHaveLength(5)
    expect(curve.crosses.split('M')).toHaveLength(3)
    expect(curve.strays).toContain('V')
    expect(curve.y(64)).toBeLessThan(curve.y(0))
  })
  it('hatches from half-way before to half-way after', () => {
    const [from, to] = brokenRunsPath(fall, at, 0, 10).match(/[\d.]+(?= 0H)|(?<=H)[\d.]+(?=V)/g)!.map(Number)
    expect(from).toBeCloseTo(at(4), 0)
    expect(to).toBeCloseTo(at(6), 0)
  })
})

describe('gaps', () => {
  it('breaks on both sides of a misplaced drawing and nowhere else', () => {
    expect(gapsOf(fall).map(({ from, broken }) => [from, broken])).toEqual([
      [1, false],
      [3, true],
      [5, true],
      [7, false],
    ])
  })
  it('keeps the fault when it thins', () => {
    const many = Array.from({ length: 400 }, (_, i) => ({ from: i, to: i + 1, posted: 1, law: 1, broken: i === 257 }))
    const thin = thinGaps(many, 40)
    expect(thin).toHaveLength(10)
    expect(thin.filter(({ broken }) => broken)).toHaveLength(1)
  })
  it('draws gaps that run back below the line', () => {
    const back = linked([key(1, 10, 10), key(2, 5, 5), key(3, 0, 0)])
    const drawing = drawGaps(back, frameScale([1, 3], 500).at, 440, 0, 100)
    expect(drawing.low).toBe(-5)
    expect(drawing.zero).toBe(0)
  })
})

describe('key table', () => {
  const said = (table: ReturnType<typeof keyTable>, index: number) => Object.fromEntries(table.columns.map(({ head }, i) => [head, table.row(index).cells[i]]))

  it('writes figures with a true minus and the finding in words', () => {
    const table = keyTable({ keys: fall, findings: [{ kind: 'misplaced', frames: [5], amount: 10, text: '' }] }, 'px')
    expect(table.row(2)).toMatchObject({ frame: 5, breaks: true })
    expect(said(table, 2)).toMatchObject({ 'off by px': '+10.0', 'off by, frames': '+2.7', finding: '✕ misplaced, 2.7 early' })
    expect(said(table, 1)).toMatchObject({ 'off by px': '0.0', finding: '' })
    expect(said(table, 4)['gap px']).toBe('–')
  })
  it('has columns for points only where there are points, and for going sideways only of a flight', () => {
    const heads = (keys: JudgedKey[]) => keyTable({ keys, findings: [] }, 'deg', 'px').columns.map(({ head }) => head)
    expect(heads(fall).join()).not.toMatch(/x px|off the path|sideways/)
    const points = fall.map((one) => ({ ...one, point: { x: one.reading, y: 2 }, lawPoint: { x: one.law!, y: 2 }, offPath: 0.4 }))
    expect(heads(points)).toEqual(expect.arrayContaining(['x px', 'y px', 'posted °', 'off the path px']))
    expect(heads(points).join()).not.toContain('sideways')
    const flight = points.map((one) => ({ ...one, sideways: { reading: 1, law: 1, offset: 0, breaks: false } }))
    expect(heads(flight)).toEqual(expect.arrayContaining(['down °', 'sideways px', 'law sideways px']))
  })
  it('marks where spans meet, a contact by a sign of its own', () => {
    const joint = { before: 1, after: 1, apart: 0, holds: true }
    const table = keyTable({ keys: fall, findings: [], joints: [{ ...joint, frame: 3, contact: false }, { ...joint, frame: 7, contact: true }] }, 'px')
    expect([said(table, 1).finding, said(table, 3).finding]).toEqual(['¦ joint', '▾ contact'])
  })
})

describe('size ruler', () => {
  it('never lets its words touch, however near the two sizes are', () => {
    for (const width of [290, 640, 1100])
      for (const claimed of [0.03, 8, 8.3, 38, 100, 4_000]) {
        const ruler = sizeRuler({ value: 8.2, low: 7.8, high: 8.6, unit: 'm' }, claimed, width)
        const apart = Math.abs(ruler.reads.labelAt - ruler.claimed!.labelAt)
        expect(apart).toBeGreaterThanOrEqual((textWidth(ruler.reads.text, 12, true) + textWidth(ruler.claimed!.text, 12, true)) / 2)
        expect(ruler.claimed!.at).toBeGreaterThanOrEqual(0)
        expect(ruler.claimed!.at).toBeLessThanOrEqual(width)
      }
  })
  it('says how far apart what it reads as and what was claimed lie, once they do', () => {
    const apart = (claimed: number | null) => sizeRuler({ value: 8.2, low: 7.8, high: 8.6, unit: 'm' }, claimed, 640).apart?.text
    expect([38, 2, 8.5, null].map(apart)).toEqual(['4.6 times too small', '4.1 times too large', undefined, undefined])
  })
  it('goes by ratio: four times the size, the same step', () => {
    const { x } = sizeRuler({ value: 1, low: 0.9, high: 1.1, unit: 'm' }, null, 500)
    expect(x(4) - x(1)).toBeCloseTo(x(40) - x(10), 6)
  })
})
