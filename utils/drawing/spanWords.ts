import { figureInWords } from '~/utils/drawing/figureWords'
import { sizeWithInterval } from '~/utils/motion/sizeWords'
import { figure, lawWords, unitSign, verdictWords } from '~/utils/drawing/words'
import type { CheckResult, JudgedJoint, JudgedSpan } from '~/utils/motion/types'

/** A list under more than one law, told span by span. */

export interface SpanLine {
  from: number
  to: number
  law: string
  verdict: JudgedSpan['verdict']
  /** "holds", "breaks", "can’t be told: too few keys". */
  said: string
  /** Size and figures, where there are any. */
  more: string[]
  readsAs: JudgedSpan['readsAs']
  /** How it meets the next one; null after the last. */
  joint: { frame: number; contact: boolean; broken: boolean; words: string } | null
}

export function spanLines({ spans = [], joints = [] }: Pick<CheckResult, 'spans' | 'joints'>, unit: string): SpanLine[] {
  return spans.map((span, i) => {
    const joint = i + 1 < spans.length ? joints.find(({ frame }) => frame === span.to) : undefined
    return {
      from: span.from,
      to: span.to,
      law: lawWords[span.law],
      verdict: span.verdict,
      said: verdictWords[span.verdict].toLowerCase() + (span.verdict === 'undecided' && span.reason ? `: ${span.reason}` : ''),
      more: [...(span.size ? [`Reads as ${sizeWithInterval(span.size)}.`] : []), ...span.figures.map(figureInWords)],
      readsAs: span.readsAs,
      joint: joint ? { frame: joint.frame, contact: joint.contact, broken: !joint.holds, words: jointInWords(joint, unit) } : null,
    }
  })
}

/** "contact: 12.1 px a frame before, −7.4 after"; "speed carries over, 12.1 px a frame". */
export function jointInWords({ contact, before, after, apart, holds }: JudgedJoint, unit: string): string {
  const speeds = before !== null && after !== null ? `${speed(before)}${unitSign(unit) === '°' ? '°' : ` ${unit}`} a frame before, ${speed(after)} after` : ''
  if (contact) return `contact${speeds ? `: ${speeds}` : ''}`
  if (holds) return `carries over${before !== null ? `, ${speed(before)}${unitSign(unit) === '°' ? '°' : ` ${unit}`} a frame` : ''}`
  // The same speed on both sides, and broken all the same: the lines don't meet there, or the way turns off at once.
  const alike = before !== null && after !== null && speed(before) === speed(after)
  const gap = (!alike && speeds) || (apart !== null && Number(figure(Math.abs(apart))) > 0 ? `${figure(Math.abs(apart))}${unitSign(unit) === '°' ? '°' : ` ${unit}`} apart` : '')
  return `does not carry over${gap ? `: ${gap}` : ''}`
}

const speed = (value: number) => figure(value, Math.abs(value) < 1 ? 2 : 1)
