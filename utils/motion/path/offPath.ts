/** Drawings that have left the path of action, in words. */
import { measured } from '../findings'
import { longestRun } from '../hypotheses'
import type { Finding, FoundPath, JudgedKey } from '../types'
import { pathFails } from './course'

const WORDS: Record<FoundPath['kind'], string> = { line: 'line of action', circle: 'arc', parabola: 'parabola' }

export function offPathFinding(key: JudgedKey, kind: FoundPath['kind'], unit: string): Finding {
  const off = key.offPath ?? 0
  return { kind: 'off-path', frames: [key.frame], amount: Math.abs(off), text: `Frame ${key.frame} sits ${measured(off, unit)} off the ${WORDS[kind]}.` }
}

/** About the whole list: it does not run along such a path at all. `furthest`: the most that a drawing is off, drawing units. */
export function noPathFinding(path: FoundPath, furthest: number, unit: string): Finding {
  const off = measured(furthest, unit)
  const about = path.kind === 'circle' && path.given ? 'These drawings don’t turn about the given pivot' : `These drawings don’t run along one ${WORDS[path.kind]}`
  return { kind: 'off-path', frames: [], amount: furthest, text: `${about}: they sit up to ${off} off it.` }
}

export function straightFinding(): Finding {
  return { kind: 'off-path', frames: [], amount: 0, text: 'These drawings run along a straight line: they turn about nothing.' }
}

/**
 * Off-path findings and those of the timing told together, one cause once: a drawing that is off both ways is told by whichever is worse
 * for its allowance. `ratio`: distance from the path over allowance, per key.
 */
export function withOffPath(timing: readonly Finding[], keys: readonly JudgedKey[], ratio: readonly number[], path: FoundPath, unit: string): Finding[] {
  const off = ratio.flatMap((value, i) => (value > 1 ? [i] : []))
  if (pathFails(off, keys.length, longestRun(off))) {
    return [noPathFinding(path, Math.max(...keys.map(key => Math.abs(key.offPath ?? 0))), unit)]
  }
  let told = [...timing]
  for (const i of off) {
    const key = keys[i]
    if (!key) continue
    const late = key.offset !== null && key.allowance ? Math.abs(key.offset) / key.allowance : 0
    const alone = (finding: Finding) => (finding.kind === 'misplaced' || finding.kind === 'backward') && finding.frames[0] === key.frame
    if (told.some(alone) && late > (ratio[i] as number)) continue
    told = told.filter(finding => !alone(finding))
    told.push(offPathFinding(key, path.kind, unit))
  }
  return told
}
