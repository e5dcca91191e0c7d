/** Spans and joints put together again into one answer. */
import { inOrder, misplacedFinding } from '../findings'
import type { Judgement } from '../readings'
import type { CheckRequest, CheckResult, Finding, FindingKind, JudgedKey, JudgedSpan, Key, PointKey, Verdict } from '../types'
import type { JointJudgement } from './joint'
import type { JudgedPart } from './judgePart'
import { rootMean } from './rootMean'

/** One judgement of the whole list. `joints` has an entry for every two neighbours among `parts`. */
export function joined(request: CheckRequest, parts: JudgedPart[], joints: JointJudgement[]): Judgement {
  const keys = joinedKeys(request, parts, joints)
  const findings = joinedFindings(request, parts, joints)
  const settled = settledAt(joints)
  const verdict = verdictOf(parts, findings, keys)
  const results = parts.map(({ judgement }) => judgement.result)
  const result: CheckResult = {
    verdict,
    reason: verdict === 'undecided' ? results.find(({ reason }) => reason !== null)?.reason ?? null : null,
    keys, findings, readsAs: [], size: null, claim: null,
    ruled: {
      fit: byFrame(results.map(({ ruled }) => ruled.fit)),
      claim: allOf(results.map(({ ruled }) => ruled.claim)),
    },
    spans: parts.map(part => spanOf(part, settled)),
    joints: joints.map(({ joint }) => joint),
    figures: results.flatMap(({ figures }) => figures ?? []),
  }
  if (request.measure === 'point') {
    result.ruledPoints = {
      fit: byFrame(results.map(({ ruledPoints }) => ruledPoints?.fit ?? [])),
      claim: allOf(results.map(({ ruledPoints }) => ruledPoints?.claim ?? null)),
    }
    result.path = null
  }
  return { line: null, pace: null, result, parts: parts.map(({ request: of, judgement }) => ({ request: of, judgement })) }
}

function verdictOf(parts: JudgedPart[], findings: Finding[], keys: JudgedKey[]): Verdict {
  if (findings.length > 0 || keys.some(({ breaks }) => breaks)) return 'breaks'
  return parts.some(({ judgement }) => judgement.result.verdict === 'undecided') ? 'undecided' : 'holds'
}

/** Every key once: at a joint as the span before has it, with the gap that the span after knows. */
function joinedKeys(request: CheckRequest, parts: JudgedPart[], joints: JointJudgement[]): JudgedKey[] {
  const byFrame = new Map<number, JudgedKey>()
  for (const { judgement: { result } } of parts) {
    for (const key of result.keys) {
      const known = byFrame.get(key.frame)
      byFrame.set(key.frame, known ? { ...known, gap: key.gap, lawGap: key.lawGap } : key)
    }
  }
  for (const { key } of joints) if (key) byFrame.set(key.frame, { ...key, gap: byFrame.get(key.frame)?.gap ?? key.gap })
  return request.keys.flatMap(({ frame }, i) => {
    const key = byFrame.get(frame)
    if (!key) return []
    const next = request.keys[i + 1]
    const lawNext = next && byFrame.get(next.frame)?.law
    // A span judged without the joint's own drawing leaves the gap from there on open.
    if (key.gap !== null || !next || request.measure === 'point' || !('reading' in next)) return [key]
    return [{ ...key, gap: next.reading - key.reading, lawGap: key.law === null || lawNext === null || lawNext === undefined ? null : lawNext - key.law }]
  })
}

const OF_ONE_DRAWING: readonly FindingKind[] = ['misplaced', 'backward', 'off-path']

/** Frames of joints whose own drawing has been told of with the joint. */
function settledAt(joints: JointJudgement[]): Set<number> {
  return new Set(joints.filter(({ finding, key }) => finding || key).map(({ joint }) => joint.frame))
}

/** All findings in order of the list, what is wrong with a joint's own drawing once. */
function joinedFindings(request: CheckRequest, parts: JudgedPart[], joints: JointJudgement[]): Finding[] {
  const strays = joints.flatMap(({ key, finding }) => (key && !finding ? [key] : []))
  const settled = settledAt(joints)
  const told = new Set<number>()
  const found = parts.flatMap(({ judgement: { result } }) => result.findings.filter(({ kind, frames }) => {
    const [frame] = frames
    if (frame === undefined || !OF_ONE_DRAWING.includes(kind)) return true
    if (settled.has(frame) || told.has(frame)) return false
    told.add(frame)
    return true
  }))
  const all = [
    ...joints.flatMap(({ finding }) => (finding ? [finding] : [])),
    ...strays.map(key => misplacedFinding(key, request.unit)),
    ...found,
  ]
  return inListOrder(all)
}

/** By first frame; at one frame a broken joint before what follows from it. */
function inListOrder(findings: Finding[]): Finding[] {
  return inOrder(findings, []).map((finding, at) => ({ finding, at }))
    .sort((a, b) => (a.finding.frames[0] ?? -Infinity) - (b.finding.frames[0] ?? -Infinity) || a.at - b.at)
    .map(({ finding }) => finding)
}

/** How one span came out. `settled`: frames of joints whose drawing has been told of already. */
export function spanOf({ span, judgement: { result }, request }: JudgedPart, settled: ReadonlySet<number>): JudgedSpan {
  // A drawing that the joint answers for is no fault of the span.
  const clear = result.findings.length > 0
    && result.findings.every(({ kind, frames: [frame] }) => frame !== undefined && OF_ONE_DRAWING.includes(kind) && settled.has(frame))
  const [own] = result.readsAs.filter(({ law }) => law === span.law)
  return {
    from: request.keys[0]?.frame ?? span.from, to: request.keys[request.keys.length - 1]?.frame ?? span.to,
    law: span.law, contact: span.contact === true, verdict: clear ? 'holds' : result.verdict, reason: result.reason,
    misfit: own?.misfit ?? (result.keys.some(({ law }) => law !== null) ? rootMean(result.keys) : null),
    readsAs: result.readsAs, size: result.size, figures: result.figures ?? [],
  }
}

/** Lists one after the other, each frame once: as the first that has it. */
function byFrame<Each extends Key | PointKey>(lists: readonly (readonly Each[])[]): Each[] {
  const seen = new Set<number>()
  return lists.flat().filter(({ frame }) => !seen.has(frame) && seen.add(frame))
}

/** The claim's own motion only where every span has one: pieces of it would not meet. */
function allOf<Each extends Key | PointKey>(lists: readonly (readonly Each[] | null)[]): Each[] | null {
  const all = lists.flatMap(list => (list ? [list] : []))
  return all.length === lists.length ? byFrame(all) : null
}
