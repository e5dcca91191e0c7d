import { CHECK_LIMITS } from '~/utils/contracts/check'
import { readNumber } from '~/utils/pasting'
import { canRest } from '~/utils/motion/standstill'
import type { Law, Span, Subject } from '~/utils/motion/types'

/**
 * The laws of a divided claim, row by row. A row keeps its end only: it begins where the one before it ends, so a joint that is
 * moved moves for both.
 */
export interface SpanRow {
  id: number
  /** Last frame, as typed. */
  to: string
  law: Law
  /** A hit, a landing or a bounce at its end: speed need not carry over. */
  contact: boolean
  /** Kept, and left unsaid, under a law that never rests. */
  fromRest: boolean
}
export const MAX_SPANS = CHECK_LIMITS.maxSpans

export const rowsOfSpans = (spans: readonly Pick<Span, 'to' | 'law' | 'contact' | 'start'>[]): SpanRow[] =>
  spans.map(({ to, law, contact, start }, i) => ({ id: i + 1, to: String(to), law, contact: contact ?? false, fromRest: start === 'rest' }))

/** Frame at which row `i` begins, as typed. */
export const beginOf = (first: string, rows: readonly SpanRow[], i: number): string => (i === 0 ? first : (rows[i - 1]?.to ?? ''))

const half = (from: string, to: string): string => {
  const [a, b] = [readNumber(from), readNumber(to)]
  return a === null || b === null || b - a < 2 ? '' : String(Math.floor((a + b) / 2))
}

/** One law made into two: the frames in halves, the second half steady until somebody says otherwise. */
export function divided(first: number, last: number, law: Law, fromRest: boolean): SpanRow[] {
  return [
    { id: 1, to: half(String(first), String(last)), law, contact: false, fromRest },
    { id: 2, to: String(last), law: law === 'steady' ? 'slow-in' : 'steady', contact: false, fromRest: false },
  ]
}

/** One more law at the end: the last row gives it the second half of its frames. */
export function withRow(first: string, rows: readonly SpanRow[]): SpanRow[] {
  const last = rows.at(-1)
  if (!last || rows.length >= MAX_SPANS) return [...rows]
  const middle = half(beginOf(first, rows, rows.length - 1), last.to)
  const id = Math.max(...rows.map((row) => row.id)) + 1
  return [...rows.slice(0, -1), { ...last, to: middle }, { id, to: last.to, law: 'steady', contact: false, fromRest: false }]
}

/** Without one of the rows; its frames go to the one before it, those of the first to the one after. */
export function withoutRow(rows: readonly SpanRow[], at: number): SpanRow[] {
  const gone = rows[at]
  if (!gone || rows.length <= 2) return [...rows]
  const rest = rows.toSpliced(at, 1)
  return at === 0 ? rest : rest.map((row, i) => (i === at - 1 ? { ...row, to: gone.to, contact: gone.contact } : row))
}

/**
 * The rows as the claim says them; frames that are no numbers come out as NaN, for the contract to refuse.
 * @param subjectOf what moves in a span, where that is not the claim's own
 */
export function spansOf(first: string, rows: readonly SpanRow[], subjectOf: (law: Law) => Subject | undefined): Span[] {
  const frame = (text: string) => readNumber(text) ?? Number.NaN
  return rows.map((row, i) => {
    const subject = subjectOf(row.law)
    return {
      from: frame(beginOf(first, rows, i)),
      to: frame(row.to),
      law: row.law,
      ...(row.contact && i < rows.length - 1 ? { contact: true } : {}),
      ...(row.fromRest && canRest(row.law) ? { start: 'rest' as const } : {}),
      ...(subject ? { subject } : {}),
    }
  })
}
