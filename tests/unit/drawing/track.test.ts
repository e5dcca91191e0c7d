import { describe, expect, it } from 'vitest'
import { bodyPath } from '~/utils/drawing/body'
import { arcTrack, degreesOf, lineTrack } from '~/utils/drawing/track'

const margins = { top: 40, right: 40, bottom: 20, left: 40 }

describe('degreesOf', () => {
  it('adds the angle that zero stands for', () => {
    expect(degreesOf({ measure: 'angle', zeroAt: 12 }, 30)).toBe(42)
  })
  it('turns a way along the arc into degrees', () => {
    expect(degreesOf({ measure: 'arc', radius: 200 }, (Math.PI / 2) * 200)).toBeCloseTo(90, 10)
  })
  it('has none for a straight way', () => {
    expect(degreesOf({ measure: 'distance' }, 30)).toBeNull()
  })
})

describe('lineTrack', () => {
  it('keeps the spacing true', () => {
    const track = lineTrack([0, 10, 40], 500, 50)
    expect([0, 10, 40].map(track.x)).toEqual([50, 150, 450])
  })
  it('sets a list that never moves in the middle', () => {
    expect(lineTrack([7, 7, 7], 500, 50).x(7)).toBe(250)
  })
})

describe('arcTrack', () => {
  it.each([
    [0, 90, false],
    [-40, 40, true],
    [-109, 109, true],
    [0, 130, false],
    [-360, 380, true],
  ])('keeps the arc from %d° to %d° and its pivot on the paper', (from, to, hangs) => {
    for (const width of [320, 720, 1200]) {
      const track = arcTrack(from, to, hangs, { width, height: 320 }, margins)
      for (let angle = from; angle <= to; angle += 5) {
        const { x, y } = track.spot(angle, track.radius)
        expect(x).toBeGreaterThanOrEqual(margins.left - 1e-6)
        expect(x).toBeLessThanOrEqual(width - margins.right + 1e-6)
        expect(y).toBeGreaterThanOrEqual(margins.top - 1e-6)
        expect(y).toBeLessThanOrEqual(320 - margins.bottom + 1e-6)
      }
    }
  })
  it('measures a topple from upright and a pendulum from hanging, both to the right', () => {
    const up = arcTrack(0, 90, false, { width: 400, height: 300 }, margins)
    expect(up.spot(0, 100)).toMatchObject({ x: up.pivot.x, y: up.pivot.y - 100 })
    expect(up.spot(90, 100).x).toBeCloseTo(up.pivot.x + 100, 9)
    const down = arcTrack(-45, 45, true, { width: 400, height: 300 }, margins)
    expect(down.spot(0, 100)).toMatchObject({ x: down.pivot.x, y: down.pivot.y + 100 })
    expect(down.spot(30, 100).x).toBeGreaterThan(down.pivot.x)
  })
})

describe('bodyPath', () => {
  const track = arcTrack(0, 90, false, { width: 400, height: 300 }, margins)
  const corners = (path: string) =>
    path
      .replace(/[MZ]/g, '')
      .split('L')
      .map((pair) => pair.split(' ').map(Number) as [number, number])

  it('stands a block square on the floor where its lean is minus atan(w/h)', () => {
    const standing = (-Math.atan2(6, 38) * 180) / Math.PI
    const block = corners(bodyPath({ shape: 'block', width: 6, height: 38 }, standing, 150, track, 1))
    const scale = 150 / Math.hypot(6, 38)
    const { x, y } = track.pivot
    const wanted = [
      [x, y],
      [x, y - 38 * scale],
      [x - 6 * scale, y - 38 * scale],
      [x - 6 * scale, y],
    ]
    block.forEach(([cx, cy], i) => {
      expect(cx).toBeCloseTo(wanted[i]![0]!, 0)
      expect(cy).toBeCloseTo(wanted[i]![1]!, 0)
    })
  })
  it('lays it on its side at a quarter turn from there', () => {
    const lying = 90 - (Math.atan2(6, 38) * 180) / Math.PI
    const block = corners(bodyPath({ shape: 'block', width: 6, height: 38 }, lying, 150, track, 1))
    const lowest = block.map(([, y]) => y).sort((a, b) => b - a)
    expect(lowest[0]).toBeCloseTo(track.pivot.y, 0)
    expect(lowest[1]).toBeCloseTo(track.pivot.y, 0)
  })
  it('mirrors a body that falls to the left', () => {
    const right = corners(bodyPath({ shape: 'block', width: 1, height: 2 }, 30, 100, track, 1))
    const left = corners(bodyPath({ shape: 'block', width: 1, height: 2 }, -30, 100, track, -1))
    right.forEach(([x, y], i) => {
      expect(left[i]![0]).toBeCloseTo(2 * track.pivot.x - x, 0)
      expect(left[i]![1]).toBeCloseTo(y, 0)
    })
  })
})
