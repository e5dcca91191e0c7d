/**
 * A fitted pivot is itself only known to within the pencil: what that adds to the doubt about the size. To first order, moving the pivot
 * moves every reading a little, and the readings move the law's pace by its own least squares.
 */
import { LAWS } from '../laws/index'
import type { Line } from '../line'
import type { Judgement } from '../readings'
import { seriesOf } from '../series'
import { solve3 } from '../solve'
import { student95 } from '../student'
import type { JudgedKey, ReadingCheck, SizeReading } from '../types'
import { angleCourse } from './course'
import type { Course } from './course'
import { neighbours } from './curveFit'
import type { Sheet } from './sheet'

/** A claim further from the size than this share of its interval is contradicted by it (as for a row of readings). */
const CONTRADICTS = 1.6

/** How ln k changes with each reading, 1/reading units; null where the list doesn't settle it. */
function paceByReading(check: ReadingCheck, line: Line, keys: readonly JudgedKey[]): Float64Array | null {
  const series = seriesOf(check)
  const model = LAWS[line.law]
  const { columns } = model.trace(series, Float64Array.from(line.numbers), series.x.map(x => x - line.lag), true)
  const size = columns.length
  const counts = keys.map((key): number => (key.breaks ? 0 : 1))
  const a = new Float64Array(size * size)
  for (let p = 0; p < size; p++) {
    for (let q = 0; q < size; q++) {
      a[size * p + q] = counts.reduce((sum, count, i) => sum + count * ((columns[p] as Float64Array)[i] as number) * ((columns[q] as Float64Array)[i] as number), 0)
    }
  }
  const row = solve3(a, Float64Array.from({ length: size }, (_, p) => (p === 0 ? 1 : 0)), size)
  return row && Float64Array.from(counts, (count, i) => count * columns.reduce((sum, column, p) => sum + (row[p] as number) * (column[i] as number), 0))
}

function widened(size: SizeReading, more: number): SizeReading {
  const { value } = size
  // Each side by itself: intervals of sizes are even in the logarithm.
  return {
    ...size,
    low: value * Math.exp(-Math.hypot(Math.log(value / size.low), more)),
    high: value * Math.exp(Math.hypot(Math.log(size.high / value), more)),
  }
}

/** A judgement whose size also allows for the pivot. A given pivot, and laws without a pace of their own, are left as they are. */
export function withPivotDoubt(sheet: Sheet, course: Course, check: ReadingCheck, judged: Judgement): Judgement {
  const { line, result } = judged
  const { fit } = course
  if (course.given || course.measure !== 'angle' || !fit || !line || !result.size || result.size.unit !== 'm' || !(result.size.low > 0)) return judged
  const byReading = paceByReading(check, line, result.keys)
  if (!byReading) return judged
  let variance = 0
  for (const curve of neighbours(sheet, fit, check.slop / Math.abs(course.perUnit))) {
    const moved = angleCourse(sheet, { ...fit, curve }, false, check.law)
    const change = byReading.reduce((sum, slope, i) => sum + slope * ((moved.readings[i] as number) - (course.readings[i] as number)), 0)
    variance += change * change
  }
  // Sizes go as the pace squared.
  const kept = fit.counts.reduce((sum, count) => sum + count, 0)
  const more = Math.min(20, 2 * student95(Math.max(1, kept - 3)) * Math.sqrt(variance))
  const size = widened(result.size, more)
  const half = Math.log(size.high / size.value)
  const findings = result.findings.filter(({ kind, amount }) => kind !== 'wrong-scale' || Math.abs(Math.log(amount)) > CONTRADICTS * half)
  const holds = result.verdict === 'breaks' && result.findings.length > findings.length && findings.length === 0 && !result.keys.some(key => key.breaks)
  return { ...judged, result: { ...result, size, findings, verdict: holds ? 'holds' : result.verdict } }
}
