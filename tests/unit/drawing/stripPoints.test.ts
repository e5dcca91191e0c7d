import { describe, expect, it } from 'vitest'
import { drawJoints } from '~/utils/drawing/joints'
import { overlaps } from '~/utils/drawing/labels'
import { pathShape } from '~/utils/drawing/pathShape'
import { drawStrip } from '~/utils/drawing/strip'
import type { StripClaim, StripKey } from '~/utils/drawing/strip'
import type { StripPaths } from '~/utils/drawing/stripLayout'
import type { Place } from '~/utils/motion/types'

const claim: StripClaim = { law: 'pendulum', measure: 'point', unit: 'px', slop: 1 }
const strokes = (path: string) => path.split('M').length - 1
const places = (path: string) => path.match(/-?[\d.]+ -?[\d.]+/g)!.map((pair) => pair.split(' ').map(Number) as [number, number])

/** A quarter of a circle about (300, 100), y down: from the left of the pivot to straight under it. */
const centre = { x: 300, y: 100 }
const onArc = (i: number, radius = 200): Place => ({ x: centre.x - radius * Math.cos((i * Math.PI) / 20), y: centre.y + radius * Math.sin((i * Math.PI) / 20) })
const arc = (radius: (i: number) => number = () => 200): StripKey[] =>
  Array.from({ length: 11 }, (_, i) => ({
    frame: i + 1, reading: i * 9, law: i * 9, breaks: radius(i) !== 200, point: onArc(i, radius(i)), lawPoint: onArc(i), offPath: radius(i) - 200, allowance: 3,
  }))
const circle: StripPaths = { path: { kind: 'circle', centre, radius: 200, given: false, nearlyStraight: false, zeroAt: 0, counts: 1, misfit: 0.1 } }

describe('the strip of points', () => {
  it('is to scale, with the pivot where the circle has it', () => {
    const drawing = drawStrip(arc(), claim, 720, false, circle)
    const [first, last] = [drawing.spots[0]!, drawing.spots.at(-1)!]
    const radius = Math.hypot(first.x - drawing.pivot!.x, first.y - drawing.pivot!.y)
    for (const spot of drawing.spots) expect(Math.hypot(spot.x - drawing.pivot!.x, spot.y - drawing.pivot!.y)).toBeCloseTo(radius, 6)
    expect(first.x).toBeLessThan(drawing.pivot!.x)
    expect(last.y).toBeGreaterThan(drawing.pivot!.y)
    expect([strokes(drawing.dots), strokes(drawing.law), drawing.posted]).toEqual([11, 11, ''])
    // The law's ticks cross the path at right angles: towards the pivot.
    expect(first.nx).toBeCloseTo(-1, 6)
  })
  it('draws y as posted: up where the list says so', () => {
    const rising = arc().map((key) => ({ ...key, point: { x: key.point!.x, y: -key.point!.y }, lawPoint: { x: key.lawPoint!.x, y: -key.lawPoint!.y } }))
    const up = drawStrip(rising, { ...claim, yAxis: 'up' }, 720, false, { path: { ...circle.path!, centre: { x: 300, y: -100 } } as StripPaths['path'] })
    const down = drawStrip(arc(), claim, 720, false, circle)
    up.spots.forEach((spot, i) => {
      expect(spot.x).toBeCloseTo(down.spots[i]!.x, 6)
      expect(spot.y).toBeCloseTo(down.spots[i]!.y, 6)
      expect(spot.ny).toBeCloseTo(down.spots[i]!.ny, 6)
    })
  })
  it('marks a drawing off the path by a shape of its own and a hair to the path', () => {
    const drawing = drawStrip(arc((i) => (i === 4 ? 224 : 200)), claim, 720, false, { ...circle, findings: [{ kind: 'off-path', frames: [5], amount: 24, text: '' }] })
    expect([strokes(drawing.offPath.rings), strokes(drawing.offPath.hairs), strokes(drawing.brokenDots)]).toEqual([1, 1, 1])
    expect(drawing.breaks.map(({ text }) => text)).toEqual(['5 · off the path'])
    const clean = drawStrip(arc(), claim, 720, false, circle)
    expect(clean.offPath).toEqual({ rings: '', hairs: '' })
  })
  it.each([290, 360, 720, 1200])('stays on a paper %d px wide', (width) => {
    for (const found of [circle, { path: null }, {}]) {
      const drawing = drawStrip(arc((i) => (i % 3 === 1 ? 230 : 200)), claim, width, false, found)
      for (const { x, y } of drawing.spots) {
        expect(x).toBeGreaterThan(0)
        expect(x).toBeLessThan(width)
        expect(y).toBeGreaterThan(0)
        expect(y).toBeLessThan(drawing.height)
      }
      const words = [...drawing.frames, ...drawing.breaks]
      words.forEach((a, i) => words.slice(i + 1).forEach((b) => expect(overlaps(a.box, b.box, 0)).toBe(false)))
    }
  })
  it('takes a list that never moves, and one without a law', () => {
    const still = arc().map((key) => ({ ...key, point: { x: 5, y: 5 }, lawPoint: null, law: null }))
    const drawing = drawStrip(still, claim, 720, false, {})
    expect(JSON.stringify(drawing.spots)).not.toMatch(/null|NaN/)
    expect(drawing.law).toBe('')
  })
  it('draws the parabola that was found, not the polygon of the drawings', () => {
    const path = { kind: 'parabola', apex: { x: 0, y: 0 }, bend: 0.01, misfit: 0 } as const
    const drawn = places(pathShape(path, [{ x: -100, y: 100 }, { x: 100, y: 100 }], (place) => place))
    for (const [x, y] of drawn) expect(y).toBeCloseTo(0.01 * x * x, 0)
    expect(Math.min(...drawn.map(([, y]) => y))).toBeCloseTo(0, 1)
  })
  it('leaves out the part of the circle that nothing runs along', () => {
    const quarter = places(pathShape(circle.path, arc().map(({ lawPoint }) => lawPoint!), (place) => place))
    for (const [x, y] of quarter) expect(Math.hypot(x - centre.x, y - centre.y)).toBeCloseTo(200, 0)
    expect(Math.max(...quarter.map(([x]) => x))).toBeLessThan(320)
  })
})

describe('where spans meet', () => {
  const span = { contact: false, verdict: 'holds', reason: null, misfit: 0.3, readsAs: [], size: null, figures: [] } as const
  const found = (contact: boolean, holds: boolean): StripPaths => ({
    spans: [
      { ...span, readsAs: [], figures: [], from: 1, to: 20, law: 'slow-in', contact },
      { ...span, readsAs: [], figures: [], from: 20, to: 40, law: 'steady' },
    ],
    joints: [{ frame: 20, contact, before: 3, after: 3, apart: 0, holds }],
  })
  const list: StripKey[] = Array.from({ length: 40 }, (_, i) => ({ frame: i + 1, reading: i * 3, law: i * 3, breaks: false }))
  const fall: StripClaim = { law: 'slow-in', measure: 'distance', unit: 'px', slop: 1 }

  it.each([
    ['plain', false, true, ['plain']],
    ['a contact', true, true, ['contact', 'wedges']],
    ['broken', false, false, ['broken', 'lozenges']],
    ['a broken contact', true, false, ['broken', 'lozenges']],
  ] as const)('a joint that is %s has strokes of its own, on strip, curve and gaps', (_, contact, holds, drawn) => {
    const signs = ['plain', 'contact', 'wedges', 'broken', 'lozenges'] as const
    const strip = drawStrip(list, fall, 720, false, found(contact, holds))
    expect(signs.filter((sign) => strip.joints[sign] !== '')).toEqual(drawn)
    expect(strip.joints.words.map(({ text }) => text)).toEqual(['slow in ¦ steady'])
    const curve = drawJoints(found(contact, holds), (frame) => frame * 15, 20, 200, 10)
    expect(signs.filter((sign) => curve[sign] !== '')).toEqual(drawn)
    expect(curve.words.map(({ text }) => text).sort()).toEqual(['slow in', 'steady'])
  })
  it('keeps the sign of a broken joint on the paper', () => {
    const { joints } = drawStrip(list, fall, 720, false, found(false, false))
    const top = Number(/^M\S+ (\S+?)(?=[a-zA-Z])/.exec(joints.lozenges)![1])
    expect(top).toBeGreaterThanOrEqual(0)
  })
  it('lets the first of a run of breaking points speak for it', () => {
    const points = list.map((key, i) => ({ ...key, point: { x: i * 3, y: i * i }, breaks: i === 4 || (i >= 20 && i < 30) }))
    const { breaks } = drawStrip(points, { ...fall, measure: 'point' }, 720)
    expect(breaks.map(({ item }) => item).sort((a, b) => a - b)).toEqual([4, 20])
  })
  it('writes nothing where there is one law', () => {
    expect(drawStrip(list, fall, 720).joints.words).toEqual([])
    expect(drawJoints({}, (frame) => frame, 0, 100, 10).words).toEqual([])
  })
})
