import type { Day, Time } from '~/utils/contracts/common'
import type { Claim, Decision, Desk } from '~/utils/contracts/production'
import type { FindingKind, JudgedKey, Law, LawMisfit, Measure, PathKind, Roll, Span, Subject, Verdict } from '~/utils/motion/types'

/** The words and figures that every screen shares, so that one thing has one name. Nothing here depends on a locale or a clock. */

export const lawWords: Record<Law, string> = {
  'odd-rule': 'odd rule',
  topple: 'topple',
  pendulum: 'pendulum',
  steady: 'steady',
  'slow-in': 'slow in',
  'swing-decay': 'dying swing',
  spin: 'spin',
  bounce: 'bounce',
  flight: 'flight',
  'over-edge': 'over the edge',
}
export const measureWords: Record<Measure, string> = { angle: 'angle', distance: 'distance', arc: 'along the arc', point: 'points' }
export const decisionWords: Record<Decision, string> = {
  stands: 'Stands',
  'stands-with-notes': 'Stands with notes',
  'goes-back': 'Goes back',
}
export const deskWords: Record<Desk, string> = {
  'not-started': 'not started',
  animator: 'animator’s desk',
  supervisor: 'supervisor’s desk',
  settled: 'settled',
}
export const verdictWords: Record<Verdict, string> = { holds: 'Holds', breaks: 'Breaks', undecided: 'Can’t be told' }
export const rollWords: Record<Roll, string> = {
  slide: 'sliding',
  ball: 'a rolling ball',
  cylinder: 'a rolling cylinder',
  shell: 'a rolling shell',
  hoop: 'a rolling hoop',
}

const MINUS = '\u2212'
const NARROW = '\u202F'
export const NO_FIGURE = '–'

/** Fixed decimals with a true minus sign; never "−0.0"; a dash where there is no number. Digits are never grouped. */
export function figure(value: number | null | undefined, decimals = 1): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return NO_FIGURE
  const text = Math.abs(value).toFixed(decimals)
  return value < 0 && Number(text) !== 0 ? MINUS + text : text
}

/** As `figure`, with a plus sign in front of what lies ahead. */
export function signedFigure(value: number | null | undefined, decimals = 1): string {
  const text = figure(value, decimals)
  return value && value > 0 && Number(text) > 0 ? `+${text}` : text
}

/** At most `digits` telling digits, no trailing zeros: 8.2, 38, 0.45, 1200. */
export function roundFigure(value: number, digits = 2): string {
  if (value === 0 || !Number.isFinite(value)) return figure(value, 0)
  const decimals = Math.max(0, digits - 1 - Math.floor(Math.log10(Math.abs(value))))
  const text = figure(value, Math.min(decimals, 6))
  return text.includes('.') ? text.replace(/\.?0+$/, '') : text
}

/** How many decimals readings need: one where a gap is large, more where the whole list spans little. */
export function decimalsFor(span: number): number {
  if (!(span > 0)) return 1
  return Math.min(5, Math.max(1, 2 - Math.floor(Math.log10(span))))
}

/** `deg` is written as a degree sign; a drawing unit as itself. */
export const unitSign = (unit: string) => (unit === 'deg' ? '°' : unit)

/** A figure with its unit: 24.5°, 120.3 px. */
export function withUnit(value: number | null | undefined, unit: string, decimals = 1): string {
  const text = figure(value, decimals)
  if (text === NO_FIGURE) return text
  return unit === 'deg' ? `${text}°` : `${text}${NARROW}${unit}`
}

/** "0.8 frame", "1 frame", "2.7 frames". */
export function frameCount(frames: number, decimals = 1): string {
  const text = Number.isInteger(frames) ? String(frames) : figure(frames, decimals)
  return `${text} ${Math.abs(frames) <= 1 && frames !== 0 ? 'frame' : 'frames'}`
}

/** "2.7 early", "0.8 late", "on the line": short, for a mark beside a drawing. */
export function earlyOrLate(offsetFrames: number | null): string {
  if (offsetFrames === null) return ''
  const text = figure(Math.abs(offsetFrames))
  if (Number(text) === 0) return 'on the line'
  return `${text} ${offsetFrames > 0 ? 'early' : 'late'}`
}

/** A length in metres as people say it: 5 cm, 0.5 m, 8.2 m, 38 m. */
export function metres(value: number, digits = 2): string {
  return value < 0.0995 ? `${roundFigure(value * 100, digits)} cm` : `${roundFigure(value, digits)} m`
}

/** A size the judge read: metres as people say them, anything else with its unit. */
export function sizeFigure(value: number, unit: string): string {
  return unit === 'm' ? metres(value) : `${roundFigure(value)} ${unit}`
}

/** "61", "41–52" where a run has no hole, "41, 47, 52", "whole list". `all` are the frames of the list. */
export function framesInWords(frames: readonly number[], all?: readonly number[]): string {
  if (frames.length === 0) return 'whole list'
  if (frames.length === 1) return String(frames[0])
  const first = frames[0]!
  const last = frames.at(-1)!
  const between = all?.filter((frame) => frame >= first && frame <= last).length
  if (frames.length > 2 && between === frames.length) return `${first}–${last}`
  if (frames.length <= 4) return frames.join(', ')
  return `${frames.slice(0, 3).join(', ')} and ${frames.length - 3} more`
}

/** The body or the path of a claim: "block 6 × 38 m", "bob 1.4 m", "80 px/m", "12° ramp, a rolling ball". */
export function bodyInWords(subject: Subject | undefined, unit = 'px'): string {
  if (!subject) return ''
  if (!('shape' in subject)) {
    const parts = []
    if (subject.slope !== undefined && subject.slope < 90) parts.push(`${roundFigure(subject.slope, 3)}° ramp`)
    if (subject.roll && subject.roll !== 'slide') parts.push(rollWords[subject.roll])
    if (subject.unitsPerMetre !== undefined) parts.push(`${roundFigure(subject.unitsPerMetre, 4)} ${unit}/m`)
    return parts.join(', ')
  }
  const size = (value: number) => roundFigure(value, 3)
  switch (subject.shape) {
    case 'rod':
      return `rod ${metres(subject.height, 3)}`
    case 'block':
      return `block ${size(subject.width)} × ${size(subject.height)} m`
    case 'cylinder':
      return `cylinder ⌀ ${size(subject.radius * 2)} × ${size(subject.height)} m`
    case 'pole':
      return `pole ${metres(subject.height, 3)} with a head`
    case 'bob':
      return `bob on ${metres(subject.length, 3)}`
    case 'hung-rod':
      return `hung rod ${metres(subject.length, 3)}`
    case 'custom':
      return `equal length ${metres(subject.equalLength, 3)}`
  }
}

/** The claimed size in metres that a body's timing is compared with: what a person would call its height or length. */
export function claimedSize(subject: Subject | undefined): number | null {
  if (!subject || !('shape' in subject)) return null
  if ('height' in subject) return subject.height
  return 'length' in subject ? subject.length : subject.equalLength
}

/** One span's law as the trade says it: the odd rule from rest is a slow out. */
export const spanInWords = ({ law, start }: Pick<Span, 'law' | 'start'>) => (law === 'odd-rule' && start === 'rest' ? 'slow out' : lawWords[law])

/** "slow out · steady · slow in, joints at 1009 and 1021"; where a contact parts two laws, it says so: "topple · odd rule, contact at 1040". */
export function spansInWords(spans: readonly Pick<Span, 'to' | 'law' | 'start' | 'contact'>[]): string {
  const joints = spans.slice(0, -1)
  const at = (kind: string, some: typeof joints) => {
    const frames = some.map(({ to }) => String(to))
    if (frames.length === 0) return []
    const said = frames.length === 1 ? frames[0] : `${frames.slice(0, -1).join(', ')} and ${frames.at(-1)}`
    return [`${kind}${frames.length === 1 ? '' : 's'} at ${said}`]
  }
  return [
    spans.map(spanInWords).join(' · '),
    ...at('joint', joints.filter(({ contact }) => !contact)),
    ...at('contact', joints.filter(({ contact }) => contact)),
  ].join(', ')
}

/** "topple · block 6 × 38 m", or its laws one after the other; "not claimed yet" where there is no claim. */
export function claimInWords(claim: Pick<Claim, 'law' | 'subject' | 'unit' | 'spans'> | null): string {
  if (!claim) return 'not claimed yet'
  return [claim.spans ? spansInWords(claim.spans) : lawWords[claim.law], bodyInWords(claim.subject, claim.unit)].filter(Boolean).join(' · ')
}

export const pathWords: Record<PathKind, string> = { line: 'a line', circle: 'a circle', parabola: 'a parabola' }

/** What the points of a claim run along and where they turn: "a circle about 120, 40", "y upwards"; empty where nothing is said. */
export function pointsInWords({ path, pivot, yAxis }: Pick<Claim, 'path' | 'pivot' | 'yAxis'>): string {
  const about = pivot ? `about ${roundFigure(pivot.x, 5)}, ${roundFigure(pivot.y, 5)}` : ''
  const along = path ? `along ${pathWords[path]}` : ''
  return [[along, about].filter(Boolean).join(' '), yAxis === 'up' ? 'y upwards' : ''].filter(Boolean).join(', ')
}

/** "on ones", "on twos", or null where the gaps between frames differ. */
export function exposureInWords(frames: readonly number[]): string | null {
  const step = frames.length > 1 ? frames[1]! - frames[0]! : 0
  const even = step > 0 && frames.every((frame, i) => i === 0 || frame - frames[i - 1]! === step)
  if (!even) return null
  return ['on ones', 'on twos', 'on threes', 'on fours'][step - 1] ?? `every ${step} frames`
}

/** How badly a law fits, as far as it says anything: 0.3, 1.8, over 99. */
export const misfitFigure = (misfit: number) => (misfit < 99.5 ? roundFigure(misfit) : 'over 99')

/** What the list reads as, in a clause: "odd rule 0.3, topple 1.8" with the misfit (1 is at the edge of notice). */
export function readsAsInWords(readsAs: readonly LawMisfit[]): string {
  return readsAs.map(({ law, misfit }) => `${lawWords[law]} ${misfitFigure(misfit)}`).join(', ')
}

/** Up to two letters for a name in any script: "Mira Ilves" → MI, "王小明" → 王. */
export function initials(name: string): string {
  const words = name.trim().split(/[\s\u3000·・]+/u).filter((word) => /[\p{L}\p{N}]/u.test(word))
  const first = (word: string | undefined) => word?.match(/[\p{L}\p{N}]\p{M}*/u)?.[0] ?? ''
  const letters = words.length > 1 ? first(words[0]) + first(words.at(-1)) : first(words[0])
  return letters.toUpperCase() || '?'
}

const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec']
const DAYS = ['Sun', 'Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat']
const DAY_MS = 86_400_000

const dayNumber = (day: Day) => Math.round(Date.parse(`${day.slice(0, 10)}T00:00:00Z`) / DAY_MS)

/** "4 Dec", with the year where it isn't this one. */
export function dayInWords(day: Day, today?: Day): string {
  const text = `${Number(day.slice(8, 10))} ${MONTHS[Number(day.slice(5, 7)) - 1]}`
  return today && today.slice(0, 4) === day.slice(0, 4) ? text : `${text} ${day.slice(0, 4)}`
}

/** "1 Dec, 10:42" as the time itself is written (UTC for times off the wire). */
export function shortTime(at: Time, today: Day): string {
  return `${dayInWords(at, today)}, ${at.slice(11, 16)}`
}

/** "1 Dec 2026, 10:42 UTC". */
export const longTime = (at: Time) => `${dayInWords(at)}, ${at.slice(11, 16)} UTC`

/** The same moment written on this machine's own clock: only for use after a page is on screen. */
export function localTime(at: Time): Time {
  const moment = new Date(at)
  return new Date(moment.getTime() - moment.getTimezoneOffset() * 60_000).toISOString()
}

/** When something is due, as said on `today`. `plain` says it without reproach. */
export function dueWords(day: Day, today: Day): { text: string; plain: string; late: boolean } {
  const ahead = dayNumber(day) - dayNumber(today)
  const plain = `due ${dayInWords(day, today)}`
  if (ahead < 0) return { text: ahead === -1 ? '1 day late' : `${-ahead} days late`, plain, late: true }
  if (ahead === 0) return { text: 'due today', plain, late: false }
  if (ahead === 1) return { text: 'due tomorrow', plain, late: false }
  // A week's day names are unmistakable up to six days ahead.
  if (ahead < 7) return { text: `due ${DAYS[(dayNumber(day) + 4) % 7]}`, plain, late: false }
  return { text: plain, plain, late: false }
}

/** What a finding is called in a row of the key table. */
export const findingWords: Record<FindingKind, string> = {
  misplaced: 'misplaced',
  held: 'held',
  skipped: 'one skipped',
  backward: 'runs backward',
  'wrong-law': 'another law',
  'wrong-scale': 'another size',
  'not-at-rest': 'not at rest',
  'broken-joint': 'broken joint',
  'off-path': 'off the path',
  'wrong-release': 'lets go wrongly',
}

/** "2.7 frames early", "on the line"; empty where the law stands still. */
export function earlyOrLateInFrames(offsetFrames: number | null): string {
  if (offsetFrames === null) return ''
  const amount = Math.abs(offsetFrames)
  if (Number(amount.toFixed(1)) === 0) return 'on the line'
  return `${frameCount(Number(amount.toFixed(1)))} ${offsetFrames > 0 ? 'early' : 'late'}`
}

/**
 * Frames off, or null where they say nothing: while the law hardly moves, an offset too small to print is many frames.
 */
export function tellingFrames(key: Pick<JudgedKey, 'offset' | 'offsetFrames' | 'breaks'>, decimals: number): number | null {
  if (key.offset === null || key.offsetFrames === null) return null
  const unseen = !key.breaks && Number(key.offset.toFixed(decimals)) === 0
  return unseen && Math.abs(key.offsetFrames) >= 0.5 ? null : key.offsetFrames
}

/** One drawing in one sentence, for whoever hears the drawings instead of seeing them. */
export function keyInWords(key: JudgedKey, unit: string, decimals = 1): string {
  const parts = [`posted ${withUnit(key.reading, unit, decimals)}`]
  if (key.law !== null) parts.push(`law ${withUnit(key.law, unit, decimals)}`)
  const off = earlyOrLateInFrames(tellingFrames(key, decimals))
  if (off) parts.push(off)
  if (key.breaks) parts.push('breaks')
  return `Frame ${key.frame}: ${parts.join(', ')}`
}

/** Decimals that suit the readings of a whole list. */
export function readingDecimals(keys: readonly Pick<JudgedKey, 'reading'>[]): number {
  if (keys.length === 0) return 1
  let [low, high] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY]
  for (const { reading } of keys) [low, high] = [Math.min(low, reading), Math.max(high, reading)]
  return decimalsFor(high - low)
}
