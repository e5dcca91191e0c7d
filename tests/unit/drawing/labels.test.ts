import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { overlaps, placeLabels, spreadOrder, spreadRow, textWidth } from '~/utils/drawing/labels'

const bounds = { x: 0, y: 0, width: 400, height: 120 }
const place = (x: number, y: number) => ({ x, y, anchor: 'middle' as const })

describe('placeLabels', () => {
  it('never lets two labels touch, nor one leave the paper', () => {
    const spot = fc.record({ x: fc.integer({ min: -50, max: 450 }), y: fc.integer({ min: -20, max: 140 }) })
    fc.assert(
      fc.property(fc.array(spot, { maxLength: 40 }), (spots) => {
        const placed = placeLabels(
          spots.map(({ x, y }, i) => ({ item: i, text: `frame ${i}`, places: [place(x, y), place(x, y - 20)] })),
          bounds,
        )
        for (const [i, a] of placed.entries()) {
          expect(a.box.x).toBeGreaterThanOrEqual(bounds.x)
          expect(a.box.x + a.box.width).toBeLessThanOrEqual(bounds.width)
          expect(a.box.y + a.box.height).toBeLessThanOrEqual(bounds.height)
          for (const b of placed.slice(i + 1)) expect(overlaps(a.box, b.box, 0)).toBe(false)
        }
      }),
    )
  })
  it('places the first asked for and moves the second to its other place', () => {
    const [first, second] = placeLabels(
      [
        { item: 'a', text: '61 · 2.7 early', places: [place(200, 60)] },
        { item: 'b', text: '63 · 1.1 early', places: [place(210, 60), place(210, 40)] },
      ],
      bounds,
    )
    expect(first).toMatchObject({ item: 'a', y: 60 })
    expect(second).toMatchObject({ item: 'b', y: 40 })
  })
  it('leads no hair across another label, and sets no label across a hair', () => {
    const hair = { x: 199, y: 30, width: 2, height: 40 }
    const high = { item: 'high', text: '63', places: [{ ...place(200, 28), hair }] }
    const low = { item: 'low', text: '61 · 2.7 early', places: [place(200, 60)] }
    expect(placeLabels([high, low], bounds).map(({ item }) => item)).toEqual(['high'])
    expect(placeLabels([low, high], bounds).map(({ item }) => item)).toEqual(['low'])
  })
  it('keeps clear of obstacles and leaves out what fits nowhere', () => {
    const wall = [{ x: 0, y: 0, width: 400, height: 120 }]
    expect(placeLabels([{ item: 1, text: '61', places: [place(200, 60)] }], bounds, wall)).toEqual([])
  })
})

describe('spreadOrder', () => {
  it('names every position once, both ends first', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 500 }), (count) => {
        const order = spreadOrder(count)
        expect([...order].sort((a, b) => a - b)).toEqual(Array.from({ length: count }, (_, i) => i))
        if (count > 1) expect(order.slice(0, 2)).toEqual([0, count - 1])
      }),
    )
  })
})

describe('spreadRow', () => {
  it('keeps two labels apart, inside, and in order', () => {
    const position = fc.double({ min: 0, max: 320, noNaN: true })
    fc.assert(
      fc.property(position, position, (a, b) => {
        const [x, y] = spreadRow([{ x: a, width: 90 }, { x: b, width: 110 }], 0, 320) as [number, number]
        expect(Math.abs(x - y)).toBeGreaterThanOrEqual(100 - 1e-9)
        expect(Math.min(x - 45, y - 55)).toBeGreaterThanOrEqual(-1e-9)
        expect(Math.max(x + 45, y + 55)).toBeLessThanOrEqual(320 + 1e-9)
        if (a !== b) expect(Math.sign(x - y)).toBe(Math.sign(a - b))
      }),
    )
  })
})

it('takes East Asian letters as wide as they are high', () => {
  expect(textWidth('王', 12)).toBe(12)
  expect(textWidth('a', 12)).toBeLessThan(8)
})
