import { figure, readingDecimals, unitSign } from '~/utils/drawing/words'
import type { JudgedKey } from '~/utils/motion/types'

/** The spacing list's columns and cells, written out row by row: only those in sight ever are. */
export interface ListTable {
  columns: { head: string }[]
  row: (index: number) => { frame: number; cells: string[] }
}

type Column = [head: string, say: (key: JudgedKey, index: number) => string]

/** Readings with their gaps; of a throw the points, and how far each lies from the next; of a fall over the edge both. */
export function listTable(keys: readonly JudgedKey[], unit: string, pointUnit: string, fps: number): ListTable {
  const decimals = readingDecimals(keys)
  const [sign, onPaper] = [unitSign(unit), unitSign(pointUnit)]
  const readings: Column[] = [
    [`reading ${sign}`, ({ reading }) => figure(reading, decimals)],
    [`gap ${sign}`, ({ gap }) => figure(gap, decimals)],
  ]
  const points: Column[] = [
    [`x ${onPaper}`, ({ point }) => figure(point?.x, decimals)],
    [`y ${onPaper}`, ({ point }) => figure(point?.y, decimals)],
  ]
  const toNext: Column = [`to the next ${onPaper}`, (key, i) => figure(apart(key, keys[i + 1]), decimals)]
  const thrown = keys.some(({ sideways }) => sideways)
  const pointed = keys.some(({ point }) => point)
  const columns: Column[] = [
    ['drawing', (_, i) => String(i + 1)],
    ...(thrown ? [...points, toNext] : pointed ? [...readings, ...points] : readings),
    ['time s', ({ frame }) => figure((frame - 1) / fps, 2)],
  ]
  return {
    columns: columns.map(([head]) => ({ head })),
    row: (index) => ({ frame: keys[index]!.frame, cells: columns.map(([, say]) => say(keys[index]!, index)) }),
  }
}

function apart({ point }: JudgedKey, next: JudgedKey | undefined): number | null {
  return point && next?.point ? Math.hypot(next.point.x - point.x, next.point.y - point.y) : null
}
