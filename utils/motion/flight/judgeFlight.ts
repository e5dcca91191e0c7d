/**
 * A flight: evenly sideways, by the odd rule down, one gravity for the list. Five numbers for both directions together (Galileo, Two New
 * Sciences, fourth day: a projectile's motion is compounded of an even and of a naturally accelerated one).
 */
import { STANDARD_GRAVITY, gravityOf, isBody } from '../bodies'
import { inOrder, shiftFinding, wrongScaleFinding } from '../findings'
import type { Line } from '../line'
import { STILL, without } from '../path/nothing'
import { asPosted, sheetOf } from '../path/sheet'
import type { Sheet } from '../path/sheet'
import type { Judgement } from '../readings'
import { roundingSpread, seriesOf } from '../series'
import type { Series } from '../series'
import type { Scale } from '../size'
import { student95 } from '../student'
import { solve3 } from '../solve'
import type { CheckResult, Figure, Finding, JudgedKey, Place, PointCheck, PointKey, ReadingCheck } from '../types'
import { flightDrawingFinding, notFlightFinding } from './flightFindings'
import { flightOpinion } from './flightRivals'
import { flightStories } from './flightStories'
import type { Care } from '../hypotheses'
import type { FlightStory, Flown } from './flightStories'
import { flightPath, offParabola } from './parabola'
import { freeOf, planarAllowances, valueAt } from './planar'
import type { PlanarFit } from './planar'

/** Three numbers of the way down, two of the way across, and as many drawings as can contradict them. */
const FEWEST = 5
const SCALE_FLOOR = 0.03

/** The way down alone, counted from the first drawing: what the screens draw as a row of readings. */
function downOf(request: PointCheck, sheet: Sheet): ReadingCheck {
  const { law: _, fps, unit, slop, tolerance } = request
  return {
    law: 'odd-rule', measure: 'distance', fps, unit, slop, tolerance,
    keys: request.keys.map(({ frame }, i) => ({ frame, reading: (sheet.y[0] as number) - (sheet.y[i] as number) })),
  }
}

/** Judges a list of points as a flight. Never throws and never answers NaN on what the contract lets through. */
export function judgeFlight(request: PointCheck): Judgement {
  const sheet = sheetOf(request)
  if (sheet.n < FEWEST) return without(request, null, `${sheet.n} keys are too few for a flight: it takes ${FEWEST} to tell.`)
  if (!(sheet.extent > 2 * request.slop)) return without(request, null, STILL)
  const along = downOf(request, sheet)
  const series = seriesOf(along)
  const posted = Float64Array.from(request.keys.flatMap(({ x, y }) => [x, y]))
  const flown: Flown = { sheet, series, care: { slop: request.slop, tolerance: request.tolerance, least: roundingSpread(posted) } }
  const { story, plain, told } = flightStories(flown)
  // Pencil alone can spread still drawings over the slop; what has to move is the line.
  if (!(Math.hypot(widthOf(story.fit.x), widthOf(story.fit.y)) > 2 * request.slop)) return without(request, null, STILL)
  const fall = fallOf(story, series, flown.care)
  const scale = flightScale(request, fall)
  // At some claimed scales no curve could be seen in so short a time: the list agrees with its claim.
  const agrees = scale.pace !== null && Math.abs(scale.pace ** 2 - 1) <= scale.reach
  const opinion = flightOpinion(flown, story, told, agrees, fall.fall + fall.half >= 0)
  const lawless = opinion.fault !== null && opinion.fault !== 'too-short'
  const line = lineOf(lawless ? plain : story, sheet, series)
  const keys = keysOf(request, flown, line)
  const misfit = opinion.readsAs.find(({ law }) => law === 'flight')?.misfit ?? 0
  const claim = lawless || scale.pace === null ? null : { frames: Math.round(series.spanFrames / scale.pace), usedFrames: series.spanFrames }
  let findings: Finding[] = []
  if (opinion.fault && opinion.fault !== 'too-short') findings = [notFlightFinding(opinion.fault, misfit, slows(flown))]
  else if (opinion.fault === null) findings = faults(request, flown, story, keys, line, scale, claim)
  const breaks = findings.length > 0 || keys.some(key => key.breaks)
  const places = (frames: readonly number[], rate = 1): Place[] =>
    frames.map(frame => asPosted(sheet, line.at((frame - (keys[0]?.frame ?? 0)) / series.spanFrames * rate)))
  const frames = keys.map(key => key.frame)
  const points = (rate = 1): PointKey[] => places(frames, rate).map((place, i) => ({ frame: frames[i] as number, ...place }))
  const readings = (rate = 1) => frames.map(frame => ({
    frame, reading: (sheet.y[0] as number) - line.at((frame - (frames[0] as number)) / series.spanFrames * rate).y,
  }))
  const hasClaim = !lawless && scale.pace !== null
  const result: CheckResult = {
    verdict: opinion.fault === 'too-short' ? 'undecided' : breaks ? 'breaks' : 'holds',
    reason: opinion.fault === 'too-short' ? 'The way is too straight, and too short beside the slop, to tell a flight from an even move.' : null,
    keys, findings, readsAs: opinion.readsAs, size: lawless ? null : scale.size, claim,
    ruled: { fit: readings(), claim: hasClaim ? readings(scale.pace ?? 1) : null },
    ruledPoints: { fit: points(), claim: hasClaim ? points(scale.pace ?? 1) : null },
    reads: { measure: 'distance', unit: request.unit },
    path: flightPath(sheet, line.fit, misfitOff(keys)),
    figures: lawless || !scale.size || scale.size.unit !== 'm/s²' ? [] : [gravityFigure(scale)],
  }
  return { line: line.down, pace: lawless ? null : scale.pace, along, placesAt: places, result }
}

const gravityFigure = ({ size }: Scale): Figure =>
  ({ kind: 'gravity', value: size?.value ?? STANDARD_GRAVITY, low: size?.low ?? 0, high: size?.high ?? 0, unit: 'm/s²' })

interface FlightLine {
  fit: PlanarFit
  /** Spans by which it runs behind its numbers' own clock. */
  lag: number
  down: Line
  /** Place on the sheet and speed per span at time x of the list. */
  at(x: number): Place
  speed(x: number): Place
}

/** The line runs with the longer side of a held or skipped drawing. */
function lineOf({ fit, shift }: FlightStory, sheet: Sheet, series: Series): FlightLine {
  const lag = shift && series.n - shift.at > shift.at ? shift.by : 0
  const [c0 = 0, c1 = 0, c2 = 0] = fit.cy
  return {
    fit, lag,
    down: { law: 'odd-rule', numbers: [(sheet.y[0] as number) - c0, -c1, -c2], lag },
    at: x => ({ x: valueAt(fit.cx, x - lag).value, y: valueAt(fit.cy, x - lag).value }),
    speed: x => ({ x: valueAt(fit.cx, x - lag).rate, y: valueAt(fit.cy, x - lag).rate }),
  }
}

/** A drawing's way ahead of its place, drawing units along the flight, found where the flight comes nearest to it. */
function aheadOf(key: JudgedKey): number {
  const { point, lawPoint } = key
  if (!point || !lawPoint) return 0
  const [dx, dy] = [point.x - lawPoint.x, point.y - lawPoint.y]
  const across = key.offPath ?? 0
  return Math.sqrt(Math.max(0, dx * dx + dy * dy - across * across))
}

function keysOf(request: PointCheck, { sheet, series, care }: Flown, line: FlightLine): JudgedKey[] {
  const places = Array.from(series.x, x => line.at(x))
  const traced = { ...line.fit, x: Float64Array.from(places, place => place.x), y: Float64Array.from(places, place => place.y) }
  const allowed = planarAllowances(traced, care.slop, care.tolerance)
  const gaps = planarAllowances(traced, 0, 1)
  const [firstX, firstY] = [sheet.x[0] as number, sheet.y[0] as number]
  return request.keys.map(({ frame, x, y }, i): JudgedKey => {
    const law = places[i] as Place
    const next = places[i + 1]
    const [dx, dy] = [(sheet.x[i] as number) - law.x, (sheet.y[i] as number) - law.y]
    const speed = line.speed(series.x[i] as number)
    const pace = Math.hypot(speed.x, speed.y)
    const ahead = pace > 0 ? (dx * speed.x + dy * speed.y) / pace : 0
    const frames = ahead / (pace / series.spanFrames)
    const still = (gaps[i] as number) <= 0.25 * request.slop || Math.abs(frames) > series.spanFrames
    const allowance = allowed[i] as number
    const here = firstY - (sheet.y[i] as number)
    return {
      frame, reading: here, law: firstY - law.y, offset: -dy,
      offsetFrames: Number.isFinite(frames) && !still ? frames : null,
      gap: i + 1 < sheet.n ? firstY - (sheet.y[i + 1] as number) - here : null,
      lawGap: next ? law.y - next.y : null,
      allowance, breaks: Math.hypot(dx, dy) > allowance,
      point: { x, y }, lawPoint: asPosted(sheet, law),
      offPath: offParabola(line.fit, { x: sheet.x[i] as number, y: sheet.y[i] as number }, (series.x[i] as number) - line.lag),
      sideways: { reading: (sheet.x[i] as number) - firstX, law: law.x - firstX, offset: dx, breaks: Math.abs(dx) > allowance },
    }
  })
}

function misfitOff(keys: readonly JudgedKey[]): number {
  const sum = keys.reduce((total, { offPath, allowance }) => total + (offPath && allowance ? Math.min(1e3, Math.abs(offPath) / allowance) ** 2 : 0), 0)
  return Math.sqrt(sum / Math.max(1, keys.length))
}

function faults(request: PointCheck, { sheet, series }: Flown, story: FlightStory, keys: readonly JudgedKey[], line: FlightLine, scale: Scale, claim: CheckResult['claim']): Finding[] {
  const found: Finding[] = []
  const { shift } = story
  const shifted = shift && keys[shift.at]
  if (shift && shifted) found.push(shiftFinding(shifted, shift.by * series.spanFrames, series.n - shift.at > shift.at))
  for (const i of story.bad) {
    const key = keys[i]
    if (!key) continue
    const speed = line.speed(series.x[i] as number)
    const law = line.at(series.x[i] as number)
    const way = ((sheet.x[i] as number) - law.x) * speed.x + ((sheet.y[i] as number) - law.y) * speed.y
    found.push(flightDrawingFinding(key, Math.sign(way) * aheadOf(key), request.unit))
  }
  if (scale.pace !== null && claim) {
    const off = Math.abs(Math.log(scale.pace))
    const told = off > Math.max(SCALE_FLOOR, Math.log(1 + request.tolerance)) && off > 1.6 * scale.spread
    const finding = told ? wrongScaleFinding(scale, claim.frames, claim.usedFrames) : null
    if (finding) found.push(finding)
  }
  return inOrder(found, keys)
}

/** Drawing units per second², downward, with its 95 % half-width; Infinity where the list doesn't settle it. */
function fallOf({ fit, out }: FlightStory, { n, span }: Series, { least }: Care): { fall: number, half: number } {
  const perNumber = 8 / (span * span)
  const free = 2 * (n - out.length) - freeOf(fit)
  const row = solve3(fit.normalY, [0, 0, 1], 3)
  const sigma = Math.sqrt(Math.max(fit.cost / free, least * least))
  const half = free < 1 || !row ? Infinity : perNumber * sigma * Math.sqrt(row[2] as number) * student95(free)
  return { fall: -perNumber * (fit.cy[2] as number), half }
}

/** The one gravity as a size: drawing units per metre, or m/s² where the scale is claimed. None where it points up. */
function flightScale(request: PointCheck, { fall, half }: { fall: number, half: number }): Scale {
  const subject = request.subject && !isBody(request.subject) ? request.subject : undefined
  const gravity = gravityOf(request.subject)
  const perMetre = subject?.unitsPerMetre
  if (!(fall > 0) || half === Infinity) return { size: null, pace: null, spread: Infinity, reach: Infinity, claimed: null }
  const wide = Math.min(half, 1e6 * fall)
  const unit = perMetre ?? gravity
  return {
    size: { value: fall / unit, low: Math.max(0, fall - wide) / unit, high: (fall + wide) / unit, unit: perMetre === undefined ? `${request.unit}/m` : 'm/s²' },
    pace: perMetre === undefined ? null : Math.sqrt(perMetre * gravity / fall),
    spread: wide < fall ? -0.5 * Math.log(1 - wide / fall) : Infinity,
    reach: wide / fall,
    claimed: perMetre === undefined ? null : gravity,
  }
}

const widthOf = (values: Float64Array) => Math.max(...values) - Math.min(...values)

/** Slower sideways over the last third of the list than over the first. */
function slows({ sheet, series }: Flown): boolean {
  const third = Math.max(1, Math.floor(sheet.n / 3))
  const pace = (from: number, to: number) => Math.abs((sheet.x[to] as number) - (sheet.x[from] as number)) / ((series.x[to] as number) - (series.x[from] as number))
  return pace(sheet.n - 1 - third, sheet.n - 1) < pace(0, third)
}
