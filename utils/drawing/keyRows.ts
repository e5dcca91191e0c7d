import { earlyOrLate, figure, findingWords, readingDecimals, signedFigure, tellingFrames, unitSign } from '~/utils/drawing/words'
import type { CheckResult, FindingKind, JudgedKey } from '~/utils/motion/types'

/** The key table's columns and cells, already written out. Rows are written one by one: only those in sight ever are. */

export interface KeyColumn {
  head: string
  kind?: 'law' | 'words'
}
export interface KeyRow {
  frame: number
  /** One per column. */
  cells: string[]
  breaks: boolean
}
type Answer = Pick<CheckResult, 'keys' | 'findings' | 'joints' | 'spans'>

/** A column and what it says of a key. */
type Told = KeyColumn & { say: (key: JudgedKey, decimals: number) => string }

/** Columns and rows of a judged list, in the list's order; `unit` is that of its readings. */
export function keyTable(answer: Answer, unit: string, pointUnit = unit): { columns: KeyColumn[]; row: (index: number) => KeyRow } {
  const decimals = readingDecimals(answer.keys)
  const told = [...columnsFor(answer.keys, unit, pointUnit), { head: 'finding', kind: 'words' as const, say: findingSayer(answer) }]
  return {
    columns: told.map(({ head, kind }) => (kind ? { head, kind } : { head })),
    row: (index) => {
      const key = answer.keys[index]!
      return { frame: key.frame, cells: told.map(({ say }) => say(key, decimals)), breaks: key.breaks }
    },
  }
}

function columnsFor(keys: readonly JudgedKey[], unit: string, pointUnit: string): Told[] {
  const [sign, onPaper] = [unitSign(unit), unitSign(pointUnit)]
  const points: Told[] = [
    { head: `x ${onPaper}`, say: ({ point }) => figure(point?.x) },
    { head: `y ${onPaper}`, say: ({ point }) => figure(point?.y) },
  ]
  const path: Told[] = [{ head: `off the path ${onPaper}`, say: ({ offPath }) => signedFigure(offPath) }]
  const flight: Told[] = [
    { head: `sideways ${onPaper}`, say: ({ sideways }, decimals) => figure(sideways?.reading, decimals) },
    { head: `law sideways ${onPaper}`, kind: 'law', say: ({ sideways }, decimals) => figure(sideways?.law, decimals) },
  ]
  const has = (what: keyof JudgedKey) => keys.some((key) => key[what] !== undefined)
  return [
    ...(has('point') ? points : []),
    { head: `${has('sideways') ? 'down' : 'posted'} ${sign}`, say: ({ reading }, decimals) => figure(reading, decimals) },
    { head: `law ${sign}`, kind: 'law', say: ({ law }, decimals) => figure(law, decimals) },
    { head: `off by ${sign}`, say: ({ offset }, decimals) => signedFigure(offset, decimals) },
    { head: 'off by, frames', say: (key, decimals) => signedFigure(tellingFrames(key, decimals)) },
    { head: `gap ${sign}`, say: ({ gap }, decimals) => figure(gap, decimals) },
    { head: `law’s gap ${sign}`, kind: 'law', say: ({ lawGap }, decimals) => figure(lawGap, decimals) },
    { head: `allowed ${sign}`, say: ({ allowance }, decimals) => figure(allowance, decimals) },
    ...(has('sideways') ? flight : []),
    ...(has('offPath') ? path : []),
  ]
}

/** What is told of a drawing: that spans meet there, and what is wrong with it. */
function findingSayer({ findings, joints = [] }: Answer): (key: JudgedKey) => string {
  const kinds = new Map<number, FindingKind>()
  for (const { kind, frames } of findings) for (const frame of frames) if (!kinds.has(frame)) kinds.set(frame, kind)
  const meets = new Map(joints.map(({ frame, contact }) => [frame, contact ? '▾ contact' : '¦ joint']))
  return (key) => {
    const kind = kinds.get(key.frame)
    const name = kind ? findingWords[kind] : key.breaks ? 'breaks' : ''
    const off = key.breaks && kind !== 'off-path' ? earlyOrLate(key.offsetFrames) : ''
    const wrong = name && `${key.breaks || kind === 'broken-joint' ? '✕ ' : ''}${[name, off].filter(Boolean).join(', ')}`
    return [meets.get(key.frame), wrong].filter(Boolean).join(' · ')
  }
}
