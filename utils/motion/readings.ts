/** A list of readings under one law, judged. */
import { explained, opine, plainRivals, ranked, weigh } from './choose'
import type { Rival } from './choose'
import { endToEnd } from './endToEnd'
import { figuresOf } from './figures'
import { backwardFinding, inOrder, misplacedFinding, notAtRestFinding, shiftFinding, wrongLawFinding, wrongReleaseFinding, wrongScaleFinding } from './findings'
import { badDrawings, plainFit, stories } from './hypotheses'
import type { Care, Plain, Story } from './hypotheses'
import { fromRest, fullNumbers } from './laws/fromRest'
import { LAWS, LAW_WORDS, MEASURES, freerThan, rivalsOf } from './laws/index'
import { letGoFrames } from './letGo'
import { ruledList, traceLine } from './line'
import type { Line } from './line'
import { fromStandstill, outset } from './outset'
import { judgeKeys, unjudged } from './perKey'
import { claimFromRest } from './claimFromRest'
import { IN_THE_AIR, allInTheAir, wrongRelease } from './release'
import type { OwnRelease } from './release'
import { roundingSpread, roundingStep, seriesOf } from './series'
import type { Series } from './series'
import { scaleOf } from './size'
import type { Scale } from './size'
import { canRest } from './standstill'
import { alreadyMoving, beyondDoubt } from './start'
import type { Considered } from './start'
import { joined, toldInTheirTurn, turnsToAdd } from './turns'
import type { CheckRequest, CheckResult, ClaimFrames, Finding, JudgedKey, Law, LawMisfit, Place, ReadingCheck } from './types'

export interface Judgement {
  result: CheckResult
  /** The law's line, for `lawCurve`; null where none could be fitted. */
  line: Line | null
  /** Claimed pace over the list's own, for drawing the claim's curve: 1 where they agree, null without a claimed size. */
  pace: number | null
  /** Of a list of points: the readings that its timing was judged by, for `lawCurve`; of a flight its way down. */
  along?: ReadingCheck
  /**
   * Of a list of points: the law's places at any frames, whole or not, y as posted; `rate` > 1 runs the same motion faster from the same
   * start. Missing where no law was fitted.
   */
  placesAt?: (frames: readonly number[], rate?: number) => Place[]
  /** Of a divided list: every span as the list of its own that it was judged as, for drawing each line. */
  parts?: { request: CheckRequest, judgement: Judgement }[]
}

const STILL = 'Nothing moves further than the slop, so there is nothing to judge.'
const SCALE_FLOOR = 0.03
const TURNING: readonly Law[] = ['pendulum', 'swing-decay', 'bounce']

/** Judges a list of readings; `spans` are left alone. Never throws and never answers NaN on what the contract lets through. */
export function judgeReadings(request: ReadingCheck): Judgement {
  const turns = request.law === 'spin' ? turnsToAdd(request) : null
  if (turns) return toldInTheirTurn(judgeRow(joined(request, turns)), request, turns)
  return judgeRow(request)
}

/** What the list reads as if its readings begin again at every full turn; null where they don't, or break all the same. */
function asSpin(request: ReadingCheck): LawMisfit | null {
  if (!turnsToAdd(request)) return null
  const { verdict, readsAs } = judgeReadings({ ...request, law: 'spin' }).result
  return verdict === 'holds' ? readsAs.find(({ law }) => law === 'spin') ?? null : null
}

function judgeRow(request: ReadingCheck): Judgement {
  const series = seriesOf(request)
  if (request.law === 'flight') return undecided(request, 'A flight is held against points, not readings.')
  const model = LAWS[request.law]
  if (!MEASURES[request.law].includes(request.measure)) return undecided(request, `A ${request.measure} can't be held against ${LAW_WORDS[request.law]}.`)
  const laws = rivalsOf(request.law, request.measure, series)
  const resting = request.start === 'rest' && canRest(request.law) ? request.law : null
  // A speed that is given need not be found.
  const needed = model.size + (resting ? 1 : 2)
  if (series.n < needed) {
    return undecided(request, `${series.n} keys are too few for ${LAW_WORDS[request.law]}: it takes ${needed} to tell.`)
  }
  const range = Math.max(...series.y) - Math.min(...series.y)
  if (!(range > 2 * request.slop)) return undecided(request, STILL)

  const care: Care = { slop: request.slop, tolerance: request.tolerance, least: roundingSpread(series.y) }
  const rivals = plainRivals(series, request.law, laws, care)
  const plain = plainFit(series, model, care)
  const atRest = resting && consider(request, series, plainFit(series, fromRest(resting, plain.fit.numbers), care), rivals, care, range)
  if (atRest && moves(atRest, care) && beyondDoubt(series, atRest, plain.fit, care)) return answer(request, series, atRest, care)
  const free = consider(request, series, plain, rivals, care, range)
  if (!moves(free, care)) return undecided(request, STILL)
  if (request.law === 'over-edge') {
    // Before the start is doubted: a push would let go early too.
    const own = wrongRelease(series, atRest || free, care, Boolean(atRest))
    if (own) return letGoWrongly(request, series, own, atRest || free, care)
    if (allInTheAir(series, free)) return undecided(request, IN_THE_AIR)
  }
  if (atRest && alreadyMoving(series, atRest, free, care)) return notAtRest(request, series, atRest, free, care)
  return answer(request, series, atRest ?? free, care)
}

/** Pencil alone can spread still drawings over the slop; what has to move is the line. */
function moves({ choice }: Considered, { slop }: Care): boolean {
  const { value } = choice.claimed.story.fit.trace
  return Math.max(...value) - Math.min(...value) > 2 * slop
}

/** Holds a law, as it is or as it starts from rest, against a list beside every other that the measure can take. */
function consider(request: ReadingCheck, series: Series, plain: Plain, rivals: readonly Rival[], care: Care, range: number): Considered {
  const { law } = plain.fit.model
  const told = stories(series, plain, care)
  let choice = weigh(series, law, rivals, told, care)
  if (!explained(series, choice, care)) {
    const known = [law, ...rivals.map(rival => rival.law)]
    choice = weigh(series, law, [...rivals, ...plainRivals(series, law, freerThan(known, request.measure, series, request.slop), care)], told, care)
  }
  const { story } = choice.claimed
  const scale = scaleOf(request, series, story.fit, series.n - story.out.length, care.least)
  return { choice, scale, opinion: opine(series, choice, care, range, scale) }
}

function answer(request: ReadingCheck, series: Series, { choice, scale, opinion }: Considered, care: Care): Judgement {
  const { story } = choice.claimed
  const readsAs = ranked(choice).map(({ law, misfit }) => ({ law, misfit }))

  if (opinion.kind === 'wrong-law') {
    // Stories told to save the claimed law mean nothing once it is given up: the line is its plain best, or one that shows its curve.
    const line = endToEnd(series, lineFrom(choice.plain, 0), care.slop)
    const keys = judgeKeys(request, series, traceLine(series, line, series.x))
    const amount = readsAs.find(({ law }) => law === request.law)?.misfit ?? 0
    // Even spacing of an angle and a spin are one law, told apart only by a turn that begins again: asked where nothing else explains it.
    const spin = request.law === 'steady' && opinion.reads === null ? asSpin(request) : null
    const findings = [wrongLawFinding(request.law, spin ? spin.law : opinion.reads, amount, keys)]
    return {
      line, pace: null,
      result: { verdict: 'breaks', reason: null, keys, findings, readsAs: spin ? [spin, ...readsAs] : readsAs, size: null, claim: null, ruled: { fit: ruledList(series, line, request), claim: claimFromRest(request, series) } },
    }
  }

  const still = fromStandstill(series, story, choice.sigma, care)
  const line = lineOf(request, series, still ?? story)
  const trace = traceLine(series, line, series.x)
  const keys = judgeKeys(request, series, trace)
  const claim = claimFrames(series, scale)
  const ruled = ruledBy(request, series, line, still ? scaleOf(request, series, still.fit, series.n - story.out.length, care.least) : scale)
  const figures = figuresOf(request, series, story.fit, line, series.n - story.out.length, care.least)
  if (opinion.kind === 'too-short') {
    return {
      line, pace: scale.pace,
      result: {
        verdict: 'undecided', reason: 'The gaps are too alike, and too small beside the slop, to tell one law from another.',
        keys, findings: [], readsAs, size: scale.size, claim, ruled, figures,
      },
    }
  }
  const findings = inOrder(faultFindings(request, series, story, scale, keys, trace.rate, care), keys)
  const breaks = findings.length > 0 || keys.some(key => key.breaks)
  return {
    line, pace: scale.pace,
    result: { verdict: breaks ? 'breaks' : 'holds', reason: null, keys, findings, readsAs, size: scale.size, claim, ruled, figures },
  }
}

/**
 * The list is the claimed law's, but under way before its first drawing. The line is the best that does start from rest there; what else
 * is wrong, and the size, are read off the motion as it was drawn, or one fault would be told as many.
 */
function notAtRest(request: ReadingCheck, series: Series, atRest: Considered, free: Considered, care: Care): Judgement {
  const { story } = free.choice.claimed
  const line = lineFrom(atRest.choice.plain, 0)
  const keys = judgeKeys(request, series, traceLine(series, line, series.x))
  const drawn = traceLine(series, lineOf(request, series, story), series.x)
  const drawnKeys = judgeKeys(request, series, drawn)
  const numbers = fullNumbers(story.fit.model, story.fit.numbers)
  const before = letGoFrames(request.law, series, numbers)
  const first = keys[0] as JudgedKey
  const [still = first.reading] = story.fit.model.trace(series, numbers, Float64Array.of(-(before ?? 0) / series.spanFrames), false).value
  const moving = Math.abs(first.reading - still) > request.slop
  // Drawings that wait for a late start sit off the motion's line for that very reason.
  const waits = (frame: number) => !moving && before !== null && frame < first.frame - before
  const findings = inOrder([
    notAtRestFinding(first, before, series.spanFrames, moving || before === null || before > 0),
    ...faultFindings(request, series, story, free.scale, drawnKeys, drawn.rate, care).filter(({ frames }) => !frames.some(waits)),
  ], drawnKeys)
  return {
    line, pace: atRest.scale.pace,
    result: {
      verdict: 'breaks', reason: null, keys, findings, readsAs: ranked(free.choice).map(({ law, misfit }) => ({ law, misfit })),
      size: free.scale.size, claim: claimFrames(series, free.scale), ruled: ruledBy(request, series, line, atRest.scale),
    },
  }
}

/**
 * Turns like the body on the arc, but lets go where it wouldn't. The line is the law's from the same start, so that drawings after the
 * brink show where they should have gone; what else is wrong, and the size, are read off the motion as it was drawn.
 */
function letGoWrongly(request: ReadingCheck, series: Series, own: OwnRelease, { choice }: Considered, care: Care): Judgement {
  const { story } = own
  const { lag } = lineOf(request, series, story)
  const line: Line = { law: 'over-edge', numbers: Array.from(fullNumbers(story.fit.model, story.fit.numbers).subarray(0, 3)), lag }
  const keys = judgeKeys(request, series, traceLine(series, line, series.x))
  const drawn = story.fit.model.trace(series, story.fit.numbers, series.x.map(x => x - lag), false)
  const drawnKeys = judgeKeys(request, series, drawn)
  const scale = scaleOf(request, series, story.fit, series.n - story.out.length, care.least)
  const findings = inOrder(
    [wrongReleaseFinding(own, keys[own.after] as JudgedKey), ...faultFindings(request, series, story, scale, drawnKeys, drawn.rate, care)], drawnKeys,
  )
  return {
    line, pace: scale.pace,
    result: {
      verdict: 'breaks', reason: null, keys, findings, readsAs: ranked(choice).map(({ law, misfit }) => ({ law, misfit })),
      size: scale.size, claim: claimFrames(series, scale), ruled: ruledBy(request, series, line, scale),
      figures: figuresOf(request, series, story.fit, line, series.n - story.out.length, care.least),
    },
  }
}

function claimFrames({ spanFrames }: Series, { pace }: Scale): ClaimFrames | null {
  return pace === null ? null : { frames: Math.round(spanFrames / pace), usedFrames: spanFrames }
}

function ruledBy(request: ReadingCheck, series: Series, line: Line, { pace }: Scale): CheckResult['ruled'] {
  return { fit: ruledList(series, line, request), claim: pace === null ? null : ruledList(series, line, request, pace) }
}

/** What is wrong with a list that keeps its law, in no order. */
function faultFindings(
  request: ReadingCheck, series: Series, story: Story, scale: Scale, keys: readonly JudgedKey[], rate: Float64Array, care: Care,
): Finding[] {
  return [
    ...shiftFindings(series, story, keys),
    ...drawingFindings(request, series, story, keys, rate, care),
    ...scaleFindings(request, scale, claimFrames(series, scale)),
  ]
}

function undecided(request: ReadingCheck, reason: string): Judgement {
  return {
    line: null, pace: null,
    result: {
      verdict: 'undecided', reason, keys: unjudged(request), findings: [], readsAs: [], size: null, claim: null,
      ruled: { fit: [], claim: null },
    },
  }
}

/** The line runs with the longer side of a held or skipped drawing, so that as few drawings as possible are called off. */
function lineOf(request: ReadingCheck, series: Series, story: Story): Line {
  const { shift } = story
  const lag = shift && series.n - shift.at > shift.at ? shift.by : 0
  const line = lineFrom(story, lag)
  const waits = lag > 0 ? outset(series, line) : null
  return waits === null ? line : { ...line, waits }
}

function lineFrom({ fit }: Story, lag: number): Line {
  return { law: fit.model.law, numbers: Array.from(fullNumbers(fit.model, fit.numbers)), lag }
}

function shiftFindings(series: Series, story: Story, keys: readonly JudgedKey[]): Finding[] {
  const { shift } = story
  const key = shift ? keys[shift.at] : undefined
  if (!shift || !key) return []
  return [shiftFinding(key, shift.by * series.spanFrames, series.n - shift.at > shift.at)]
}

/** Misplaced drawings and those that run backward: a drawing is told of once. */
function drawingFindings(
  request: ReadingCheck, series: Series, story: Story, keys: readonly JudgedKey[], rate: Float64Array, care: Care,
): Finding[] {
  // A swing and a bounce turn by their nature, whatever part of them a list shows.
  const way = TURNING.includes(request.law) ? 0 : oneWay(keys, rate, request.slop)
  // Rounding alone can add one step to what the slop allows.
  const least = (request.slop + roundingStep(series.y)) * (1 + 1e-9)
  const bad = badDrawings(series, story, care)
  const told = new Set(bad)
  /** How far key i runs against the motion from the last drawing before it that holds. */
  const backStep = (i: number) => {
    let before = i - 1
    while (told.has(before)) before--
    const here = keys[i]
    const there = keys[before]
    return way === 0 || !here || !there ? 0 : way * (there.reading - here.reading)
  }
  const found: Finding[] = []
  for (const i of bad) {
    const key = keys[i]
    if (!key) continue
    const step = backStep(i)
    found.push(step > least ? backwardFinding(key, step, request.unit) : misplacedFinding(key, request.unit))
  }
  for (let i = 1; i < series.n; i++) {
    const key = keys[i]
    if (!key || told.has(i) || i === story.shift?.at) continue
    const step = backStep(i)
    if (step > least) found.push(backwardFinding(key, step, request.unit))
  }
  return found
}

/** +1 or −1 where the law only ever goes that way over the list, save for less than the slop; 0 where it turns. */
function oneWay(keys: readonly JudgedKey[], rate: Float64Array, slop: number): number {
  let up = 0
  let down = 0
  for (let i = 1; i < keys.length; i++) {
    const step = (keys[i]?.law ?? 0) - (keys[i - 1]?.law ?? 0)
    if (step > 0) up += step
    else down -= step
  }
  // An apex between two drawings shows in the speeds, not in the steps.
  const turns = Math.sign(rate[0] ?? 0) * Math.sign(rate[rate.length - 1] ?? 0) < 0
  if (Math.min(up, down) > slop || (turns && Math.min(up, down) > slop / 4)) return 0
  return up >= down ? 1 : -1
}

function scaleFindings(request: ReadingCheck, scale: Scale, claim: ClaimFrames | null): Finding[] {
  if (scale.pace === null || !claim) return []
  const off = Math.abs(Math.log(scale.pace))
  // Nobody notices gaps that are off by less than the tolerance, and a size that the list can't tell from the claim is no fault.
  if (off <= Math.max(SCALE_FLOOR, Math.log(1 + request.tolerance)) || off <= 1.6 * scale.spread) return []
  const finding = wrongScaleFinding(scale, claim.frames, claim.usedFrames)
  return finding ? [finding] : []
}

