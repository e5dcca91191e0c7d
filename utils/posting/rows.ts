import { CHECK_LIMITS } from '~/utils/contracts/check'
import type { Key } from '~/utils/motion/types'
import { clean, readNumber } from '~/utils/pasting'

/**
 * The list while it is being written: cells are text, because half a number is no number yet and nothing typed may be lost.
 * The gap of a row leads to the next row and is never stored: it is the difference of two readings.
 */
export interface Row {
  id: number
  frame: string
  reading: string
}
export type Column = 'frame' | 'reading' | 'gap'
export interface CellIssue {
  row: number
  column: 'frame' | 'reading'
  message: string
}
export interface ReadRows {
  keys: Key[]
  /** Row number of each key. */
  rowOf: number[]
  issues: CellIssue[]
}

/** A reading as a cell shows it: a plain point, no trailing zeros. */
export const cellText = (value: number) => String(clean(value))

export function rowsFromKeys(keys: readonly Key[], firstId = 1): Row[] {
  return keys.map(({ frame, reading }, i) => ({ id: firstId + i, frame: String(frame), reading: cellText(reading) }))
}

/**
 * The law's readings as a person would write them: rounded far finer than the slop (a hundredth of it), no longer. Without a
 * slop, four decimals.
 */
export function roundedKeys(keys: readonly Key[], slop: number): Key[] {
  const decimals = slop > 0 ? Math.min(6, Math.max(1, Math.ceil(2 - Math.log10(slop)))) : 4
  return keys.map(({ frame, reading }) => ({ frame, reading: Number(reading.toFixed(decimals)) }))
}

/** Whole rows are keys; empty rows count for nothing; anything else is told at its cell. */
export function readRows(rows: readonly Row[]): ReadRows {
  const answer: ReadRows = { keys: [], rowOf: [], issues: [] }
  let before: number | null = null
  for (const [row, { frame: frameText, reading: readingText }] of rows.entries()) {
    const [hasFrame, hasReading] = [frameText.trim() !== '', readingText.trim() !== '']
    if (!hasFrame && !hasReading) continue
    const frame = hasFrame ? readNumber(frameText) : null
    const reading = hasReading ? readNumber(readingText) : null
    let good: number | null = null
    const issue = (column: CellIssue['column'], message: string) => answer.issues.push({ row, column, message })
    if (!hasFrame) issue('frame', 'Which frame?')
    else if (frame === null || !Number.isInteger(frame)) issue('frame', 'A frame is a whole number.')
    else if (before !== null && frame === before) issue('frame', `Frame ${frame} stands twice.`)
    else if (before !== null && frame < before) issue('frame', `Frame ${frame} comes after frame ${before}: frames go upwards.`)
    else before = good = frame
    // A frame that waits for its reading is work in progress, not a fault: it only keeps the list from being posted.
    if (!hasReading) {
      if (frame !== null) issue('reading', `Frame ${frame} has no reading yet.`)
    } else if (reading === null) issue('reading', 'A reading is a number.')
    else if (Math.abs(reading) > CHECK_LIMITS.maxReading) issue('reading', 'A reading lies within ±1,000,000.')
    else if (good !== null) {
      answer.keys.push({ frame: good, reading })
      answer.rowOf.push(row)
    }
  }
  return answer
}

/** The gap from this row to the next, as the cell shows it; empty where one of the two has no reading. */
export function gapText(rows: readonly Row[], row: number): string {
  const here = readNumber(rows[row]?.reading ?? '')
  const next = readNumber(rows[row + 1]?.reading ?? '')
  return here === null || next === null ? '' : cellText(next - here)
}

/**
 * A changed gap moves the next drawing, and every later one with it, so that the gaps after it stay what they are.
 * Where the next drawing has no reading yet, only that one is set. Returns new rows; the same ones when it can't be done.
 */
export function withGap(rows: readonly Row[], row: number, gap: number): Row[] {
  const here = readNumber(rows[row]?.reading ?? '')
  const next = rows[row + 1]
  if (here === null || !next) return [...rows]
  const old = readNumber(next.reading)
  if (old === null) return rows.map((each, i) => (i === row + 1 ? { ...each, reading: cellText(here + gap) } : each))
  const shift = here + gap - old
  return rows.map((each, i) => {
    const reading = i > row ? readNumber(each.reading) : null
    return reading === null ? each : { ...each, reading: cellText(reading + shift) }
  })
}

/** The frame that would follow the last one at the same step. */
export function nextFrame(rows: readonly Row[], step = 1): number | null {
  const last = readNumber(rows.at(-1)?.frame ?? '')
  const before = readNumber(rows.at(-2)?.frame ?? '')
  if (last === null) return null
  return last + (before !== null && last > before ? last - before : step)
}

/**
 * Frames every `step` from `first` on `count` rows. Readings stay on their rows; rows that hold one are never dropped,
 * so the list may come out longer than `count`.
 */
export function fillFrames(rows: readonly Row[], first: number, step: number, count: number): Row[] {
  const held = rows.findLastIndex((row) => row.reading.trim() !== '') + 1
  const length = Math.min(CHECK_LIMITS.maxKeys, Math.max(count, held))
  const top = Math.max(0, ...rows.map(({ id }) => id))
  return Array.from({ length }, (_, i) => ({
    id: rows[i]?.id ?? top + 1 + i,
    reading: rows[i]?.reading ?? '',
    frame: String(first + i * step),
  }))
}

/** Joins a pasted list to the one that is there: by frame, the pasted reading first. */
export function joinKeys(rows: readonly Row[], pasted: readonly Key[]): Row[] {
  const top = Math.max(0, ...rows.map(({ id }) => id))
  const byFrame = new Map<number, Row>()
  const unread: Row[] = []
  for (const row of rows) {
    const frame = readNumber(row.frame)
    if (frame === null) {
      if (row.reading.trim() !== '') unread.push(row)
    } else byFrame.set(frame, row)
  }
  for (const [i, { frame, reading }] of pasted.entries())
    byFrame.set(frame, { id: byFrame.get(frame)?.id ?? top + 1 + i, frame: String(frame), reading: cellText(reading) })
  return [...[...byFrame].sort(([a], [b]) => a - b).map(([, row]) => row), ...unread]
}
