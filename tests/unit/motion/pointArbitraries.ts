/** Lists of points for the property tests: wild ones, and such as a hand would draw. */
import fc from 'fast-check'
import type { Law, PointCheck, PointKey } from '../../../utils/motion'

const laws: readonly Law[] = ['odd-rule', 'slow-in', 'steady', 'bounce', 'flight', 'topple', 'over-edge', 'pendulum', 'swing-decay', 'spin']
const pathKinds = ['line', 'circle', 'parabola'] as const
const yAxes = ['down', 'up'] as const

const gaps = fc.array(fc.integer({ min: 1, max: 4 }), { minLength: 2, maxLength: 30 })

const coordinate = fc.oneof(
  fc.double({ min: -1e6, max: 1e6, noNaN: true }), fc.integer({ min: -3, max: 3 }), fc.constantFrom(0, 100, 1e6, -1e6, 1e-9),
)

const framesOf = (steps: readonly number[]) => {
  let frame = 101
  return [frame, ...steps.map(step => (frame += step))]
}

/** Anything the contract lets through: no two alike, all alike, all on a line, a handful of places over and over. */
const wild: fc.Arbitrary<PointKey[]> = gaps.chain((steps) => {
  const frames = framesOf(steps)
  const many = { minLength: frames.length, maxLength: frames.length }
  const listed = (places: { x: number, y: number }[]) => frames.map((frame, i) => ({ frame, ...(places[i] ?? { x: 0, y: 0 }) }))
  return fc.oneof(
    fc.array(fc.record({ x: coordinate, y: coordinate }), many).map(listed),
    fc.record({ x: coordinate, y: coordinate }).map(place => listed(frames.map(() => place))),
    fc.tuple(fc.integer({ min: -4, max: 4 }), fc.integer({ min: -4, max: 4 }), fc.array(fc.integer({ min: -50, max: 50 }), many))
      .map(([dx, dy, at]) => listed(at.map(a => ({ x: a * dx, y: a * dy })))),
    fc.array(fc.constantFrom({ x: 0, y: 0 }, { x: 100, y: 0 }, { x: 0, y: 100 }), many).map(listed),
  )
})

interface Drawn { law: Law, keys: PointKey[] }

/** Motions that look like one, with some pencil: along a line, about a pivot, through the air. */
const drawn: fc.Arbitrary<Drawn> = fc.tuple(
  gaps, fc.constantFrom<[Law, string]>(['odd-rule', 'line'], ['steady', 'line'], ['steady', 'arc'], ['spin', 'arc'], ['pendulum', 'swing'], ['topple', 'fall'], ['flight', 'throw'], ['flight', 'line'], ['odd-rule', 'throw']),
  fc.double({ min: 0.3, max: 2, noNaN: true }), fc.integer({ min: 0, max: 1000 }),
).map(([steps, [law, shape], pace, salt]) => {
  const keys = framesOf(steps).map((frame, i) => {
    const t = (frame - 101) / 24
    const places: Record<string, [number, number]> = {
      line: [300 * pace * t + 40 * t * t, 120 * pace * t + 16 * t * t],
      arc: [200 * Math.cos(3 * pace * t), 200 * Math.sin(3 * pace * t)],
      swing: [300 * Math.sin(0.7 * Math.cos(3 * pace * t)), 300 * Math.cos(0.7 * Math.cos(3 * pace * t))],
      fall: [300 * Math.sin(Math.min(1.5, 0.05 * Math.cosh(pace * t * 2))), -300 * Math.cos(Math.min(1.5, 0.05 * Math.cosh(pace * t * 2)))],
      throw: [250 * pace * t, -400 * t + 350 * t * t],
    }
    const [x, y] = places[shape] ?? [0, 0]
    const pencil = (phase: number) => Math.sin(i * i + salt + phase)
    return { frame, x: Math.round(2 * (x + pencil(0) / 2)) / 2, y: Math.round(2 * (y + pencil(1) / 2)) / 2 }
  })
  return { law, keys }
})

export const likely: fc.Arbitrary<PointCheck> = fc.tuple(drawn, fc.constantFrom(1, 3)).map(([{ law, keys }, slop]) => (
  { law, keys, measure: 'point', fps: 24, unit: 'px', slop, tolerance: 0.1 }
))

export const requests: fc.Arbitrary<PointCheck> = fc.record({
  law: fc.constantFrom(...laws),
  fps: fc.constantFrom(1, 24, 240),
  slop: fc.constantFrom(0, 0.5, 2, 50),
  tolerance: fc.constantFrom(0, 0.1, 0.5),
  keys: fc.oneof(wild, drawn.map(({ keys }) => keys)),
  yAxis: fc.constantFrom(undefined, ...yAxes),
  path: fc.constantFrom(undefined, undefined, ...pathKinds),
  pivot: fc.constantFrom(undefined, undefined, { x: 0, y: 0 }, { x: 100, y: 0 }, { x: -1e6, y: 1e6 }),
  start: fc.constantFrom(undefined, undefined, 'rest' as const),
  claims: fc.boolean(),
}).map(({ law, yAxis, path, pivot, start, claims, ...rest }) => {
  const turning = ['topple', 'over-edge', 'pendulum', 'swing-decay', 'spin'].includes(law)
  return {
    ...rest, law, measure: 'point', unit: 'px',
    ...(yAxis && { yAxis }), ...(path && { path }), ...(pivot && { pivot }),
    ...(start && ['odd-rule', 'topple', 'pendulum'].includes(law) && { start }),
    ...(claims && { subject: turning ? { shape: 'rod' as const, height: 2 } : { unitsPerMetre: 80 } }),
  }
})

/** Every number anywhere in a value. */
export function numbersOf(value: unknown): number[] {
  if (typeof value === 'number') return [value]
  return typeof value === 'object' && value !== null ? Object.values(value).flatMap(numbersOf) : []
}
