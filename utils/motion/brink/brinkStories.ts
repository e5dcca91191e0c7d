/**
 * What could have happened to the drawings of a body over a brink: nothing, some misplaced, one held or skipped. As for readings
 * (hypotheses.ts) and flights, both directions speaking at once.
 */
import { BRIEF, refine } from '../fit'
import type { Effort, Fit } from '../fit'
import { planarAllowances } from '../flight/planar'
import { MISPLACED_CHARGE, MOST_TOGETHER, exposures, longestRun, mostMisplaced } from '../hypotheses'
import type { Care } from '../hypotheses'
import type { Sheet } from '../path/sheet'
import { bestShifts, shiftedTimes } from '../scan'
import type { Shift } from '../scan'
import type { Series } from '../series'
import type { Place } from '../types'
import { beginnings } from './brinkBegin'
import { LOG, OWN, REACH, RIGHT, START, TURN, UP, brinkModel, everyOther, hasOwnAngle, inTurn } from './brinkModel'
import type { BrinkModel, Letting } from './brinkModel'

/** Brink, reach and pace pull at one another along a narrow valley. */
const PATIENT: Effort = { steps: 60, enough: 1e-8 }
/** Where an angle before the law's is first looked for, as a share of it. */
const EARLIER = 0.65

export interface BrinkStory {
  model: BrinkModel
  /** Drawings set aside. */
  out: number[]
  /** Counted in drawings. */
  shift: Shift | null
  fit: Fit
  /** Distance over allowance of every drawing. */
  strained: Float64Array
  /** Drawings that break, set aside or not. */
  bad: number[]
}

/** A list of points with its times. `series`: the drawings' own; its readings are not looked at. */
export interface Tipped { sheet: Sheet, series: Series, care: Care, brink: Place | null, atRest: boolean }

/** The numbers that are looked for. */
export function freeNumbers({ brink, atRest }: Tipped, letting: Letting): number[] {
  return [LOG, START, ...(atRest ? [] : [TURN]), REACH, ...(brink ? [] : [RIGHT, UP]), ...(hasOwnAngle(letting) ? [OWN] : [])]
}

const twice = (values: ArrayLike<number>) => inTurn(values, values)

/** The line at the drawings as two rows. */
export function rowsOf({ value }: { value: Float64Array }): { x: Float64Array, y: Float64Array } {
  return { x: everyOther(value, 0), y: everyOther(value, 1) }
}

function strainOf({ sheet, care }: Tipped, value: Float64Array, shift: Shift | null): Float64Array {
  const rows = rowsOf({ value })
  const { slop, tolerance } = care
  const allowed = shift
    ? Float64Array.from([...planarAllowances(rows, slop, tolerance, 0, shift.at), ...planarAllowances(rows, slop, tolerance, shift.at)])
    : planarAllowances(rows, slop, tolerance)
  return allowed.map((allowance, i) => {
    const off = Math.hypot((sheet.x[i] as number) - (rows.x[i] as number), (sheet.y[i] as number) - (rows.y[i] as number))
    return off === 0 ? 0 : allowance > 0 ? off / allowance : Number.MAX_VALUE
  })
}

const breaking = (strained: Float64Array) => Array.from(strained.keys()).filter(i => (strained[i] as number) > 1)

function fitted(tipped: Tipped, model: BrinkModel, weights: Float64Array, shift: Shift | null, from: Float64Array, effort: Effort): Fit {
  const { sheet, series } = tipped
  return refine(model, series, twice(shiftedTimes(series.x, shift)), inTurn(sheet.x, sheet.y), twice(weights), from, effort)
}

function tell(tipped: Tipped, model: BrinkModel, out: number[], shift: Shift | null, from: Float64Array, effort = BRIEF): BrinkStory {
  const weights = new Float64Array(tipped.sheet.n).fill(1)
  for (const i of out) weights[i] = 0
  const fit = fitted(tipped, model, weights, shift, from, effort)
  const strained = strainOf(tipped, fit.trace.value, shift)
  const kept = out.filter(i => (strained[i] as number) > 1)
  // A drawing that doesn't break once the others are out of the way is put back.
  return kept.length < out.length ? tell(tipped, model, kept, shift, fit.numbers) : { model, out, shift, fit, strained, bad: breaking(strained) }
}

/** Sets the worst breaking drawing aside, one at a time, until none is left or too many are out. */
function extend(tipped: Tipped, story: BrinkStory, most: number): BrinkStory {
  let now = story
  while (now.out.length < most) {
    const left = now.bad.filter(i => !now.out.includes(i))
    if (left.length === 0 || left.length > 3 * (most - now.out.length) + 2) break
    const worst = left.reduce((furthest, i) => ((now.strained[i] as number) > (now.strained[furthest] as number) ? i : furthest))
    const next = tell(tipped, now.model, [...now.out, worst].sort((a, b) => a - b), now.shift, now.fit.numbers)
    if (next.out.length <= now.out.length) break
    now = next
  }
  return now
}

/** A fit that gives way to no lone drawing: a few rounds of Cauchy's weights. */
function doubting(tipped: Tipped, story: BrinkStory): { numbers: Float64Array, off: number[] } {
  let { strained } = story
  let { numbers } = story.fit
  for (let round = 0; round < 8; round++) {
    const scale = Math.max(0.2, strained.slice().sort()[tipped.sheet.n >> 1] as number)
    const fit = fitted(tipped, story.model, strained.map(value => 1 / (1 + (value / scale) ** 2)), story.shift, numbers, { steps: 4, enough: 1e-3 })
    numbers = fit.numbers
    strained = strainOf(tipped, fit.trace.value, story.shift)
  }
  return { numbers, off: breaking(strained) }
}

const blamed = (story: BrinkStory) => story.out.length + (story.shift ? 1 : 0)
/** What blaming one thing more costs where a simpler story already leaves nothing that anyone would notice, nats. */
const NEEDLESS = 6

/** Nats, if the pencil's spread each way is `sigma`; the model's free numbers charged. */
export function brinkCost(story: BrinkStory, sigma: number, n: number): number {
  const left = story.bad.filter(i => !story.out.includes(i)).length
  return story.fit.cost / (2 * sigma * sigma) + MISPLACED_CHARGE * (story.out.length + left) + (story.shift ? 1 + Math.log(2 * n) : 0)
    + 0.5 * story.model.size * Math.log(2 * n)
}

/** The pencil's spread each way, drawing units, by the story that leaves least unexplained; a third of the slop counts as four drawings. */
export function brinkPencil(told: readonly BrinkStory[], n: number, care: Care): number {
  const before = (care.slop / 3) ** 2
  const spreads = told.map(({ fit, out, model }) => (8 * before + fit.cost) / (8 + Math.max(1, 2 * (n - out.length) - model.size)))
  return Math.sqrt(Math.max(Math.min(...spreads), care.least * care.least))
}

/** True where some drawing on the shift's shorter side really breaks the longer side's line. */
function shows(tipped: Tipped, { model, shift, fit }: BrinkStory): boolean {
  if (!shift) return true
  const { sheet: { n }, series, care } = tipped
  const lineAt = (by: number) => rowsOf(model.trace(series, fit.numbers, twice(series.x.map(at => at - by)), false))
  const [early, late] = [lineAt(0), lineAt(shift.by)]
  const lateIsShort = n - shift.at <= shift.at
  const allowed = planarAllowances(lateIsShort ? early : late, care.slop, care.tolerance)
  for (let i = lateIsShort ? shift.at : 0; i < (lateIsShort ? n : shift.at); i++) {
    const off = Math.hypot((early.x[i] as number) - (late.x[i] as number), (early.y[i] as number) - (late.y[i] as number))
    if (off > (allowed[i] as number)) return true
  }
  return false
}

/** One way of letting go with nothing assumed, best first: a fit from each of the likeliest beginnings. */
function plainStories(tipped: Tipped, letting: Letting, near: readonly Float64Array[]): BrinkStory[] {
  const { sheet, series } = tipped
  const free = freeNumbers(tipped, letting)
  const begun = [...near, ...beginnings(sheet, series, series.x, tipped.brink, letting).slice(0, 3)]
  return begun.map((numbers) => {
    const fixed = numbers.slice()
    if (tipped.atRest) fixed[TURN] = 0
    const model = brinkModel(letting, free, fixed)
    return tell(tipped, model, [], null, model.free(fixed), PATIENT)
  }).sort((a, b) => a.fit.cost - b.fit.cost)
}

/** As many drawings as may be called off. */
const mostOut = ({ sheet: { n } }: Tipped, { model }: BrinkStory) => Math.min(n - Math.ceil(model.size / 2) - 1, mostMisplaced(n))

/**
 * Another way of letting go, to be compared with: nothing happened, or some drawings are misplaced. A drawing held or skipped on top would
 * be a second fault. The first is "nothing happened". `near`: all seven numbers of the law's line.
 */
export function otherStories(tipped: Tipped, letting: Letting, near: Float64Array): BrinkStory[] {
  const told = plainStories(tipped, letting, letting === 'own' ? bothSides(near) : [near]).slice(0, 1)
  const [plain] = told
  if (!plain || plain.bad.length === 0) return told
  const { numbers, off } = doubting(tipped, plain)
  if (off.length <= mostOut(tipped, plain)) told.push(extend(tipped, tell(tipped, plain.model, off, null, numbers), mostOut(tipped, plain)))
  return told
}

/**
 * Between an angle before the law's and one after it lies a ridge that no fit climbs: brink, reach and size give way to either, so that
 * each is looked for from its own side. `near`: with the law's angle.
 */
function bothSides(near: Float64Array): Float64Array[] {
  const early = near.slice()
  early[OWN] = EARLIER * (near[OWN] as number)
  return [early, near]
}

/** Nats that an angle of its own would save a line under which nothing breaks, at a first glance. */
export function ownSaves(tipped: Tipped, law: BrinkStory, near: Float64Array): number {
  const free = freeNumbers(tipped, 'own')
  const { n } = tipped.sheet
  return Math.max(...bothSides(near).map((numbers) => {
    const model = brinkModel('own', free, numbers)
    const own = tell(tipped, model, [], null, model.free(numbers))
    const sigma = brinkPencil([law, own], n, tipped.care)
    return brinkCost(law, sigma, n) - brinkCost(own, sigma, n)
  }))
}

/** The whole circle, as it is: a topple. */
export function circling(tipped: Tipped, near: Float64Array): BrinkStory | undefined {
  return plainStories(tipped, 'never', [near])[0]
}

/** Every story worth hearing under the law; the first is "nothing happened". Empty where no search could begin. */
export function lawStories(tipped: Tipped): BrinkStory[] {
  const { sheet, series } = tipped
  const { n } = sheet
  const plains = plainStories(tipped, 'law', [])
  const [plain] = plains
  if (!plain) return []
  const told = [plain]
  const most = mostOut(tipped, plain)
  if (!(Math.max(...plain.strained) > 0.8) || most < 1) return told
  for (const start of plains.slice(0, 2)) {
    const { numbers, off } = doubting(tipped, start)
    if (off.length <= most) told.push(extend(tipped, tell(tipped, start.model, off, null, numbers), most))
  }
  // Held or skipped is dear; nothing of the kind is looked for where one drawing explains it all.
  if (told.some(story => story.out.length === 1 && story.bad.length === 1)) return told
  told.push(extend(tipped, plain, most))
  const sizes = exposures(series).flatMap(by => [by, -by])
  const look = ({ fit }: BrinkStory) => bestShifts({ ...series, x: twice(series.x) }, fit, inTurn(sheet.x, sheet.y), sizes, 2)
    .sort((a, b) => a.cost - b.cost).slice(0, 4)
    .map(({ shift, numbers }) => tell(tipped, plain.model, [], { at: shift.at / 2, by: shift.by }, numbers))
  const first = look(plain)
  told.push(...first)
  // One step from a bent line may point a few keys too far: a second look, from the best of them, and a third.
  for (let round = 0, best = least(first); best && best.bad.length > 0 && round < 2; round++) {
    const again = look(best)
    told.push(...again)
    best = least(again)
  }
  // What was found with something set aside may show where nothing needs to be.
  const again = tell(tipped, plain.model, [], null, (least(told) ?? plain).fit.numbers, PATIENT)
  if (again.fit.cost < plain.fit.cost) told.splice(0, 1, again, extend(tipped, again, most))
  const shifted = least(told.filter(story => story.shift))
  if (shifted && shifted.bad.length > 0) told.push(extend(tipped, shifted, Math.min(most, Math.floor(n / 10))))
  return told
}

const least = (told: readonly BrinkStory[]) => [...told].sort((a, b) => a.fit.cost - b.fit.cost)[0]

/** The story to tell of those heard. */
export function likeliestOf(tipped: Tipped, told: readonly BrinkStory[], sigma: number): BrinkStory {
  const { n } = tipped.sheet
  const simplest = Math.min(...told.filter(story => story.bad.length === story.out.length).map(blamed))
  const cost = (story: BrinkStory) => brinkCost(story, sigma, n) + (blamed(story) > simplest ? NEEDLESS : 0)
  const ranked = [...told].sort((a, b) => cost(a) - cost(b))
  return ranked.find(story => shows(tipped, story)) ?? told[0] as BrinkStory
}

/** True where a law with so many drawings off is none. */
export function tooMany({ bad }: BrinkStory, n: number): boolean {
  return bad.length > mostMisplaced(n) || longestRun(bad) > MOST_TOGETHER
}

/** Root mean square of distance over allowance, without the drawings set aside. */
export function misfitOf({ strained, out }: BrinkStory): number {
  const kept = strained.filter((_, i) => !out.includes(i))
  return Math.sqrt(kept.reduce((sum, value) => sum + Math.min(1e3, value) ** 2, 0) / Math.max(1, kept.length))
}
