/** The judge: a list and its claim in, what holds and what breaks out. Same list, same answer. */
import { opine, ranked, weigh } from './choose'
import { backwardFinding, inOrder, misplacedFinding, shiftFinding, wrongLawFinding, wrongScaleFinding } from './findings'
import { badDrawings, stories } from './hypotheses'
import type { Care, Story } from './hypotheses'
import { ruledFromRest } from './fromRest'
import { LAWS, LAW_WORDS, lawsFor } from './laws/index'
import { ruledList, traceLine } from './line'
import type { Line } from './line'
import { judgeKeys, unjudged } from './perKey'
import { roundingSpread, roundingStep, seriesOf } from './series'
import type { Series } from './series'
import { scaleOf } from './size'
import type { Scale } from './size'
import type { CheckRequest, CheckResult, ClaimFrames, Finding, JudgedKey } from './types'

export interface Judgement {
  result: CheckResult
  /** The law's line, for `lawCurve`; null where none could be fitted. */
  line: Line | null
  /** Claimed pace over the list's own, for drawing the claim's curve: 1 where they agree, null without a claimed size. */
  pace: number | null
}

const STILL = 'Nothing moves further than the slop, so there is nothing to judge.'
const SCALE_FLOOR = 0.03

/** Judges a list. Expects what the contract lets through (3–2,000 keys, finite readings); then never throws and never answers NaN. */
export function judge(request: CheckRequest): CheckResult {
  return judgeInDepth(request).result
}

/** `judge`, with the line that the screens draw. */
export function judgeInDepth(request: CheckRequest): Judgement {
  const series = seriesOf(request)
  const model = LAWS[request.law]
  const laws = lawsFor(request.measure)
  if (!laws.includes(request.law)) return undecided(request, `A ${request.measure} can't be held against ${LAW_WORDS[request.law]}.`)
  const needed = model.size + 2
  if (series.n < needed) {
    return undecided(request, `${series.n} keys are too few for ${LAW_WORDS[request.law]}: it takes ${needed} to tell.`)
  }
  const range = Math.max(...series.y) - Math.min(...series.y)
  if (!(range > 2 * request.slop)) return undecided(request, STILL)

  const care: Care = { slop: request.slop, tolerance: request.tolerance, least: roundingSpread(series.y) }
  const choice = weigh(series, request.law, laws, stories(series, model, care), care)
  const { value: drawn } = choice.claimed.story.fit.trace
  // Pencil alone can spread still drawings over the slop; what has to move is the line.
  if (!(Math.max(...drawn) - Math.min(...drawn) > 2 * request.slop)) return undecided(request, STILL)
  const { story } = choice.claimed
  const scale = scaleOf(request, series, story.fit, series.n - story.out.length, care.least)
  const opinion = opine(series, choice, care, range, scale)
  const readsAs = ranked(choice).map(({ law, misfit }) => ({ law, misfit }))

  if (opinion.kind === 'wrong-law') {
    // Stories told to save the claimed law mean nothing once it is given up: the line is its plain best.
    const plain = choice.plain
    const line: Line = { law: request.law, numbers: Array.from(plain.fit.numbers), lag: 0 }
    const keys = judgeKeys(request, series, traceLine(series, line, series.x))
    const amount = readsAs.find(({ law }) => law === request.law)?.misfit ?? 0
    const findings = [wrongLawFinding(request.law, opinion.reads, amount, keys)]
    return {
      line, pace: null,
      result: { verdict: 'breaks', reason: null, keys, findings, readsAs, size: null, claim: null, ruled: { fit: ruledList(series, line, request), claim: ruledFromRest(request, series) } },
    }
  }

  const line = lineOf(request, series, story)
  const trace = traceLine(series, line, series.x)
  const keys = judgeKeys(request, series, trace)
  const used = series.spanFrames
  const claim: ClaimFrames | null = scale.pace === null ? null : { frames: Math.round(used / scale.pace), usedFrames: used }
  const ruled = {
    fit: ruledList(series, line, request),
    claim: scale.pace === null ? null : ruledList(series, line, request, scale.pace),
  }
  if (opinion.kind === 'too-short') {
    return {
      line, pace: scale.pace,
      result: {
        verdict: 'undecided', reason: 'The gaps are too alike, and too small beside the slop, to tell one law from another.',
        keys, findings: [], readsAs, size: scale.size, claim, ruled,
      },
    }
  }
  const findings = inOrder([
    ...shiftFindings(series, story, keys),
    ...drawingFindings(request, series, story, keys, trace.rate, care),
    ...scaleFindings(request, scale, claim),
  ], keys)
  const breaks = findings.length > 0 || keys.some(key => key.breaks)
  return {
    line, pace: scale.pace,
    result: { verdict: breaks ? 'breaks' : 'holds', reason: null, keys, findings, readsAs, size: scale.size, claim, ruled },
  }
}

function undecided(request: CheckRequest, reason: string): Judgement {
  return {
    line: null, pace: null,
    result: {
      verdict: 'undecided', reason, keys: unjudged(request), findings: [], readsAs: [], size: null, claim: null,
      ruled: { fit: [], claim: null },
    },
  }
}

/** The line runs with the longer side of a held or skipped drawing, so that as few drawings as possible are called off. */
function lineOf(request: CheckRequest, series: Series, story: Story): Line {
  const { shift, fit } = story
  const lag = shift && series.n - shift.at > shift.at ? shift.by : 0
  return { law: request.law, numbers: Array.from(fit.numbers), lag }
}

function shiftFindings(series: Series, story: Story, keys: readonly JudgedKey[]): Finding[] {
  const { shift } = story
  const key = shift ? keys[shift.at] : undefined
  if (!shift || !key) return []
  return [shiftFinding(key, shift.by * series.spanFrames, series.n - shift.at > shift.at)]
}

/** Misplaced drawings and those that run backward: a drawing is told of once. */
function drawingFindings(
  request: CheckRequest, series: Series, story: Story, keys: readonly JudgedKey[], rate: Float64Array, care: Care,
): Finding[] {
  // A swing turns by its nature, whatever part of it a list shows.
  const way = request.law === 'pendulum' ? 0 : oneWay(keys, rate, request.slop)
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

function scaleFindings(request: CheckRequest, scale: Scale, claim: ClaimFrames | null): Finding[] {
  if (scale.pace === null || !claim) return []
  const off = Math.abs(Math.log(scale.pace))
  // Nobody notices gaps that are off by less than the tolerance, and a size that the list can't tell from the claim is no fault.
  if (off <= Math.max(SCALE_FLOOR, Math.log(1 + request.tolerance)) || off <= 1.6 * scale.spread) return []
  const finding = wrongScaleFinding(scale, claim.frames, claim.usedFrames)
  return finding ? [finding] : []
}

