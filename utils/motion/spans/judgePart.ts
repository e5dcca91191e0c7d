/** One span judged as a list of its own. */
import { oneCaseDown } from './words'
import { judgeKeys } from '../perKey'
import { judgePoints } from '../points'
import { judgeReadings } from '../readings'
import type { Judgement } from '../readings'
import { seriesOf } from '../series'
import type { CheckRequest, CheckResult, ReadingCheck } from '../types'
import type { Part } from './divide'

/** What the judges of whole lists are promised: the contract lets nothing shorter through. */
const CHECKED_KEYS = 3

export interface JudgedPart extends Part { judgement: Judgement }

/** Judges a part by the judge of its measure. A span that stands still is even spacing of no gap: within a list that is a motion like any other. */
export function judgePart(part: Part): JudgedPart {
  const { request } = part
  const still = request.measure === 'point' || request.law !== 'steady' ? null : standing(request)
  if (still) return { ...part, judgement: still }
  const judgement = request.keys.length < CHECKED_KEYS
    ? tooFew(request)
    : request.measure === 'point' ? judgePoints(request) : judgeReadings(request)
  return { ...part, judgement: named(judgement, part) }
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

/** The judgement of a span whose drawings all lie within the slop of their middle; null for any other. */
function standing(request: ReadingCheck): Judgement | null {
  const readings = request.keys.map(({ reading }) => reading)
  const low = Math.min(...readings)
  const high = Math.max(...readings)
  if (readings.length < 2 || high - low > 2 * request.slop) return null
  const middle = low + (high - low) / 2
  const series = seriesOf(request)
  const none = new Float64Array(series.n)
  const keys = judgeKeys(request, series, { value: none.map(() => middle), rate: none, columns: [] })
  if (keys.some(({ breaks }) => breaks)) return null
  return {
    line: { law: 'steady', numbers: [middle, 0], lag: 0 },
    pace: null,
    result: {
      verdict: 'holds', reason: null, keys, findings: [], readsAs: [{ law: 'steady', misfit: 0 }], size: null, claim: null,
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
