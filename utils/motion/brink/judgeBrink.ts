/** Drawings of the centre of a body that goes over a brink: on the arc, and in the air after it. */
import { inOrder, wrongLawFinding } from '../findings'
import { STILL, without } from '../path/nothing'
import { asPosted, onSheet, sheetOf } from '../path/sheet'
import type { Judgement } from '../readings'
import { IN_THE_AIR } from '../release'
import { RADIAN, roundingSpread, seriesOf } from '../series'
import type { Series } from '../series'
import type { CheckResult, FoundPath, JudgedKey, Key, Place, PointCheck, PointKey } from '../types'
import { brinkFaults, misscaled } from './brinkFaults'
import { brinkFigures, brinkScale } from './brinkFigures'
import { brinkKeys, brinkLine } from './brinkLine'
import type { BrinkLine } from './brinkLine'
import { REACH, RIGHT, START, UP, releaseOfBrink } from './brinkModel'
import { brinkOpinion } from './brinkOpinion'
import { freeNumbers } from './brinkStories'
import type { Tipped } from './brinkStories'

/** Judges points as the centre of a body over a brink; `pivot` is the brink. Never throws and never answers NaN on what the contract lets through. */
export function judgeBrink(request: PointCheck): Judgement {
  const tipped = tippedOf(request)
  const { sheet, series } = tipped
  // As many drawings as settle the numbers, two each, and two that can contradict them.
  const needed = Math.ceil(freeNumbers(tipped, 'law').length / 2) + 2
  if (sheet.n < needed) return without(request, null, `${sheet.n} keys are too few for a fall over the edge: it takes ${needed} to tell.`)
  if (!(sheet.extent > 2 * request.slop)) return without(request, null, STILL)
  const opinion = brinkOpinion(tipped, story => misscaled(request, brinkScale(request, tipped, story), story.model.letting))
  if (!opinion) return without(request, null, 'No arc about a brink can be made out.')
  if (opinion.kind === 'in-the-air') return without(request, null, IN_THE_AIR)

  const { story, readsAs } = opinion
  const line = brinkLine(tipped, story)
  const keys = brinkKeys(request, tipped, line)
  const ruledBy = (rate: number) => ruled(request, tipped, line, rate)
  if (opinion.kind === 'wrong-law') {
    const misfit = readsAs.find(({ law }) => law === 'over-edge')?.misfit ?? 0
    const findings = [wrongLawFinding('over-edge', opinion.reads, misfit, keys)]
    return judged(request, tipped, line, null, {
      verdict: 'breaks', reason: null, keys, findings, readsAs, size: null, claim: null, figures: [],
      ruled: { fit: ruledBy(1).readings, claim: null }, ruledPoints: { fit: ruledBy(1).points, claim: null },
    })
  }
  const scale = brinkScale(request, tipped, story)
  const { pace } = scale
  const claim = pace === null ? null : { frames: Math.round(series.spanFrames / pace), usedFrames: series.spanFrames }
  const drawn = story.model.letting === 'law' ? keys : brinkKeys(request, tipped, line, story.model.letting)
  const findings = inOrder(brinkFaults(request, tipped, story, line, drawn, scale, claim), drawn)
  const [fit, claimed] = [ruledBy(1), pace === null ? null : ruledBy(pace)]
  return judged(request, tipped, line, pace, {
    verdict: findings.length > 0 || keys.some(key => key.breaks) ? 'breaks' : 'holds', reason: null,
    keys, findings, readsAs, size: scale.size, claim, figures: brinkFigures(request, tipped, story, line),
    ruled: { fit: fit.readings, claim: claimed && claimed.readings }, ruledPoints: { fit: fit.points, claim: claimed && claimed.points },
  })
}

function tippedOf(request: PointCheck): Tipped {
  const { fps, unit, slop, tolerance, subject, keys, pivot, start } = request
  const sheet = sheetOf(request)
  // The drawings' times alone, as a row that stands still.
  const series = seriesOf({
    law: 'over-edge', measure: 'distance', fps, unit, slop, tolerance, keys: keys.map(({ frame }) => ({ frame, reading: 0 })), ...(subject && { subject }),
  })
  const posted = Float64Array.from(keys.flatMap(({ x, y }) => [x, y]))
  return {
    sheet, series, brink: pivot ? onSheet(sheet, pivot) : null, atRest: start === 'rest',
    care: { slop, tolerance, least: roundingSpread(posted) },
  }
}

function judged(
  request: PointCheck, tipped: Tipped, line: BrinkLine, pace: number | null, result: Omit<CheckResult, 'path' | 'reads'>,
): Judgement {
  return {
    line: null, pace, placesAt: (frames, rate = 1) => placesAt(request, tipped, line, frames, rate),
    result: { ...result, reads: { measure: 'distance', unit: request.unit }, path: circleOf(request, tipped, line, result.keys) },
  }
}

function placesAt(request: PointCheck, { sheet, series }: Tipped, line: BrinkLine, frames: readonly number[], rate: number): Place[] {
  const { x, y } = line.at(frames.map(frame => rate * timeOf(request, series, frame)))
  return Array.from(x, (across, i) => asPosted(sheet, { x: across, y: y[i] as number }))
}

const timeOf = ({ keys }: PointCheck, { spanFrames }: Series, frame: number) => (frame - (keys[0]?.frame ?? 0)) / spanFrames

/** The line on the list's own frames, run `rate` times as fast from the same start. */
function ruled(request: PointCheck, tipped: Tipped, line: BrinkLine, rate: number): { readings: Key[], points: PointKey[] } {
  const frames = request.keys.map(({ frame }) => frame)
  const places = placesAt(request, tipped, line, frames, rate)
  const ways = line.ways(tipped.series.x.map(x => rate * x))
  return {
    readings: frames.map((frame, i) => ({ frame, reading: ways[i] as number })),
    points: frames.map((frame, i) => ({ frame, ...(places[i] as Place) })),
  }
}

/** The arc that the body turns on while it is on the brink; what comes after is a parabola, and in `ruledPoints`. */
function circleOf({ pivot }: PointCheck, { sheet, series }: Tipped, { numbers }: BrinkLine, keys: readonly JudgedKey[]): FoundPath {
  const strained = keys.map(({ offPath, allowance }) => (offPath && allowance ? Math.min(1e3, Math.abs(offPath) / allowance) : 0))
  // The angle from upright runs clockwise on the screen: from y up towards x right.
  const bearing = 90 - (numbers[START] as number) / RADIAN
  return {
    kind: 'circle', centre: pivot ?? asPosted(sheet, { x: numbers[RIGHT] as number, y: numbers[UP] as number }),
    radius: Math.exp(numbers[REACH] as number), given: pivot !== undefined, nearlyStraight: false,
    misfit: Math.sqrt(strained.reduce((sum, value) => sum + value * value, 0) / Math.max(1, keys.length)),
    zeroAt: sheet.up * bearing, counts: sheet.up * releaseOfBrink(numbers, series.edgeRatio, 'law').turn > 0 ? -1 : 1,
  }
}
