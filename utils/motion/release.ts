/** Where a body going over a brink lets go: as the law has it, and as it was drawn. */
import { DOUBT, DOUBT_WITH_FAULTS, UNNOTICED, cheapest, storyCost } from './choose'
import { edgeEnergy, leavingCosine, releaseAt } from './edge'
import type { Release } from './edge'
import type { Fit } from './fit'
import { MOST_TOGETHER, badDrawings, longestRun, mostMisplaced, pencil, plainFit, stories, strain } from './hypotheses'
import type { Care, Plain, Story } from './hypotheses'
import { fullNumbers, ownReleaseFromRest } from './laws/fromRest'
import { ownAngle, ownRelease, overEdge } from './laws/overEdge'
import { RADIAN } from './series'
import type { Series } from './series'
import { uncertainty } from './size'
import type { Considered } from './start'
import type { Figure, ReadingCheck } from './types'

export const IN_THE_AIR = 'Every drawing is off the brink already: nothing of the arc is left to judge.'
/** Drawings that must lie on the arc, and after it, before anything is said of where the one became the other. */
const LEAST_BEFORE = 3
const LEAST_AFTER = 2
const STEP = 1e-5

/** The list under its own leaving angle. Degrees from upright. */
export interface OwnRelease {
  story: Story
  angle: number
  /** Where this body, moving like that, would have left. */
  leaves: number
  /** Index of the first drawing after the brink. */
  after: number
}

/** The release that a fit's numbers stand for, and its time in spans. */
function releaseOf(series: Series, numbers: Float64Array): Release & { x: number } {
  const kappa = Math.exp(numbers[0] as number)
  const start = numbers[1] as number
  const push = (numbers[2] as number) / kappa
  const cosine = numbers.length > 3 ? Math.cos(ownAngle(numbers)) : leavingCosine(series.edgeRatio, edgeEnergy(start, push))
  const release = releaseAt(start, push, cosine)
  return { ...release, x: release.tau / kappa }
}

const degreesOut = ({ angle }: Release) => Math.abs(angle) / RADIAN

/**
 * The list's own leaving angle where it explains the list clearly better than the law's: by the same margins as another law has to, the
 * extra number charged for. Null where it doesn't, where another law does better still, or where too little is drawn on either side.
 */
export function wrongRelease(series: Series, { choice, opinion }: Considered, care: Care, atRest: boolean): OwnRelease | null {
  const { claimed, others } = choice
  const faults = (story: Story) => badDrawings(series, story, care).length + (story.shift ? 1 : 0)
  const faulted = faults(claimed.story)
  if (opinion.kind === 'too-short' || (opinion.kind === 'law-holds' && faulted === 0 && claimed.misfit <= UNNOTICED)) return null
  const model = atRest ? ownReleaseFromRest : ownRelease
  if (series.n < model.size + 2) return null
  const plain = plainFit(series, model, care)
  if (!nearlyTold(series, plain, care)) return null
  const told = stories(series, plain, care)
  const sigma = Math.min(choice.sigma, pencil(told, series.n, care))
  const story = cheapest(series, told, care, sigma)
  const bad = badDrawings(series, story, care)
  if (bad.length > mostMisplaced(series.n) || longestRun(bad) > MOST_TOGETHER) return null
  const cost = storyCost(story, sigma, series.n)
  // Where it doesn't do away with any other fault, only what could be noticed counts.
  const saves = faults(story) < faulted
  if (!saves && claimed.misfit <= UNNOTICED) return null
  if (cost + (saves ? DOUBT_WITH_FAULTS : DOUBT) >= storyCost(claimed.story, sigma, series.n)) return null
  if (others.some(({ misfit, breaking, story: other }) => misfit <= 1 && breaking <= 0.1 && storyCost(other, sigma, series.n) < cost)) return null

  const full = (numbers: Float64Array) => fullNumbers(model, numbers)
  const own = releaseOf(series, full(story.fit.numbers))
  const law = releaseOf(series, full(story.fit.numbers).subarray(0, 3))
  const lag = story.shift && own.x > (series.x[story.shift.at] as number) - story.shift.by ? story.shift.by : 0
  const after = series.x.findIndex(x => x - lag > own.x)
  if (after < LEAST_BEFORE || series.n - after < LEAST_AFTER || !breaksTheLaw(series, story, care)) return null
  const late = degreesOut(own) - degreesOut(law)
  const half = uncertainty(story.fit, slopes(story.fit.numbers, at => degreesOut(releaseOf(series, full(at))) - degreesOut(releaseOf(series, full(at).subarray(0, 3)))), series.n - story.out.length, care.least)
  return Math.abs(late) > half
    ? { story, angle: degreesOut(own), leaves: degreesOut(law), after }
    : null
}

/** A first look, to leave lists alone that no leaving angle would explain. */
function nearlyTold(series: Series, { fit, base }: Plain, care: Care): boolean {
  const breaking = (one: Fit) => strain(series, one, care).reduce((count, value) => (value > 1 ? count + 1 : count), 0)
  return Math.min(breaking(fit), breaking(base)) <= Math.max(4, series.n / 3)
}

/** True where some drawing after the brink really lies off the law's line from the same start. */
function breaksTheLaw(series: Series, { fit, shift }: Story, care: Care): boolean {
  const times = shift ? series.x.map((x, i) => (i >= shift.at ? x - shift.by : x)) : series.x
  const trace = overEdge.trace(series, fullNumbers(fit.model, fit.numbers).subarray(0, 3), times, false)
  const strained = strain({ ...series, y: fit.trace.value }, { ...fit, trace }, care, shift)
  return strained.some(value => value > 1)
}

/** d value / d number, by central differences. */
export function slopes(numbers: Float64Array, value: (numbers: Float64Array) => number): Float64Array {
  return numbers.map((number, p) => {
    const step = STEP * Math.max(1, Math.abs(number))
    const [more, less] = [numbers.slice(), numbers.slice()]
    more[p] = number + step
    less[p] = number - step
    return (value(more) - value(less)) / (2 * step)
  })
}

/** Angle and frame of leaving with their 95 % intervals, where that lies within the list. `kept` and `least` as for `figuresOf`. */
export function releaseFigures(request: ReadingCheck, series: Series, fit: Fit, lag: number, kept: number, least: number): Figure[] {
  const numbersOf = (numbers: Float64Array) => fullNumbers(fit.model, numbers)
  const { x } = releaseOf(series, numbersOf(fit.numbers))
  if (!(x > 0 && x + lag < 1)) return []
  const figure = (kind: Figure['kind'], unit: string, value: (numbers: Float64Array) => number): Figure => {
    const at = value(fit.numbers)
    const half = Math.min(Number.MAX_SAFE_INTEGER, uncertainty(fit, slopes(fit.numbers, value), kept, least))
    return { kind, value: at, low: at - half, high: at + half, unit }
  }
  const first = request.keys[0]?.frame ?? 0
  return [
    figure('release-angle', 'deg', numbers => degreesOut(releaseOf(series, numbersOf(numbers)))),
    figure('release', 'frame', numbers => first + (lag + releaseOf(series, numbersOf(numbers)).x) * series.spanFrames),
  ]
}

/** True where a list turns evenly and begins beyond the angle at which this body would have left from rest. */
export function allInTheAir(series: Series, { choice, opinion }: Considered): boolean {
  const even = opinion.kind === 'too-short' || (opinion.kind === 'wrong-law' && opinion.reads === 'steady')
  const first = (choice.plain.fit.trace.value[0] as number) / series.perRadian + series.zero
  return even && Math.cos(first) < leavingCosine(series.edgeRatio, 1)
}
