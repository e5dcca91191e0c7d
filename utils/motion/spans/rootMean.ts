import type { JudgedKey } from '../types'

/** Root mean square of offset over allowance, of the drawings that don't break; 0 where nothing can be told. */
export function rootMean(keys: readonly JudgedKey[]): number {
  const strains = keys.flatMap(({ offset, allowance, breaks }) => (offset === null || !allowance || breaks ? [] : [(offset / allowance) ** 2]))
  return strains.length > 0 ? Math.sqrt(strains.reduce((sum, value) => sum + value, 0) / strains.length) : 0
}
