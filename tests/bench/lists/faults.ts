/** Faults that are drawn into a list after the fact. */
import type { TruthOf } from './made'
import type { Drawn, Paper } from './paper'
import type { Chance } from './random'

/** Moves drawings by at least three allowances; where the motion never turns they stay between their neighbours. */
export function misplace(
  chance: Chance, drawn: Drawn, count: number, turns: boolean, paper: Paper, truth: TruthOf, frameOf: (i: number) => number,
): boolean {
  const n = drawn.reading.length
  const chosen: number[] = []
  for (let tries = 0; tries < 60 && chosen.length < count; tries++) {
    const i = chance.whole(2, n - 3)
    if (chosen.some(other => Math.abs(other - i) < 2)) continue
    const by = chance.one([1, -1]) * (drawn.allowance[i] as number) * chance.between(3, 7)
    const moved = Number((Math.round(((drawn.reading[i] as number) + by) / paper.step) * paper.step).toFixed(3))
    if (Math.abs(moved - (drawn.exact[i] as number)) < 3 * (drawn.allowance[i] as number)) continue
    const left = drawn.reading[i - 1] as number
    const right = drawn.reading[i + 1] as number
    if (!turns && (moved <= Math.min(left, right) || moved >= Math.max(left, right))) continue
    drawn.reading[i] = moved
    chosen.push(i)
  }
  if (chosen.length < count) return false
  truth.kind = 'misplaced'
  truth.frames = chosen.sort((a, b) => a - b).map(frameOf)
  return true
}

/** Puts one drawing behind the one before it by at least three slops. */
export function backward(chance: Chance, drawn: Drawn, paper: Paper, truth: TruthOf, frameOf: (i: number) => number): boolean {
  const n = drawn.reading.length
  const way = Math.sign((drawn.exact[n - 1] as number) - (drawn.exact[0] as number))
  const i = chance.whole(2, n - 3)
  const back = paper.slop * chance.between(3, 8)
  drawn.reading[i] = Number((Math.round(((drawn.reading[i - 1] as number) - way * back) / paper.step) * paper.step).toFixed(3))
  truth.kind = 'backward'
  truth.frames = [frameOf(i)]
  return true
}
