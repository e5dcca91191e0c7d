/** One span judged as a list of its own. */
import { misplacedFinding } from '../findings'
import { MOST_TOGETHER, longestRun } from '../hypotheses'
import { judgeKeys } from '../perKey'
import { judgePoints } from '../points'
import { judgeReadings } from '../readings'
import type { Judgement } from '../readings'
import { seriesOf } from '../series'
import type { CheckRequest, CheckResult, JudgedKey, ReadingCheck } from '../types'
import type { Part } from './divide'
import { rootMean } from './rootMean'
import { oneCaseDown } from './words'

/** What the judges of whole lists are promised: the contract lets nothing shorter through. */
const CHECKED_KEYS = 3

export interface JudgedPart extends Part { judgement: Judgement }

/** Judges a part by the judge of its measure. */
export function judgePart(part: Part): JudgedPart {
  const judgement = judgeAlone(part.request)
  return { ...part, judgement: named(judgement, part) }
}

/** Judges a part that is the whole list: what concerns it all names no frames. */
export function judgeAsWhole(part: Part): JudgedPart {
  return { ...part, judgement: judgeAlone(part.request) }
}

function judgeAlone(request: CheckRequest): Judgement {
  const judgement = request.keys.length < CHECKED_KEYS
    ? tooFew(request)
    : request.measure === 'point' ? judgePoints(request) : judgeReadings(request)
  if (judgement.result.verdict !== 'undecided' || request.measure === 'point' || request.law !== 'steady') return judgement
  return standing(request) ?? judgement
}

function tooFew({ keys }: CheckRequest): Judgement {
  const reason = `${keys.length} ${keys.length === 1 ? 'key is' : 'keys are'} too few to tell anything.`
  const result: CheckResult = {
    verdict: 'undecided', reason, findings: [], readsAs: [], size: null, claim: null, ruled: { fit: [], claim: null },
    keys: keys.map((key, i) => ({
      frame: key.frame, reading: 'reading' in key ? key.reading : 0, law: null, offset: null, offsetFrames: null,
      gap: gapBetween(key, keys[i + 1]), lawGap: null, allowance: null, breaks: false,
      ...('x' in key ? { point: { x: key.x, y: key.y } } : {}),
    })),
  }
  return { line: null, pace: null, result }
}

function gapBetween(here: CheckRequest['keys'][number], next: CheckRequest['keys'][number] | undefined): number | null {
  return next && 'reading' in here && 'reading' in next ? next.reading - here.reading : null
}

/**
 * The judgement of a span that stands still: even spacing of no gap, within a list a motion like any other. Null where its drawings don't
 * keep to their middle, but for a few lone ones.
 */
function standing(request: ReadingCheck): Judgement | null {
  const series = seriesOf(request)
  const ordered = series.y.slice().sort()
  const median = ordered[ordered.length >> 1] ?? 0
  const near = ordered.filter(reading => Math.abs(reading - median) <= 1.5 * request.slop)
  if (near.length < 2) return null
  const middle = near.reduce((sum, reading) => sum + reading / near.length, 0)
  const none = new Float64Array(series.n)
  const keys = judgeKeys(request, series, { value: none.map(() => middle), rate: none, columns: [] })
  const off = keys.flatMap(({ breaks }, i) => (breaks ? [i] : []))
  if (off.length > series.n / 4 || longestRun(off) > MOST_TOGETHER) return null
  return {
    line: { law: 'steady', numbers: [middle, 0], lag: 0 },
    pace: null,
    result: {
      verdict: off.length > 0 ? 'breaks' : 'holds', reason: null, keys,
      findings: off.map(i => misplacedFinding(keys[i] as JudgedKey, request.unit)),
      readsAs: [{ law: 'steady', misfit: rootMean(keys) }], size: null, claim: null,
      ruled: { fit: request.keys.map(({ frame }) => ({ frame, reading: middle })), claim: null },
    },
  }
}

/** The same judgement saying which span it speaks of: what concerns the whole of a part concerns its frames in the list. */
function named(judgement: Judgement, { request }: Part): Judgement {
  const { result } = judgement
  const from = request.keys[0]?.frame ?? 0
  const to = request.keys[request.keys.length - 1]?.frame ?? from
  const where = `From frame ${from} to ${to}`
  return {
    ...judgement,
    result: {
      ...result,
      reason: result.reason === null ? null : `${where}: ${oneCaseDown(result.reason)}`,
      findings: result.findings.map(finding => (finding.frames.length > 0 && finding.kind !== 'not-at-rest'
        ? finding
        : {
            ...finding,
            frames: finding.frames.length > 0 ? finding.frames : [from, to],
            text: `${where}: ${oneCaseDown(finding.text)}`,
          })),
    },
  }
}
