import type { Key } from '~/utils/motion/types'

/**
 * Reads a piece of a sheet that someone pasted: two columns, frame and reading or frame and gap, in either order. Nothing here
 * guesses in silence: what was taken for what stands in the answer, and a line that can't be read is told by its number.
 */

export type PastedColumn = 'frame' | 'reading' | 'gap' | 'x' | 'y' | 'left out'
export type GapSide = 'to the next' | 'from the one before'

export interface PasteWishes {
  /** Which column holds frames (0 is the first); found out when left out. */
  frameColumn?: number
  /** What the other column holds; found out from the header, else readings. */
  holds?: 'reading' | 'gap'
  gapSide?: GapSide
  /** The reading of the first drawing where the list holds gaps. */
  startReading?: number
}
export interface PasteProblem {
  /** Line of the pasted text, counted from 1. */
  line: number
  message: string
}
export interface Pasted<Each = Key> {
  keys: Each[]
  columns: PastedColumn[]
  separator: 'tab' | 'semicolon' | 'comma' | 'space' | null
  decimal: '.' | ','
  header: string[] | null
  gapSide: GapSide
  /** What was done that a person should know of, in sentences. */
  notes: string[]
  problems: PasteProblem[]
}

const SEPARATORS = { tab: /\t/, semicolon: /\s*;\s*/, comma: /\s*,\s*/, space: /\s+/ } as const
const HEADS: [PastedColumn, RegExp][] = [
  ['frame', /^(frames?|frm?|f|drawings?|time|x)\b/i],
  ['gap', /^(gaps?|spacing|step|delta|d)\b/i],
  ['reading', /^(readings?|posted|angle|degrees?|deg|lean|position|pos|distance|dist|value|height|y)\b/i],
]
/** Lines read at most: a good deal more than a list may hold, so that the surplus can be told of. */
const MAX_LINES = 5_000
const MAX_PROBLEMS = 50

export interface Line {
  number: number
  cells: string[]
}

/** A number as people write it: true minus, decimal comma, a degree sign or a unit behind. Null where it is none. */
export function readNumber(cell: string): number | null {
  // Nearly every cell of a long list is this plain.
  if (/^-?\d{1,15}(?:\.\d{1,15})?$/.test(cell)) return Number(cell)
  const text = cell
    .trim()
    .replace(/^["']|["']$/g, '')
    .replace(/[\u2212\u2013]/g, '-')
    .replace(/\s*(°|deg|px|m|cm|mm)$/i, '')
    .replace(/[\s\u00A0\u202F]/g, '')
  if (!/^[+-]?(\d+([.,]\d*)?|[.,]\d+)(e[+-]?\d+)?$/i.test(text)) return null
  const value = Number(text.replace(',', '.'))
  return Number.isFinite(value) ? value : null
}

/** Reads pasted text. Never throws; an empty text gives no keys and no problems. */
export function readPaste(text: string, wishes: PasteWishes = {}): Pasted {
  const { answer, lines } = readTable<Key>(text, 2)
  if (wishes.gapSide) answer.gapSide = wishes.gapSide
  if (lines.length === 0) return answer
  answer.columns = columnsOf(lines, answer.header, wishes)
  readRows(lines, answer, wishes)
  return withFewProblems(answer)
}

/** The lines of a pasted table in cells, its header and separator told. `columns`: how many a line is expected to have. */
export function readTable<Each>(text: string, columns: 2 | 3): { answer: Pasted<Each>; lines: Line[] } {
  const raw = text
    .replace(/^\uFEFF/, '')
    .split(/\r\n|\r|\n/)
    .map((content, i) => ({ number: i + 1, content: content.replace(/[ \u00A0]+$/, '') }))
    .filter(({ content }) => content.trim() !== '')
  const answer: Pasted<Each> = {
    keys: [], columns: [], separator: null, decimal: '.', header: null, gapSide: 'to the next', notes: [], problems: [],
  }
  if (raw.length === 0) return { answer, lines: [] }
  if (raw.length > MAX_LINES) answer.notes.push(`Only the first ${MAX_LINES} lines were read.`)
  const contents = raw.slice(0, MAX_LINES)
  answer.separator = separatorOf(contents.map(({ content }) => content))
  let lines = splitLines(contents, answer, columns)
  const first = lines[0]
  if (first && first.cells.some((cell) => /\p{L}/u.test(cell)) && first.cells.every((cell) => readNumber(cell) === null)) {
    answer.header = first.cells.map((cell) => cell.trim())
    lines = lines.slice(1)
  }
  answer.decimal = lines.some(({ cells }) => cells.some((cell) => /\d,\d/.test(cell))) ? ',' : '.'
  return { answer, lines }
}

export function withFewProblems<Each>(answer: Pasted<Each>): Pasted<Each> {
  if (answer.problems.length > MAX_PROBLEMS) {
    answer.notes.push(`${answer.problems.length - MAX_PROBLEMS} more lines can’t be read.`)
    answer.problems.length = MAX_PROBLEMS
  }
  return answer
}

function separatorOf(contents: string[]): NonNullable<Pasted['separator']> {
  const most = (pattern: RegExp) => contents.filter((content) => pattern.test(content.trim())).length * 2 > contents.length
  if (most(/\t/)) return 'tab'
  if (most(/;/)) return 'semicolon'
  // "1 2,5": a space parts the columns and the comma belongs to the number. "1, 2.5": the comma does.
  if (most(/^\S*\d\s+[+\-\u2212.,\d]\S*$/) && !most(/,\s/)) return 'space'
  return most(/,/) ? 'comma' : 'space'
}

function splitLines(contents: { number: number; content: string }[], answer: Pick<Pasted, 'separator' | 'notes'>, columns: 2 | 3): Line[] {
  const pattern = SEPARATORS[answer.separator ?? 'tab']
  const lines = contents.map(({ number, content }) => ({
    number,
    cells: (answer.separator === 'tab' ? content : content.trim()).split(pattern),
  }))
  if (answer.separator !== 'comma' || columns !== 2) return lines
  // "61,21,5": commas part the columns and the decimals alike. Only told apart where every line has whole numbers between commas.
  const data = lines.filter(({ cells }) => cells.some((cell) => readNumber(cell) !== null))
  const threes = data.filter(({ cells }) => cells.length === 3 && cells.every((cell) => /^[+-]?\d+$/.test(cell)))
  const named = lines[0] && lines[0] !== data[0] ? lines[0].cells.length : 2
  if (threes.length === 0 || named !== 2 || data.some(({ cells }) => cells.length > 3)) return lines
  const joined = threes.length === data.length || data.every(({ cells }) => cells.length === 2 || threes.some((line) => line.cells === cells))
  if (!joined) return lines
  answer.notes.push('Commas part the columns and the decimals alike: “61,21,5” was read as frame 61 and 21.5.')
  for (const line of threes) line.cells = [line.cells[0]!, `${line.cells[1]},${line.cells[2]}`]
  return lines
}

/** Which column is which: what the person says, else the header, else the one column of rising whole numbers. */
function columnsOf(lines: Line[], header: string[] | null, wishes: PasteWishes): PastedColumn[] {
  const width = Math.max(header?.length ?? 0, ...lines.map(({ cells }) => cells.length))
  const named = Array.from({ length: width }, (_, i) => HEADS.find(([, head]) => head.test(header?.[i]?.trim() ?? ''))?.[0] ?? null)
  const frame = wishes.frameColumn ?? (named.includes('frame') ? named.indexOf('frame') : likeliestFrames(lines, width))
  const others = named.map((name, i) => ({ name, i })).filter(({ i }) => i !== frame)
  const other =
    (wishes.holds ? others.find(({ name }) => name === wishes.holds) : undefined) ??
    others.find(({ name }) => name === 'reading') ??
    others.find(({ name }) => name === 'gap') ??
    others.find(({ i }) => lines.some(({ cells }) => readNumber(cells[i] ?? '') !== null)) ??
    others[0]
  const holds = wishes.holds ?? (other?.name === 'gap' ? 'gap' : 'reading')
  return named.map((_, i) => (i === frame ? 'frame' : i === other?.i ? holds : 'left out'))
}

/** The column that counts upwards in even whole steps, best of all. */
export function likeliestFrames(lines: Line[], width: number): number {
  const score = (column: number) => {
    const values = lines.map(({ cells }) => readNumber(cells[column] ?? ''))
    let rising = 0
    let even = 0
    for (let i = 0; i < values.length; i++) {
      const [here, before, twoBefore] = [values[i], values[i - 1], values[i - 2]]
      if (!Number.isInteger(here)) continue
      rising += 1
      if (typeof before === 'number' && here! > before) rising += 1
      if (typeof before === 'number' && typeof twoBefore === 'number' && here! - before === before - twoBefore) even += 0.5
    }
    return rising + even
  }
  let best = 0
  for (let column = 1; column < width; column++) if (score(column) > score(best)) best = column
  return best
}

interface Row {
  line: number
  frame: number
  value: number | null
}

function readRows(lines: Line[], answer: Pasted, wishes: PasteWishes): void {
  const frameAt = answer.columns.indexOf('frame')
  const valueAt = answer.columns.findIndex((column) => column === 'reading' || column === 'gap')
  const holdsGaps = answer.columns[valueAt] === 'gap'
  const complain = (line: number, message: string) => answer.problems.push({ line, message })
  const leftOut = answer.columns.filter((column) => column === 'left out').length
  if (leftOut > 0) answer.notes.push(leftOut === 1 ? 'One column was left out.' : `${leftOut} columns were left out.`)
  if (valueAt < 0) {
    if (lines[0]) complain(lines[0].number, 'Only one column: paste frames and readings, or frames and gaps, side by side.')
    return
  }
  const rows: Row[] = []
  for (const { number, cells } of lines) {
    const frameCell = cells[frameAt]?.trim() ?? ''
    const valueCell = cells[valueAt]?.trim() ?? ''
    const frame = readNumber(frameCell)
    const value = readNumber(valueCell)
    const before = rows.at(-1)
    if (frame === null || !Number.isInteger(frame)) complain(number, frameCell ? `“${short(frameCell)}” is not a frame.` : 'No frame here.')
    else if (value === null && !(holdsGaps && (valueCell === '' || valueCell === '–' || valueCell === '-')))
      complain(number, valueCell ? `“${short(valueCell)}” is not a number.` : `No ${holdsGaps ? 'gap' : 'reading'} for frame ${frame}.`)
    else if (before && frame === before.frame) complain(number, `Frame ${frame} stands twice.`)
    else if (before && frame < before.frame) complain(number, `Frame ${frame} comes after frame ${before.frame}: frames go upwards.`)
    else rows.push({ line: number, frame, value })
  }
  answer.keys = holdsGaps ? sumGaps(rows, answer, wishes) : rows.map(({ frame, value }) => ({ frame, reading: value ?? 0 }))
}

/** Gaps to readings. The side they lie on shows in which end is left empty; both ends filled means one drawing more. */
function sumGaps(rows: Row[], answer: Pasted, wishes: PasteWishes): Key[] {
  const first = rows[0]
  const last = rows.at(-1)
  if (!first || !last) return []
  const fromBefore = !first.value && last.value !== null
  answer.gapSide = wishes.gapSide ?? (fromBefore && rows.length > 1 ? 'from the one before' : 'to the next')
  const ahead = answer.gapSide === 'to the next'
  const keys: Key[] = []
  let reading = wishes.startReading ?? 0
  for (const [i, { frame, value, line }] of rows.entries()) {
    if (value === null && (ahead ? i < rows.length - 1 : i > 0)) answer.problems.push({ line, message: `No gap for frame ${frame}.` })
    if (!ahead) reading += value ?? 0
    keys.push({ frame, reading: clean(reading) })
    if (ahead) reading += value ?? 0
  }
  if (ahead && last.value !== null && rows.length > 1) {
    const step = last.frame - rows.at(-2)!.frame
    keys.push({ frame: last.frame + step, reading: clean(reading) })
    answer.notes.push(`The last gap leads to one more drawing: frame ${last.frame + step} was added.`)
  }
  answer.notes.push(`Readings add up from ${clean(wishes.startReading ?? 0)} at frame ${first.frame}.`)
  return keys
}

/** Adding decimals leaves dust in the last places: 0.1 + 0.2. */
export const clean = (value: number) => Number(value.toPrecision(12))
export const short = (cell: string) => (cell.length > 24 ? `${cell.slice(0, 23)}…` : cell)
