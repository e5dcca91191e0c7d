/** Findings in words: one cause told once, the most telling first. */
import { LAW_WORDS } from './laws/index'
import type { Scale } from './size'
import { claimedWords, sizeWithInterval } from './sizeWords'
import type { Finding, JudgedKey, Law } from './types'

/** "2.4°", "14 px". */
export function measured(value: number, unit: string): string {
  const places = Math.abs(value) >= 100 ? 0 : Math.abs(value) >= 1 ? 1 : 2
  const text = Math.abs(value).toFixed(places)
  return unit === 'deg' ? `${text}°` : `${text} ${unit}`
}

function frames(count: number): string {
  const text = count.toFixed(1).replace(/\.0$/, '')
  return text === '1' || count < 1 ? `${text} frame` : `${text} frames`
}

/** A lone drawing off the line. */
export function misplacedFinding(key: JudgedKey, unit: string): Finding {
  const offset = key.offset ?? 0
  const worth = key.offsetFrames
  const off = measured(offset, unit)
  // Without a direction of travel there is no early or late, only off.
  const text = worth === null || Math.abs(worth) < 0.05
    ? `Frame ${key.frame} sits ${off} off the line.`
    : `Frame ${key.frame} lands ${frames(Math.abs(worth))} ${worth > 0 ? 'early' : 'late'} (${off} ${worth > 0 ? 'past' : 'short of'} the line).`
  return { kind: 'misplaced', frames: [key.frame], amount: offset, text }
}

export function backwardFinding(key: JudgedKey, step: number, unit: string): Finding {
  return {
    kind: 'backward', frames: [key.frame], amount: step,
    text: `Frame ${key.frame} runs ${measured(step, unit)} backward, and this motion never turns.`,
  }
}

/** `late` frames: positive for a drawing held, negative for one skipped. `before`: the drawings before it are the shorter side. */
export function shiftFinding(key: JudgedKey, late: number, before: boolean): Finding {
  const size = frames(Math.abs(late))
  const held = late > 0
  const rest = before
    ? `against the rest, every drawing before it is ${size} ${held ? 'early' : 'late'}`
    : `from there on every drawing is ${size} ${held ? 'late' : 'early'}`
  return {
    kind: held ? 'held' : 'skipped', frames: [key.frame], amount: Math.abs(late),
    text: held ? `The drawing before frame ${key.frame} is held: ${rest}.` : `A drawing is skipped at frame ${key.frame}: ${rest}.`,
  }
}

export function wrongLawFinding(claimed: Law, reads: Law | null, misfit: number, keys: readonly JudgedKey[]): Finding {
  const breaking = keys.filter(key => key.breaks).length
  const text = reads === null
    ? `No law here explains this list: as ${LAW_WORDS[claimed]}, ${breaking} of its ${keys.length} drawings break.`
    : `This is not ${LAW_WORDS[claimed]}; it reads as ${LAW_WORDS[reads]}.`
  return { kind: 'wrong-law', frames: [], amount: misfit, text }
}

/** Degrees at which it lets go and at which the body would have left; `key`: the first drawing after that. */
export function wrongReleaseFinding({ angle, leaves }: { angle: number, leaves: number }, { frame }: JudgedKey): Finding {
  const late = angle - leaves
  // Whole degrees, unless that would say nothing.
  const whole = Math.abs(late) >= 2
  const degrees = (value: number) => `${value.toFixed(whole ? 0 : 1)}°`
  const off = whole ? degrees(Math.abs(Math.round(angle) - Math.round(leaves))) : degrees(Math.abs(late))
  return {
    kind: 'wrong-release', frames: [frame], amount: late,
    text: `Lets go at ${degrees(angle)}, ${off} too ${late > 0 ? 'late' : 'early'}: this body leaves the edge at ${degrees(leaves)}.`,
  }
}

/** Let go where the body would have left, but dead sideways. `key`: the first drawing after that. */
export function straightDownFinding({ frame }: JudgedKey): Finding {
  return {
    kind: 'wrong-release', frames: [frame], amount: 0,
    text: `Falls straight down the side from frame ${frame}: off the edge a body keeps its sideways speed.`,
  }
}

/** `before`: frames before the first drawing at which the line stands still, null where it never does; `moving`: it isn't waiting for a later start. */
export function notAtRestFinding(first: JudgedKey, before: number | null, used: number, moving: boolean): Finding {
  const finding: Omit<Finding, 'text'> = { kind: 'not-at-rest', frames: [first.frame], amount: before ?? 0 }
  if (before === null) return { ...finding, text: 'Already moving at the first drawing: too fast ever to have been at rest.' }
  // A start further back than the whole list is long is not known to the frame.
  if (before > used) return { ...finding, text: 'Already moving at the first drawing: reads as let go long before it.' }
  const when = inFrames(Math.abs(before))
  if (!moving) return { ...finding, text: `Not yet moving at the first drawing: reads as let go ${when} after it.` }
  const rest = before > 0 ? `reads as let go ${when} before it` : `reads as at rest ${when} after it`
  return { ...finding, text: `Already moving at the first drawing: ${rest}.` }
}

/** "half a frame", "1.5 frames". */
function inFrames(count: number): string {
  return count.toFixed(1) === '0.5' ? 'half a frame' : frames(count)
}

export function wrongScaleFinding(scale: Scale, needed: number, used: number): Finding | null {
  const { size, claimed } = scale
  if (!size || claimed === null) return null
  const said = sizeWithInterval(size)
  const reads = size.unit === 'm' ? `Reads as ${said}` : `Reads as gravity ${said} at this scale`
  return {
    kind: 'wrong-scale', frames: [], amount: size.value / claimed,
    text: `${reads}; ${claimedWords(claimed, size.unit)} needs ${needed} frames, not ${used}.`,
  }
}

/** What was found about the whole list comes first, then in order of how far off. */
export function inOrder(findings: Finding[], keys: readonly JudgedKey[]): Finding[] {
  const rank: Record<Finding['kind'], number> = {
    'wrong-law': 0, 'broken-joint': 0, 'wrong-release': 0, 'not-at-rest': 1, 'held': 2, 'skipped': 2, 'wrong-scale': 3, 'backward': 4, 'off-path': 5, 'misplaced': 5,
  }
  const strain = (finding: Finding) => {
    const key = keys.find(one => one.frame === finding.frames[0])
    return key?.offset === null || key?.offset === undefined || !key.allowance ? 0 : Math.abs(key.offset) / key.allowance
  }
  return [...findings].sort((a, b) => rank[a.kind] - rank[b.kind] || strain(b) - strain(a))
}
