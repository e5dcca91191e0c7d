/**
 * A bounce on the drawing: its height is judged as a bounce, sideways it goes evenly, hops and all (nothing rubs but the short contacts).
 * One cause is told once: what shows in both ways is told by the height.
 */
import { inOrder } from '../findings'
import { lawCurve, ruledList, traceLine } from '../line'
import type { Line } from '../line'
import { judgeKeys } from '../perKey'
import { judgeReadings } from '../readings'
import type { Judgement } from '../readings'
import { seriesOf } from '../series'
import type { CheckResult, Finding, JudgedKey, Key, Place, PointCheck, PointKey, ReadingCheck } from '../types'
import { STILL, without } from './nothing'
import { asPosted, sheetOf } from './sheet'

/** What a fault in time does to both ways at once. */
const SHIFTS: readonly Finding['kind'][] = ['held', 'skipped']

function sidewaysFinding(finding: Finding): Finding {
  return finding.kind === 'wrong-law'
    ? { ...finding, text: 'Sideways its speed changes, and a bounce keeps it from hop to hop.' }
    : { ...finding, text: finding.text.replace(/ the line\)\.$/, ' its place sideways).').replace(/ the line\.$/, ' its place sideways.') }
}

/** What is wrong sideways and not told yet. */
function newSideways(height: readonly Finding[], sideways: readonly Finding[]): Finding[] {
  const whole = height.some(({ kind }) => kind === 'wrong-law')
  const shifted = height.some(({ kind }) => SHIFTS.includes(kind))
  const told = new Set(height.flatMap(({ frames }) => frames))
  return sideways
    .filter(({ kind, frames }) => !whole && !(shifted && (SHIFTS.includes(kind) || kind === 'wrong-law')) && !frames.some(frame => told.has(frame)))
    .map(sidewaysFinding)
}

/** Judges points as a bounce. `reading` counts the height above the lowest drawing. */
export function judgeBouncing(request: PointCheck): Judgement {
  const sheet = sheetOf(request)
  if (!(sheet.extent > 2 * request.slop)) return without(request, null, STILL)
  const { fps, unit, slop, tolerance, start, subject } = request
  const low = Math.min(...sheet.y)
  const firstX = sheet.x[0] as number
  const row = (law: 'bounce' | 'steady', readings: Float64Array): ReadingCheck =>
    ({ law, fps, unit, slop, tolerance, measure: 'distance', keys: request.keys.map(({ frame }, i) => ({ frame, reading: readings[i] as number })) })
  const up: ReadingCheck = { ...row('bounce', sheet.y.map(y => y - low)), ...(start && { start }), ...(subject && { subject }) }
  const across = row('steady', sheet.x.map(x => x - firstX))
  const sideways = judgeReadings(across)
  const height = heightOf(up, sideways)
  const sideLine = sideways.line
  // A ball that bounces in place, or one that hardly travels, has no sideways motion to be wrong about.
  const travels = sideways.result.verdict !== 'undecided' && sideLine !== null
  const { result } = height
  const keys = result.keys.map((key, i): JudgedKey => {
    const side = sideways.result.keys[i] as JudgedKey
    const { x, y } = request.keys[i] as PointKey
    const lawX = travels ? side.law : side.reading
    const breaks = travels && side.breaks && key.law !== null
    return {
      ...key, point: { x, y },
      lawPoint: key.law === null || lawX === null ? null : asPosted(sheet, { x: firstX + lawX, y: low + key.law }),
      breaks: key.breaks || breaks,
      sideways: { reading: side.reading, law: travels ? side.law : null, offset: travels ? side.offset : null, breaks },
    }
  })
  const decided = result.verdict !== 'undecided'
  const findings = decided ? inOrder([...result.findings, ...(travels ? newSideways(result.findings, sideways.result.findings) : [])], keys) : []
  const xAt = (frames: readonly number[], rate: number) => (travels && sideLine
    ? lawCurve(sideLine, across, frames, rate)
    : frames.map(frame => nearest(across.keys, frame)))
  const { line } = height
  const placesAt = (frames: readonly number[], rate = 1): Place[] => {
    const heights = line ? lawCurve(line, up, frames, rate) : []
    const xs = xAt(frames, rate)
    return heights.map((reading, i) => asPosted(sheet, { x: firstX + (xs[i] as number), y: low + reading }))
  }
  const frames = request.keys.map(key => key.frame)
  const points = (rate: number): PointKey[] => placesAt(frames, rate).map((place, i) => ({ frame: frames[i] as number, ...place }))
  const full: CheckResult = {
    ...result, keys, findings, path: null, reads: { measure: 'distance', unit },
    verdict: decided && (findings.length > 0 || keys.some(key => key.breaks)) ? 'breaks' : result.verdict,
    ruledPoints: { fit: line ? points(1) : [], claim: line && result.ruled.claim ? points(height.pace ?? 1) : null },
  }
  return line ? { ...height, result: full, along: up, placesAt } : { ...height, result: full, along: up }
}

/**
 * The height judged. Between two contacts a held drawing could as well be another bounce; sideways it can't hide. So a drawing that sideways
 * shows as held or skipped is taken for that where the height, with its time put right, has less to be blamed for.
 */
function heightOf(up: ReadingCheck, sideways: Judgement): Judgement {
  const plain = judgeReadings(up)
  const shift = sideways.result.findings.find(({ kind }) => SHIFTS.includes(kind))
  const at = shift ? up.keys.findIndex(key => key.frame === shift.frames[0]) : -1
  if (!shift || at < 1 || plain.result.verdict !== 'breaks') return plain
  const late = shift.kind === 'held' ? shift.amount : -shift.amount
  const timed = up.keys.map((key, i) => ({ key, frame: i >= at ? Math.round(key.frame - late) : key.frame }))
  // The drawing that is held stands for one that has been seen already.
  const kept = timed.filter(({ frame }, i) => i !== at || frame > (timed[i - 1]?.frame ?? -Infinity))
  const righted: ReadingCheck = { ...up, keys: kept.map(({ key, frame }) => ({ frame, reading: key.reading })) }
  const { line, pace, result } = judgeReadings(righted)
  const frameOf = new Map(kept.map(({ key, frame }) => [frame, key.frame]))
  const findings = result.findings.map(finding => ({ ...finding, frames: finding.frames.map(frame => frameOf.get(frame) ?? frame) }))
  if (!line || result.verdict === 'undecided' || findings.some(({ kind }) => SHIFTS.includes(kind)) || findings.length >= plain.result.findings.length) return plain
  // The line runs with the longer side, as everywhere.
  const lag = up.keys.length - at > at ? late : 0
  const span = (list: ReadingCheck) => (list.keys.at(-1)?.frame ?? 0) - (list.keys[0]?.frame ?? 0)
  const ours: Line = { ...line, numbers: line.numbers.map((value, p) => inSpans(value, p, span(righted) / span(up))), lag: lag / span(up) }
  const trace = traceLine(seriesOf(up), ours, seriesOf(up).x)
  return {
    line: ours, pace,
    result: { ...result, keys: judgeKeys(up, seriesOf(up), trace), findings: [shift, ...findings], verdict: 'breaks', ruled: { ...result.ruled, fit: ruledList(seriesOf(up), ours, up) } },
  }
}

/** A bounce's numbers told over another span: times shrink with it, readings per span² grow with its square. */
function inSpans(value: number, p: number, ratio: number): number {
  return p === 0 || p === 3 ? value * ratio : p === 2 ? value / (ratio * ratio) : value
}

/** The reading of the drawing nearest to a frame. */
function nearest(keys: readonly Key[], frame: number): number {
  return keys.reduce((best, key) => (Math.abs(key.frame - frame) < Math.abs(best.frame - frame) ? key : best)).reading
}
