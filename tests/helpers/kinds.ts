import type { CheckRequest, FindingKind, Key, PointKey } from '~/utils/motion/types'

/** Lists of every kind that the judge takes, by formulas that fit on a line; none of them is the judge's own. Rounded as on a drawing. */

const RADIAN = Math.PI / 180
const tenth = (value: number) => Math.round(value * 10) / 10
const frames = (count: number, step = 2, first = 1001) => Array.from({ length: count }, (_, i) => first + i * step)

/** Readings by a formula of time, 0 at the first drawing, in frames. */
const readings = (count: number, formula: (t: number) => number): Key[] =>
  frames(count).map((frame) => ({ frame, reading: tenth(formula(frame - 1001)) }))
const points = (count: number, formula: (t: number) => [x: number, y: number]): PointKey[] =>
  frames(count).map((frame) => {
    const [x, y] = formula(frame - 1001)
    return { frame, x: tenth(x), y: tenth(y) }
  })
/** The screen's circle about a pivot, the angle from straight down, y downwards. */
const hung = (angle: number, radius = 300): [number, number] => [500 + radius * Math.sin(angle * RADIAN), 100 + radius * Math.cos(angle * RADIAN)]

const inPixels = { fps: 24, unit: 'px', slop: 1, tolerance: 0.1 } as const
const inDegrees = { fps: 24, measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1 } as const

/** Small swings are a cosine (memory; a textbook's first approximation), here with 6° at most. */
const swing = (t: number) => 6 * Math.cos((2 * Math.PI * t) / 48)
const dying = (t: number) => 6 * 0.75 ** (t / 48) * Math.cos((2 * Math.PI * t) / 48)
/** On the line between falling back and going over, tan(θ/4) grows as e^(kt): put into θ″ = k² sin θ it holds. */
const toppling = (t: number) => (4 / RADIAN) * Math.atan(Math.tan(0.5 * RADIAN) * Math.exp(0.1 * t))
/** A thin rod lets go of a brink where cos θ = 3/5 (53.13°, textbook value) and turns on evenly, at θ′ = 2k sin(θ/2). */
const overEdge = (t: number) => {
  const [leave, rate] = [Math.acos(3 / 5) / RADIAN, 0.1]
  const at = Math.log(Math.tan((leave * RADIAN) / 4) / Math.tan(0.5 * RADIAN)) / rate
  const turning = (2 * rate * Math.sin((leave * RADIAN) / 2)) / RADIAN
  return t <= at ? toppling(t) : leave + turning * (t - at)
}
/** Let go at 320 px over the floor; every bounce gives back 0.7 of the speed, so 0.7² of the height. */
const bouncing = (t: number) => {
  const [gravity, e] = [2.5, 0.7]
  let [start, speed, height] = [0, 0, 320]
  for (let hops = 0; hops < 9; hops++) {
    const land = start + (speed + Math.sqrt(speed * speed + 2 * gravity * height)) / gravity
    if (t <= land) break
    speed = e * (gravity * (land - start) - speed)
    ;[start, height] = [land, 0]
  }
  return height + speed * (t - start) - (gravity * (t - start) ** 2) / 2
}
/** Gathers speed over 8 frames, keeps it for 12, loses it over 10: one push at both joints. */
const carried = (t: number) => (t <= 8 ? 1.5 * t * t : t <= 20 ? 96 + 24 * (t - 8) : 384 + 24 * (t - 20) - 1.2 * (t - 20) ** 2)

export const carriedSpans = [
  { from: 1001, to: 1009, law: 'odd-rule', start: 'rest' },
  { from: 1009, to: 1021, law: 'steady' },
  { from: 1021, to: 1031, law: 'slow-in' },
] as const

export const carriedList = frames(31, 1).map((frame) => ({ frame, reading: tenth(carried(frame - 1001)) }))
export const swingPoints = points(31, (t) => hung(swing(t)))
export const flightPoints = points(16, (t) => [80 + 9.5 * t, 400 - 22 * t + 0.75 * t * t])

export interface Kind {
  what: string
  request: CheckRequest
}
/** One clean list of every kind. */
export const kinds: Kind[] = [
  { what: 'a slow in with its stop', request: { ...inPixels, measure: 'distance', law: 'slow-in', keys: readings(14, (t) => 400 - 0.8 * Math.max(0, 22 - t) ** 2) } },
  { what: 'a spin in degrees', request: { ...inDegrees, law: 'spin', keys: readings(14, (t) => 20 + 7.5 * t) } },
  { what: 'a dying swing', request: { ...inDegrees, slop: 0.1, law: 'swing-decay', keys: readings(73, dying) } },
  { what: 'a bounce', request: { ...inPixels, measure: 'distance', law: 'bounce', keys: readings(36, bouncing) } },
  { what: 'a rod over the edge', request: { ...inDegrees, law: 'over-edge', keys: readings(26, overEdge) } },
  { what: 'three spans that are given', request: { ...inPixels, measure: 'distance', law: 'odd-rule', spans: carriedSpans.map((span) => ({ ...span })), keys: carriedList } },
  { what: 'spans that are to be found', request: { ...inPixels, measure: 'distance', law: 'odd-rule', spans: 'find', keys: carriedList } },
  { what: 'points of a swing, pivot found', request: { ...inPixels, measure: 'point', law: 'pendulum', keys: swingPoints } },
  { what: 'points of a swing, pivot given', request: { ...inPixels, measure: 'point', law: 'pendulum', pivot: { x: 500, y: 100 }, keys: swingPoints } },
  { what: 'the same swing with y upwards', request: { ...inPixels, measure: 'point', law: 'pendulum', yAxis: 'up', keys: swingPoints.map(({ frame, x, y }) => ({ frame, x, y: -y })) } },
  { what: 'points of a fall down a slope', request: { ...inPixels, measure: 'point', law: 'odd-rule', path: 'line', keys: points(12, (t) => [100 + 0.5 * t * t, 50 + 0.3 * t * t]) } },
  { what: 'points round a circle', request: { ...inPixels, measure: 'point', law: 'spin', keys: points(20, (t) => hung(6 * t)) } },
  { what: 'a flight', request: { ...inPixels, measure: 'point', law: 'flight', keys: flightPoints } },
  { what: 'a flight with y upwards', request: { ...inPixels, measure: 'point', law: 'flight', yAxis: 'up', keys: flightPoints.map(({ frame, x, y }) => ({ frame, x, y: 900 - y })) } },
]

/** The same list with one drawing pushed off its place, by far more than anyone would pass over. */
export function pushed(request: CheckRequest, at: number, by: number): CheckRequest {
  const keys = (request.keys as (Key | PointKey)[]).map((key, i) => (i !== at ? key : 'x' in key ? { ...key, y: key.y + by } : { ...key, reading: key.reading + by }))
  return { ...request, keys } as CheckRequest
}
/** What may be said of a list with one bad drawing. */
export const oneDrawing: readonly FindingKind[] = ['misplaced', 'off-path']
