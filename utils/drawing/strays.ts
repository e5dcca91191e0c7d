import { earlyOrLateInFrames, tellingFrames, withUnit } from '~/utils/drawing/words'
import type { JudgedKey } from '~/utils/motion/types'

/** A drawing that breaks, in one sentence: where it was posted, where it should sit, how far off that is. */

type Step = Pick<JudgedKey, 'lawGap'>

/** Which way the law goes at a key: 1 up the readings, −1 down, 0 where it stands still. */
function wayAt(keys: readonly Step[], index: number): number {
  const [after, before] = [keys[index]?.lawGap ?? 0, keys[index - 1]?.lawGap ?? 0]
  return Math.sign(after || before)
}

/** "2.6° past", "4 px short"; "3° off" where the law stands still. */
function byHowMuch(offset: number, way: number, unit: string, decimals: number): string {
  const far = withUnit(Math.abs(offset), unit, decimals)
  return way === 0 ? `${far} off` : `${far} ${Math.sign(offset) === way ? 'past' : 'short'}`
}

/**
 * "Frame 1013: posted 42.0°, should sit at 39.4°, 2.6° past, 1.1 frames early". Empty where the drawing holds. `unit` is that of the
 * readings, `pointUnit` that of the drawing where the list was posted as points.
 */
export function strayInWords(keys: readonly JudgedKey[], index: number, unit: string, decimals = 1, pointUnit = unit): string {
  const key = keys[index]
  if (!key?.breaks) return ''
  const parts: string[] = []
  const { reading, law, offset, allowance, offPath, sideways } = key
  // A drawing may sit off the path, or sideways off it, and be in time all the same.
  const late = law !== null && offset !== null && (Math.abs(offset) > (allowance ?? 0) || (offPath === undefined && !sideways?.breaks))
  if (late) {
    parts.push(`posted ${withUnit(reading, unit, decimals)}`, `should sit at ${withUnit(law, unit, decimals)}`)
    parts.push(byHowMuch(offset, wayAt(keys, index), unit, decimals))
    const frames = earlyOrLateInFrames(tellingFrames(key, decimals))
    if (frames && frames !== 'on the line') parts.push(frames)
  }
  if (sideways?.breaks) {
    parts.push(`sideways ${withUnit(sideways.reading, pointUnit, decimals)}`)
    if (sideways.law !== null) parts.push(`should be ${withUnit(sideways.law, pointUnit, decimals)}`)
  }
  // Allowances are in the readings' unit: degrees say nothing of a distance.
  const alsoOff = !late || (unit === pointUnit && Math.abs(offPath ?? 0) > (allowance ?? 0))
  if (offPath !== undefined && Math.abs(offPath) > 0 && !sideways?.breaks && alsoOff)
    parts.push(`${withUnit(Math.abs(offPath), pointUnit, decimals)} off the path`)
  return `Frame ${key.frame}: ${parts.length > 0 ? parts.join(', ') : 'breaks'}`
}
