/**
 * What could have happened to a flight: nothing, some drawings misplaced, a drawing held or skipped. As for readings (hypotheses.ts), with
 * both directions speaking at once; five numbers, all of them linear, so that every fit is one step.
 */
import { MISPLACED_CHARGE, MOST_TOGETHER, exposures, longestRun, mostMisplaced } from '../hypotheses'
import type { Care } from '../hypotheses'
import type { Sheet } from '../path/sheet'
import { shiftedTimes } from '../scan'
import type { Shift } from '../scan'
import type { Series } from '../series'
import { solveInto } from '../solve'
import { distanceTo, fitPlanar, freeOf, planarAllowances, valueAt } from './planar'
import type { Degrees, PlanarFit } from './planar'

/** Sideways evenly, down by the odd rule. */
export const FLIGHT: Degrees = { x: 1, y: 2 }

export interface FlightStory {
  /** Drawings set aside. */
  out: number[]
  shift: Shift | null
  fit: PlanarFit
  /** Distance over allowance of every drawing. */
  strained: Float64Array
  /** Drawings that break, set aside or not. */
  bad: number[]
}

/** A list of points with its times. */
export interface Flown { sheet: Sheet, series: Series, care: Care }

function strainOf({ sheet, care }: Flown, fit: PlanarFit, shift: Shift | null): Float64Array {
  const { slop, tolerance } = care
  const allowed = shift
    // The gap across a held or skipped drawing is not the flight's: either side is measured by its own gaps.
    ? Float64Array.from([...planarAllowances(fit, slop, tolerance, 0, shift.at), ...planarAllowances(fit, slop, tolerance, shift.at)])
    : planarAllowances(fit, slop, tolerance)
  return allowed.map((allowance, i) => {
    const off = distanceTo(sheet, fit, i)
    return off === 0 ? 0 : allowance > 0 ? off / allowance : Number.MAX_VALUE
  })
}

const breaking = (strained: Float64Array) => Array.from(strained.keys()).filter(i => (strained[i] as number) > 1)

function tell(flown: Flown, out: number[], shift: Shift | null): FlightStory {
  const { sheet, series } = flown
  const weights = new Float64Array(sheet.n).fill(1)
  for (const i of out) weights[i] = 0
  const fit = fitPlanar(sheet, shiftedTimes(series.x, shift), weights, FLIGHT)
  const strained = strainOf(flown, fit, shift)
  const kept = out.filter(i => (strained[i] as number) > 1)
  // A drawing that doesn't break once the others are out of the way is put back.
  return kept.length < out.length ? tell(flown, kept, shift) : { out, shift, fit, strained, bad: breaking(strained) }
}

/** Drawing i's say over its own place: what its distance would be without it is its distance over one less this. */
function leverages(times: Float64Array, out: readonly number[]): Float64Array {
  const n = times.length
  let [s0, s1, s2, s3, s4] = [0, 0, 0, 0, 0]
  for (let i = 0; i < n; i++) {
    if (out.includes(i)) continue
    const z = 2 * (times[i] as number) - 1
    s0 += 1
    s1 += z
    s2 += z * z
    s3 += z ** 3
    s4 += z ** 4
  }
  const a = [s0, s1, s2, s1, s2, s3, s2, s3, s4]
  const row = new Float64Array(3)
  return times.map((at) => {
    const z = 2 * at - 1
    const powers = [1, z, z * z]
    return solveInto(a, powers, 3, row) ? Math.min(0.95, powers.reduce((sum, power, p) => sum + power * (row[p] as number), 0)) : 0
  })
}

/** Sets the worst breaking drawing aside, one at a time, until none is left or too many are out. */
function extend(flown: Flown, story: FlightStory, most: number): FlightStory {
  let now = story
  while (now.out.length < most) {
    const left = now.bad.filter(i => !now.out.includes(i))
    if (left.length === 0 || left.length > 3 * (most - now.out.length) + 2) break
    const say = leverages(shiftedTimes(flown.series.x, now.shift), now.out)
    const weight = (i: number) => distanceTo(flown.sheet, now.fit, i) / Math.sqrt(1 - (say[i] as number))
    const worst = left.reduce((furthest, i) => (weight(i) > weight(furthest) ? i : furthest))
    const next = tell(flown, [...now.out, worst].sort((a, b) => a - b), now.shift)
    if (next.out.length <= now.out.length) break
    now = next
  }
  return now
}

/** Drawings that break a line which gives way to none of them: a few rounds of Cauchy's weights. */
function doubted(flown: Flown, from: FlightStory): number[] {
  const { sheet, series } = flown
  const times = shiftedTimes(series.x, from.shift)
  let { strained } = from
  for (let round = 0; round < 12; round++) {
    const scale = Math.max(0.2, strained.slice().sort()[sheet.n >> 1] as number)
    strained = strainOf(flown, fitPlanar(sheet, times, strained.map(value => 1 / (1 + (value / scale) ** 2)), FLIGHT), from.shift)
  }
  return breaking(strained)
}

const WIDTH = 11

/** Running sums, drawing by drawing, of what both directions' normal equations need about a line in hand, with times moved back by `by`. */
function runningSums({ sheet, series }: Flown, fit: PlanarFit, by: number): Float64Array {
  const table = new Float64Array((sheet.n + 1) * WIDTH)
  for (let i = 0; i < sheet.n; i++) {
    const at = (series.x[i] as number) - by
    const z = 2 * at - 1
    const dx = (sheet.x[i] as number) - valueAt(fit.cx, at).value
    const dy = (sheet.y[i] as number) - valueAt(fit.cy, at).value
    const terms = [1, z, z * z, z ** 3, z ** 4, dx, dx * z, dy, dy * z, dy * z * z, dx * dx + dy * dy]
    for (let k = 0; k < WIDTH; k++) table[(i + 1) * WIDTH + k] = (table[i * WIDTH + k] as number) + (terms[k] as number)
  }
  return table
}

/** The most promising shifts, best first: every place for every exposure in turn, each solved exactly. */
function bestShifts(flown: Flown, fit: PlanarFit): Shift[] {
  const { sheet: { n }, series } = flown
  const early = runningSums(flown, fit, 0)
  const found: { shift: Shift, cost: number }[] = []
  const [sx, sy] = [new Float64Array(2), new Float64Array(3)]
  for (const by of exposures(series).flatMap(size => [size, -size])) {
    const late = runningSums(flown, fit, by)
    const sum = (k: number, at: number) => (early[at * WIDTH + k] as number) + (late[n * WIDTH + k] as number) - (late[at * WIDTH + k] as number)
    for (let at = 2; at <= n - 2; at++) {
      const [s0, s1, s2, s3, s4] = [sum(0, at), sum(1, at), sum(2, at), sum(3, at), sum(4, at)]
      const [bx, by2] = [[sum(5, at), sum(6, at)], [sum(7, at), sum(8, at), sum(9, at)]]
      if (!solveInto([s0, s1, s1, s2], bx, 2, sx) || !solveInto([s0, s1, s2, s1, s2, s3, s2, s3, s4], by2, 3, sy)) continue
      const saved = bx.reduce((total, value, p) => total + value * (sx[p] as number), 0) + by2.reduce((total, value, p) => total + value * (sy[p] as number), 0)
      found.push({ shift: { at, by }, cost: sum(10, at) - saved })
    }
  }
  return found.sort((a, b) => a.cost - b.cost).slice(0, 4).map(({ shift }) => shift)
}

/** True where some drawing on the shift's shorter side really breaks the longer side's line. */
function shows({ sheet, series, care }: Flown, { shift, fit }: FlightStory): boolean {
  if (!shift) return true
  const lineAt = (back: number) => series.x.map(at => at - back)
  const trace = (times: Float64Array): PlanarFit =>
    ({ ...fit, x: times.map(at => valueAt(fit.cx, at).value), y: times.map(at => valueAt(fit.cy, at).value) })
  const [early, late] = [trace(lineAt(0)), trace(lineAt(shift.by))]
  const lateIsShort = sheet.n - shift.at <= shift.at
  const allowed = planarAllowances(lateIsShort ? early : late, care.slop, care.tolerance)
  for (let i = lateIsShort ? shift.at : 0; i < (lateIsShort ? sheet.n : shift.at); i++) {
    if (distanceTo(early, late, i) > (allowed[i] as number)) return true
  }
  return false
}

const blamed = (story: FlightStory) => story.out.length + (story.shift ? 1 : 0)
/** What blaming one thing more costs where a simpler story already leaves nothing that anyone would notice, nats. */
const NEEDLESS = 6

/** Nats, if the pencil's spread each way is `sigma`. */
export function flightCost(story: FlightStory, sigma: number, n: number): number {
  const left = story.bad.filter(i => !story.out.includes(i)).length
  return story.fit.cost / (2 * sigma * sigma) + MISPLACED_CHARGE * (story.out.length + left) + (story.shift ? 1 + Math.log(2 * n) : 0)
}

/** The pencil's spread each way, drawing units, by the fit that leaves least unexplained; a third of the slop counts as four drawings. */
export function planarPencil(fits: readonly { fit: PlanarFit, out: readonly number[] }[], n: number, care: Care): number {
  const before = (care.slop / 3) ** 2
  const spreads = fits.map(({ fit, out }) => (8 * before + fit.cost) / (8 + Math.max(1, 2 * (n - out.length) - freeOf(fit))))
  return Math.sqrt(Math.max(Math.min(...spreads), care.least * care.least))
}

/** The story to tell, and the plain one of nothing at all. */
export function flightStories(flown: Flown): { story: FlightStory, plain: FlightStory, told: FlightStory[] } {
  const { n } = flown.sheet
  const plain = tell(flown, [], null)
  const told = [plain]
  const most = Math.min(n - 5, mostMisplaced(n))
  if (Math.max(...plain.strained) > 0.8 && most > 0) {
    told.push(extend(flown, plain, most))
    const off = doubted(flown, plain)
    if (off.length <= most) told.push(extend(flown, tell(flown, off, null), most))
    const shifts = bestShifts(flown, plain.fit)
    const [first] = shifts.map(shift => tell(flown, [], shift)).sort((a, b) => a.fit.cost - b.fit.cost)
    // From the best of them, a second look is a straight one.
    if (first) shifts.push(...bestShifts(flown, first.fit))
    for (const shift of shifts) told.push(tell(flown, [], shift))
    if (first?.shift && first.bad.length > 0) told.push(extend(flown, first, Math.min(most, Math.floor(n / 10))))
  }
  const sigma = planarPencil(told, n, flown.care)
  const simplest = Math.min(...told.filter(story => story.bad.length === story.out.length).map(blamed))
  const cost = (story: FlightStory) => flightCost(story, sigma, n) + (blamed(story) > simplest ? NEEDLESS : 0)
  const ranked = [...told].sort((a, b) => cost(a) - cost(b))
  return { story: ranked.find(story => shows(flown, story)) ?? plain, plain, told }
}

/** True where a flight with so many drawings off is none. */
export function tooMany({ bad }: FlightStory, n: number): boolean {
  return bad.length > mostMisplaced(n) || longestRun(bad) > MOST_TOGETHER
}
