import type { PointKey } from '~/utils/motion/types'
import { likeliestFrames, readNumber, readTable, short, withFewProblems } from '~/utils/pasting'
import type { Line, Pasted, PastedColumn } from '~/utils/pasting'

/** Reads a pasted table of points: frame, x and y, in any order. What was taken for what stands in the answer. */

export type PointColumn = 'frame' | 'x' | 'y'
/** Which column holds what (0 is the first); found out where left out. */
export type PointWishes = Partial<Record<PointColumn, number>>

const HEADS: [PointColumn, RegExp][] = [
  ['frame', /^(frames?|frm?|f|drawings?|time)\b/i],
  ['x', /^(x\b|.*[ ._-]x$|across|sideways|horizontal)/i],
  ['y', /^(y\b|.*[ ._-]y$|up|down|height|vertical)/i],
]
const columnNames = ['frame', 'x', 'y'] as const

/** Never throws; an empty text gives no keys and no problems. */
export function readPointPaste(text: string, wishes: PointWishes = {}): Pasted<PointKey> {
  const { answer, lines } = readTable<PointKey>(text, 3)
  if (lines.length === 0) return answer
  answer.columns = columnsOf(lines, answer.header, wishes)
  const leftOut = answer.columns.filter((column) => column === 'left out').length
  if (leftOut > 0) answer.notes.push(leftOut === 1 ? 'One column was left out.' : `${leftOut} columns were left out.`)
  if (columnNames.some((name) => !answer.columns.includes(name))) {
    answer.problems.push({ line: lines[0]!.number, message: 'Three columns are needed: paste frame, x and y side by side.' })
    return answer
  }
  readPoints(lines, answer)
  return withFewProblems(answer)
}

/** What the person says, else the header; then the column of rising whole numbers is frames, and the next two in order are x and y. */
function columnsOf(lines: Line[], header: string[] | null, wishes: PointWishes): PastedColumn[] {
  const width = Math.max(header?.length ?? 0, ...lines.map(({ cells }) => cells.length))
  const columns: PastedColumn[] = Array.from({ length: width }, () => 'left out')
  const at = (name: PointColumn) => columns.indexOf(name)
  const give = (name: PointColumn, column: number | undefined) => {
    if (at(name) < 0 && column !== undefined && column >= 0 && columns[column] === 'left out') columns[column] = name
  }
  for (const name of columnNames) give(name, wishes[name])
  for (const [name, head] of HEADS) give(name, header?.findIndex((cell, i) => head.test(cell.trim()) && columns[i] === 'left out'))
  give('frame', likeliestFrames(lines, width))
  for (const name of ['x', 'y'] as const) give(name, columns.findIndex((column, i) => column === 'left out' && lines.some(({ cells }) => readNumber(cells[i] ?? '') !== null)))
  return columns
}

function readPoints(lines: Line[], answer: Pasted<PointKey>): void {
  const [frameAt, xAt, yAt] = columnNames.map((name) => answer.columns.indexOf(name)) as [number, number, number]
  const complain = (line: number, message: string) => void answer.problems.push({ line, message })
  for (const { number, cells } of lines) {
    const cell = (column: number) => cells[column]?.trim() ?? ''
    const [frame, x, y] = [frameAt, xAt, yAt].map((column) => readNumber(cell(column)))
    const before = answer.keys.at(-1)
    if (typeof frame !== 'number' || !Number.isInteger(frame)) complain(number, cell(frameAt) ? `“${short(cell(frameAt))}” is not a frame.` : 'No frame here.')
    else if (typeof x !== 'number' || typeof y !== 'number') {
      const [name, at] = typeof x !== 'number' ? ['x', xAt] as const : ['y', yAt] as const
      complain(number, cell(at) ? `“${short(cell(at))}” is not a number.` : `No ${name} for frame ${frame}.`)
    } else if (before && frame === before.frame) complain(number, `Frame ${frame} stands twice.`)
    else if (before && frame < before.frame) complain(number, `Frame ${frame} comes after frame ${before.frame}: frames go upwards.`)
    else answer.keys.push({ frame, x, y })
  }
}
