/** Lists of points, regime by regime: the path found, readings along it, the findings in their words. */
import { describe, expect, it } from 'vitest'
import { judge, judgeInDepth, lawCurve, plannedFlight } from '../../../utils/motion'
import type { Law, PointCheck, PointKey } from '../../../utils/motion'

type At = (t: number) => [number, number]

const request = (law: Law, at: At, more: Partial<PointCheck> = {}, count = 20): PointCheck => ({
  law, measure: 'point', fps: 24, unit: 'px', slop: 1, tolerance: 0.1,
  keys: Array.from({ length: count }, (_, i) => {
    const [x, y] = at(i / (count - 1))
    return { frame: 1001 + i, x, y }
  }),
  ...more,
})

/** On a circle about (400, 300), y down: `angle` degrees clockwise from straight up, as it looks on a screen. */
const around = (angle: number, radius = 200): [number, number] =>
  [400 + radius * Math.sin(angle * Math.PI / 180), 300 - radius * Math.cos(angle * Math.PI / 180)]

const changed = (list: PointCheck, at: number, change: (key: PointKey) => Partial<PointKey>): PointCheck =>
  ({ ...list, keys: list.keys.map((key, i) => (i === at ? { ...key, ...change(key) } : key)) })

describe('along a line', () => {
  const list = request('odd-rule', t => [100 + 300 * t * t, 50 + 400 * t * t])

  it('counts distance from the first drawing, the way it goes', () => {
    const { path, reads, keys, verdict } = judge(list)
    expect(verdict).toBe('holds')
    expect(reads).toEqual({ measure: 'distance', unit: 'px' })
    expect(path?.kind).toBe('line')
    expect(keys[0]!.reading).toBeCloseTo(0, 9)
    expect(keys.at(-1)!.reading).toBeCloseTo(500, 9)
    if (path?.kind !== 'line') throw new Error('no line')
    expect([path.from.x, path.from.y, path.to.x, path.to.y].map(Math.round)).toEqual([100, 50, 400, 450])
  })

  it('puts the law’s readings back on the drawing', () => {
    const { keys, ruledPoints } = judge(list)
    keys.forEach(({ point, lawPoint }) => {
      expect(lawPoint!.x).toBeCloseTo(point!.x, 6)
      expect(lawPoint!.y).toBeCloseTo(point!.y, 6)
    })
    expect(ruledPoints!.fit.map(({ frame }) => frame)).toEqual(list.keys.map(({ frame }) => frame))
  })

  it('tells a drawing off the line once, with its distance', () => {
    // Square to (3, 4)/5, 20 px to the left of the way down and right.
    const off = judge(changed(list, 9, ({ x, y }) => ({ x: x + 16, y: y - 12 })))
    expect(off.findings).toHaveLength(1)
    expect(off.findings[0]).toMatchObject({ kind: 'off-path', frames: [1010] })
    expect(off.findings[0]!.amount).toBeCloseTo(20, 6)
    expect(off.findings[0]!.text).toBe('Frame 1010 sits 20.0 px off the line of action.')
    // On a screen, going down and right, the left hand points up and right.
    expect(off.keys[9]!.offPath).toBeCloseTo(20, 6)
    expect(off.keys[9]!.breaks).toBe(true)
  })

  it('tells a drawing early on the line as misplaced, not as off it', () => {
    const { findings } = judge(changed(list, 9, ({ x, y }) => ({ x: x + 12, y: y + 16 })))
    expect(findings.map(({ kind, frames }) => [kind, frames])).toEqual([['misplaced', [1010]]])
  })

  it('tells a drawing that is off both ways once, by the worse', () => {
    const mostlyOff = judge(changed(list, 9, ({ x, y }) => ({ x: x + 16 * 2 + 6, y: y - 12 * 2 + 8 })))
    expect(mostlyOff.findings.map(({ kind }) => kind)).toEqual(['off-path'])
    const mostlyEarly = judge(changed(list, 9, ({ x, y }) => ({ x: x + 12 * 2 + 8, y: y + 16 * 2 - 6 })))
    expect(mostlyEarly.findings.map(({ kind }) => kind)).toEqual(['misplaced'])
  })

  it('reads the drawn slope as the slope, and no gravity off a level line', () => {
    // 500 px of travel in (19/24)² s² is a = 1595 px/s²; along a slope of asin 0.8 that is 0.8 g: 203.4 px/m.
    const a = 2 * 500 / (19 / 24) ** 2
    expect(judge(list).size?.value).toBeCloseTo(a / (0.8 * 9.80665), 3)
    expect(judge({ ...list, subject: { slope: 90 } }).size?.value).toBeCloseTo(a / 9.80665, 3)
    expect(judge(request('odd-rule', t => [500 * t * t, 80])).size).toBeNull()
  })

  it('contradicts a claimed scale along the drawn slope', () => {
    const scale = 2 * 500 / (19 / 24) ** 2 / (0.8 * 9.80665)
    expect(judge({ ...list, subject: { unitsPerMetre: scale } }).findings).toEqual([])
    expect(judge({ ...list, subject: { unitsPerMetre: 3 * scale } }).findings.map(({ kind }) => kind)).toEqual(['wrong-scale'])
  })

  it('says once that a bow is no line, and takes it for an arc where the claim leaves that open', () => {
    const bow = request('steady', t => around(-40 + 80 * t))
    const asLine = judge({ ...bow, path: 'line' })
    expect(asLine.findings.map(({ kind, frames }) => [kind, frames])).toEqual([['off-path', []]])
    expect(asLine.size).toBeNull()
    const open = judge(bow)
    expect(open.verdict).toBe('holds')
    expect(open.path).toMatchObject({ kind: 'circle', nearlyStraight: false, given: false })
  })

  it('says that a nearly straight arc is one', () => {
    const { path } = judge(request('steady', t => around(-2 + 4 * t, 300), { path: 'circle' }))
    expect(path).toMatchObject({ kind: 'circle', nearlyStraight: true })
  })
})

describe('about a pivot', () => {
  const even = (from: number, to: number) => (t: number) => around(from + (to - from) * t)

  it.each([['given', { pivot: { x: 400, y: 300 } }], ['fitted', {}]])('reads a swing from hanging rest, signed, with the pivot %s', (_name, more) => {
    const swing = request('pendulum', t => around(180 - 40 * Math.cos(5 * t)), more, 30)
    const { keys, path, reads } = judge(swing)
    expect(reads).toEqual({ measure: 'angle', unit: 'deg' })
    // 40° to the left of hanging rest on a screen is 180° + 40° clockwise from up; to the right is positive.
    expect(keys[0]!.reading).toBeCloseTo(40, 4)
    expect(Math.min(...keys.map(key => key.reading))).toBeLessThan(-39)
    if (path?.kind !== 'circle') throw new Error('no circle')
    expect(path.centre.x).toBeCloseTo(400, 4)
    expect(path.radius).toBeCloseTo(200, 4)
    expect(path.given).toBe('pivot' in more)
  })

  it.each([[1], [-1]])('reads a topple from upright, growing the way it falls (%d)', (side) => {
    const { keys, path } = judge(request('topple', t => around(side * (5 + 70 * t * t))))
    expect(keys[0]!.reading).toBeCloseTo(5, 6)
    expect(keys.at(-1)!.reading).toBeCloseTo(75, 6)
    // Reading 0 stands straight up: −90° from the x axis where y counts down; to the right is clockwise, which is towards y.
    expect(path).toMatchObject({ kind: 'circle', counts: side })
    if (path?.kind === 'circle') expect(path.zeroAt).toBeCloseTo(-90, 6)
  })

  it('counts a spin on and on, past full turns', () => {
    const { keys, verdict } = judge(request('spin', even(30, 30 + 3 * 360), {}, 40))
    expect(verdict).toBe('holds')
    expect(keys.at(-1)!.reading - keys[0]!.reading).toBeCloseTo(3 * 360, 6)
  })

  it('turns slop into degrees by the radius', () => {
    const { keys } = judge(request('spin', even(0, 90), { tolerance: 0 }))
    for (const key of keys) expect(key.allowance).toBeCloseTo(180 / Math.PI / 200, 9)
  })

  it('tells drawings that turn about another point than the given pivot', () => {
    const { findings } = judge(request('spin', even(0, 200), { pivot: { x: 430, y: 300 } }))
    expect(findings.map(({ kind, frames }) => [kind, frames])).toEqual([['off-path', []]])
    expect(findings[0]!.text).toMatch(/given pivot/)
  })

  it('tells a straight line for what it is, and asks for the pivot of an arc too short to show it', () => {
    const straight = judge(request('pendulum', t => [500 * t, 200 * t]))
    expect(straight.verdict).toBe('breaks')
    expect(straight.findings[0]!.text).toMatch(/straight line/)
    const noisy = (t: number): [number, number] => {
      const [x, y] = around(4 * t, 300)
      return [Math.round(x), Math.round(y)]
    }
    const short = judge(request('topple', noisy, { slop: 1.5 }))
    expect(short.verdict).toBe('undecided')
    expect(short.reason).toMatch(/pivot/)
  })
})

describe('a flight', () => {
  const plan = { subject: { unitsPerMetre: 100 }, throw: { speed: 9, angle: 50 }, drop: 1, fps: 24, exposure: 1, step: 0.5, firstFrame: 1001 }
  const thrown: PointCheck = { law: 'flight', measure: 'point', fps: 24, unit: 'px', slop: 1, tolerance: 0.1, keys: plannedFlight(plan).keys }

  it('holds with one gravity for the list, and says which', () => {
    const { verdict, findings, size, figures, path, readsAs } = judge({ ...thrown, subject: { unitsPerMetre: 100 } })
    expect([verdict, findings]).toEqual(['holds', []])
    expect(readsAs[0]?.law).toBe('flight')
    expect(size?.unit).toBe('m/s²')
    expect(size!.low).toBeLessThan(9.80665)
    expect(size!.high).toBeGreaterThan(9.80665)
    expect(figures).toEqual([expect.objectContaining({ kind: 'gravity', unit: 'm/s²' })])
    // y = g x²/(2 vₓ²) below the apex, in units: bend = g/(2 vₓ²)/scale, positive where y counts down.
    const sideways = 9 * Math.cos(50 * Math.PI / 180)
    if (path?.kind !== 'parabola') throw new Error('no parabola')
    expect(path.bend).toBeCloseTo(9.80665 / (2 * sideways ** 2) / 100, 4)
    const apex = plannedFlight(plan).apex!
    expect(Math.hypot(path.apex.x - apex.x, path.apex.y - apex.y)).toBeLessThan(1)
  })

  it('counts down positive whatever y counts, and sideways beside it', () => {
    const up = { ...thrown, yAxis: 'up' as const, keys: thrown.keys.map(({ frame, x, y }) => ({ frame, x, y: -y })) }
    const [here, there] = [judge(thrown), judge(up)]
    expect(there.keys.map(key => key.reading)).toEqual(here.keys.map(key => key.reading))
    expect(here.keys[0]!.reading).toBe(0)
    expect(here.keys.at(-1)!.reading).toBeGreaterThan(60)
    expect(here.keys[5]!.sideways!.reading).toBeCloseTo(thrown.keys[5]!.x - thrown.keys[0]!.x, 9)
  })

  it('draws the law’s places at any frame, and its way down as a row of readings', () => {
    const { placesAt, along, line, result } = judgeInDepth(thrown)
    const half = placesAt!([1004.5])[0]!
    const exact = plannedFlight({ ...plan, step: undefined, exposure: 0.5 }).keys[7]!
    expect(Math.hypot(half.x - exact.x, half.y - exact.y)).toBeLessThan(0.6)
    lawCurve(line!, along!, thrown.keys.map(key => key.frame)).forEach((reading, i) => expect(reading).toBeCloseTo(result.keys[i]!.law!, 6))
  })

  it('finds a held drawing in both ways at once', () => {
    const held = { ...thrown, keys: thrown.keys.map((key, i) => ({ ...thrown.keys[i >= 14 ? i - 1 : i]!, frame: key.frame })) }
    const { findings } = judge(held)
    expect(findings.map(({ kind }) => kind)).toEqual(['held'])
    expect(Math.abs(findings[0]!.frames[0]! - 1015)).toBeLessThanOrEqual(1)
  })

  it('tells a drawing off the parabola from one that is late on it', () => {
    const apex = Math.round(plannedFlight(plan).apex!.frame) - 1001
    const off = judge(changed(thrown, apex, ({ y }) => ({ y: y - 25 })))
    expect(off.findings.map(({ kind, frames }) => [kind, frames])).toEqual([['off-path', [1001 + apex]]])
    expect(off.findings[0]!.text).toMatch(/off the parabola/)
    const late = judge(changed(thrown, apex, ({ x }) => ({ x: x - 18 })))
    expect(late.findings.map(({ kind, frames }) => [kind, frames])).toEqual([['misplaced', [1001 + apex]]])
    expect(late.findings[0]!.text).toMatch(/late/)
  })

  it('says what is wrong with a throw that slows sideways, eases down, falls upward or runs straight', () => {
    const sentence = (at: At) => judge(request('flight', at)).findings.map(({ kind, text }) => `${kind}: ${text}`)
    expect(sentence(t => [600 * (1 - Math.exp(-2 * t)), 300 * t * t - 100 * t])).toEqual([expect.stringMatching(/^wrong-law: .*sideways it slows/)])
    expect(sentence(t => [400 * t, -300 * t * t])).toEqual([expect.stringMatching(/^wrong-law: .*upward/)])
    expect(sentence(t => [400 * t, 300 * (3 * t * t - 2 * t ** 3)])).toEqual([expect.stringMatching(/^wrong-law: .*odd rule/)])
    expect(sentence(t => [400 * t, 300 * t])).toEqual([expect.stringMatching(/^wrong-law: .*even spacing/)])
    expect(sentence(t => [400 * t * t, 300 * t * t])).toEqual([expect.stringMatching(/^wrong-law: .*odd rule along a straight line/)])
  })

  it('takes a throw straight up for a flight', () => {
    const { verdict, path } = judge(request('flight', t => [50, 400 * t * t - 350 * t]))
    expect(verdict).toBe('holds')
    expect(path?.kind).toBe('line')
  })

  it('names the frames that the claimed scale needs', () => {
    const { findings, claim } = judge({ ...thrown, subject: { unitsPerMetre: 400 } })
    expect(findings.map(({ kind }) => kind)).toEqual(['wrong-scale'])
    // Four times as many units to the metre is a quarter of the size: half the frames.
    expect(claim!.frames).toBe(Math.round(claim!.usedFrames / 2))
  })

  it('is undecided on four drawings, on none that move, and on a way too short to curve', () => {
    expect(judge({ ...thrown, keys: thrown.keys.slice(0, 4) }).reason).toMatch(/too few/)
    expect(judge(request('flight', () => [3, 4])).reason).toMatch(/slop/)
    expect(judge(request('flight', t => [3 * t, 0.2 * t * t])).verdict).toBe('undecided')
  })
})

describe('along a claimed parabola', () => {
  it('counts the length of the bow, both ways from the apex', () => {
    // y = x²/200 from x = −100 to 100: twice the length from the apex, (q√(1 + q²) + asinh q)/4b with q = 1, b = 1/200.
    const half = (Math.SQRT2 + Math.asinh(1)) * 50
    const { path, keys, verdict } = judge({ ...request('steady', t => [200 * t - 100, (200 * t - 100) ** 2 / 200], { path: 'parabola' }, 41), tolerance: 0.5 })
    expect(path).toMatchObject({ kind: 'parabola' })
    if (path?.kind !== 'parabola') throw new Error('no parabola')
    expect(path.bend).toBeCloseTo(1 / 200, 9)
    expect(Math.hypot(path.apex.x, path.apex.y)).toBeLessThan(1e-6)
    expect(keys[20]!.reading).toBeCloseTo(half, 6)
    expect(keys.at(-1)!.reading).toBeCloseTo(2 * half, 6)
    // Even over x is not even along the bow.
    expect(verdict).toBe('breaks')
  })

  it('puts readings back onto it, wherever they are', () => {
    const { result, placesAt } = judgeInDepth(request('odd-rule', t => [30 + 300 * t, 900 * (t - 0.3) ** 2], { path: 'parabola', slop: 40 }))
    const { path } = result
    if (path?.kind !== 'parabola') throw new Error('no parabola')
    for (const { x, y } of placesAt!([990, 1001, 1004.5, 1020, 1030])) {
      expect(y).toBeCloseTo(path.apex.y + path.bend * (x - path.apex.x) ** 2, 5)
    }
  })

  it('tells a drawing off it, and takes a straight row for the line it is', () => {
    const bow = request('steady', t => [300 * t, 60 * (t - 0.5) ** 2], { path: 'parabola' })
    const { findings } = judge(changed({ ...bow, tolerance: 0.3 }, 10, ({ y }) => ({ y: y - 30 })))
    expect(findings.map(({ kind, frames }) => [kind, frames])).toEqual([['off-path', [1011]]])
    expect(judge(request('steady', t => [300 * t, 100 * t], { path: 'parabola' })).path?.kind).toBe('line')
  })
})

describe('a bounce', () => {
  /** Let go 300 px up, e = 0.8, one hop after another, 10 px sideways a frame; the ground is y = 400. */
  const e = 0.8
  const fall = 16
  const height = (frame: number): number => {
    if (frame < fall) return 300 * (1 - (frame / fall) ** 2)
    let [at, length, top] = [fall, 2 * fall * e, 300 * e * e]
    while (frame > at + length) [at, length, top] = [at + length, length * e, top * e * e]
    const u = (frame - at) / length
    return 4 * top * u * (1 - u)
  }
  const list: PointCheck = {
    law: 'bounce', measure: 'point', fps: 24, unit: 'px', slop: 1.5, tolerance: 0.1,
    keys: Array.from({ length: 60 }, (_, i) => ({ frame: 1 + i, x: 50 + 10 * i, y: Math.round(400 - height(i)) })),
  }

  it('holds, with its height above the lowest drawing as the reading and its way sideways beside it', () => {
    const { verdict, findings, keys, reads } = judge(list)
    expect([verdict, findings]).toEqual(['holds', []])
    expect(reads).toEqual({ measure: 'distance', unit: 'px' })
    expect(keys[0]!.reading).toBeGreaterThan(290)
    expect(keys[20]!.sideways).toMatchObject({ reading: 200, breaks: false })
    for (const { point, lawPoint } of keys) expect(Math.hypot(point!.x - lawPoint!.x, point!.y - lawPoint!.y)).toBeLessThan(2.5)
  })

  it('tells a drawing that is only off sideways, and one that is off both ways once', () => {
    const side = judge(changed(list, 22, ({ x }) => ({ x: x + 20 })))
    expect(side.findings.map(({ kind, frames }) => [kind, frames])).toEqual([['misplaced', [23]]])
    expect(side.findings[0]!.text).toMatch(/sideways/)
    const both = judge(changed(list, 22, ({ x, y }) => ({ x: x + 20, y: y - 25 })))
    expect(both.findings.map(({ kind, frames }) => [kind, frames])).toEqual([['misplaced', [23]]])
  })

  it('tells a bounce that slows sideways', () => {
    const slowing = { ...list, keys: list.keys.map((key, i) => ({ ...key, x: 500 * (1 - Math.exp(-i / 20)) })) }
    const { findings } = judge(slowing)
    expect(findings.map(({ kind }) => kind)).toEqual(['wrong-law'])
    expect(findings[0]!.text).toMatch(/Sideways/)
  })

  it('may bounce in place', () => {
    expect(judge({ ...list, keys: list.keys.map(key => ({ ...key, x: 7 })) }).verdict).toBe('holds')
  })
})
