import { CHECK_LIMITS } from '~/utils/contracts/check'
import type { Key, PointKey } from '~/utils/motion/types'
import { clean, readNumber } from '~/utils/pasting'

/**
 * The list while it is being written: cells are text, because half a number is no number yet and nothing typed may be lost.
 * The gap of a row leads to the next row and is never stored: it is the difference of two readings.
 */
export interface Row {
  id: number
  frame: string
  reading: string
  /** Of a list of points, instead of the reading. */
  x?: string
  y?: string
}
/** What a list is made of: a reading per drawing, or a point of the drawing. */
export type ListKind = 'reading' | 'point'
export const kindOf = ({ measure }: { measure: string }): ListKind => (measure === 'point' ? 'point' : 'reading')
/** A cell that a key is made of. */
export type ValueColumn = 'reading' | 'x' | 'y'
export type WrittenColumn = 'frame' | ValueColumn
export type Column = WrittenColumn | 'gap'
export const valueColumns: Record<ListKind, readonly ValueColumn[]> = { reading: ['reading'], point: ['x', 'y'] }

export interface CellIssue {
  row: number
  column: WrittenColumn
  message: string
}
export interface ReadRows {
  keys: Key[] | PointKey[]
  /** Row number of each key. */
  rowOf: number[]
  issues: CellIssue[]
}

/** A reading as a cell shows it: a plain point, no trailing zeros. */
export const cellText = (value: number) => String(clean(value))

/** What stands in a cell. */
export const cellOf = (row: Row, column: WrittenColumn): string => row[column] ?? ''
/** Whether anything but a frame was written into the row. */
export const hasValue = (row: Row): boolean => [row.reading, row.x, row.y].some((cell) => cell !== undefined && cell.trim() !== '')

const cellsOf = (key: Key | PointKey) =>
  'x' in key ? { reading: '', x: cellText(key.x), y: cellText(key.y) } : { reading: cellText(key.reading) }

export function rowsFromKeys(keys: readonly Key[] | readonly PointKey[], firstId = 1): Row[] {
  return keys.map((key, i) => ({ id: firstId + i, frame: String(key.frame), ...cellsOf(key) }))
}

/**
 * The law's readings as a person would write them: rounded far finer than the slop (a hundredth of it), no longer. Without a
 * slop, four decimals.
 */
export function roundedKeys<Keys extends readonly Key[] | readonly PointKey[]>(keys: Keys, slop: number): Keys {
  const decimals = slop > 0 ? Math.min(6, Math.max(1, Math.ceil(2 - Math.log10(slop)))) : 4
  const round = (value: number) => Number(value.toFixed(decimals))
  return keys.map((key) =>
    'x' in key ? { frame: key.frame, x: round(key.x), y: round(key.y) } : { frame: key.frame, reading: round(key.reading) },
  ) as unknown as Keys
}

const bounds: Record<ValueColumn, [what: string, missing: string]> = {
  reading: ['A reading', 'no reading'],
  x: ['A coordinate', 'no x'],
  y: ['A coordinate', 'no y'],
}

/** Whole rows are keys; empty rows count for nothing; anything else is told at its cell. */
export function readRows(rows: readonly Row[], kind: ListKind = 'reading'): ReadRows {
  const [keys, rowOf, issues]: [(Key | PointKey)[], number[], CellIssue[]] = [[], [], []]
  const columns = valueColumns[kind]
  let before: number | null = null
  for (const [row, cells] of rows.entries()) {
    const frameText = cells.frame
    const hasFrame = frameText.trim() !== ''
    if (!hasFrame && columns.every((column) => cellOf(cells, column).trim() === '')) continue
    const frame = hasFrame ? readNumber(frameText) : null
    let good: number | null = null
    const issue = (column: WrittenColumn, message: string) => issues.push({ row, column, message })
    if (!hasFrame) issue('frame', 'Which frame?')
    else if (frame === null || !Number.isInteger(frame)) issue('frame', 'A frame is a whole number.')
    else if (before !== null && frame === before) issue('frame', `Frame ${frame} stands twice.`)
    else if (before !== null && frame < before) issue('frame', `Frame ${frame} comes after frame ${before}: frames go upwards.`)
    else before = good = frame
    const values = columns.map((column) => {
      const text = cellOf(cells, column)
      const value = text.trim() === '' ? null : readNumber(text)
      const [what, missing] = bounds[column]
      // A frame that waits for its reading is work in progress, not a fault: it only keeps the list from being posted.
      if (text.trim() === '') {
        if (frame !== null || kind === 'point') issue(column, frame === null ? `There is ${missing} yet.` : `Frame ${frame} has ${missing} yet.`)
      } else if (value === null) issue(column, `${what} is a number.`)
      else if (Math.abs(value) > CHECK_LIMITS.maxReading) issue(column, `${what} lies within ±1,000,000.`)
      else return value
      return null
    })
    if (good === null || values.includes(null)) continue
    const [one, other] = values as number[]
    keys.push(kind === 'point' ? { frame: good, x: one!, y: other! } : { frame: good, reading: one! })
    rowOf.push(row)
  }
  return { keys: keys as Key[] | PointKey[], rowOf, issues }
}

/** How far the next point lies from this one, as the cell shows it; empty where one of the two is not whole. */
export function pointGapText(rows: readonly Row[], row: number): string {
  const [here, next] = [rows[row], rows[row + 1]].map((each) => [readNumber(each?.x ?? ''), readNumber(each?.y ?? '')])
  const [x, y, nextX, nextY] = [...here!, ...next!]
  if (typeof x !== 'number' || typeof y !== 'number' || typeof nextX !== 'number' || typeof nextY !== 'number') return ''
  const gap = Math.hypot(nextX - x, nextY - y)
  return gap === 0 || gap >= 1 ? gap.toFixed(1) : gap.toPrecision(2)
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
  const held = rows.findLastIndex(hasValue) + 1
  const length = Math.min(CHECK_LIMITS.maxKeys, Math.max(count, held))
  const top = Math.max(0, ...rows.map(({ id }) => id))
  return Array.from({ length }, (_, i) => ({
    reading: '',
    ...rows[i],
    id: rows[i]?.id ?? top + 1 + i,
    frame: String(first + i * step),
  }))
}

/** Joins a pasted list to the one that is there: by frame, the pasted drawing first. */
export function joinKeys(rows: readonly Row[], pasted: readonly Key[] | readonly PointKey[]): Row[] {
  const top = Math.max(0, ...rows.map(({ id }) => id))
  const byFrame = new Map<number, Row>()
  const unread: Row[] = []
  for (const row of rows) {
    const frame = readNumber(row.frame)
    if (frame === null) {
      if (hasValue(row)) unread.push(row)
    } else byFrame.set(frame, row)
  }
  for (const [i, key] of pasted.entries())
    byFrame.set(key.frame, { id: byFrame.get(key.frame)?.id ?? top + 1 + i, frame: String(key.frame), ...cellsOf(key) })
  return [...[...byFrame].sort(([a], [b]) => a - b).map(([, row]) => row), ...unread]
}
