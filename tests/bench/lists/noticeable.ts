/**
 * Whether a motion that is already under way could be told from one that starts from rest: a search over starts from rest for the one
 * that comes closest. Shares no code with the judge.
 */
import type { Law } from './made'

const DEGREE = 180 / Math.PI

/**
 * True where no start from rest of the same law comes within twice the allowance of every drawing: for a fall the best constant and
 * square of time, for a turning body a search over angle and pace, from afar and around its own pace (k², 1/s²). `exact`: degrees or
 * drawing units, `seconds` apart.
 */
export function noticeable(exact: number[], law: Law, seconds: number, slop: number, kSquared?: number): boolean {
  const allowance = exact.map((value, i) => {
    const gaps = [i - 1, i + 1].filter(j => j >= 0 && j < exact.length).map(j => Math.abs(value - (exact[j] as number)))
    return slop + 0.1 * gaps.reduce((sum, gap) => sum + gap, 0) / gaps.length
  })
  const strain = (rest: number[]) => Math.max(...exact.map((value, i) => Math.abs(value - (rest[i] ?? 1e9)) / (allowance[i] as number)))
  if (closest(exact, law, seconds, strain) <= 2) return false
  return kSquared === undefined || closest(exact, law, seconds, strain, Math.log(kSquared)) > 2
}

/** Degrees at every drawing, from rest: Runge and Kutta's classic step, twice per drawing, near enough for a grid search. */
function letGo(pull: 1 | -1, kSquared: number, start: number, seconds: number, count: number): number[] {
  const h = seconds / 2
  const force = (angle: number) => pull * kSquared * Math.sin(angle)
  let [angle, turn] = [start, 0]
  const out = [start * DEGREE]
  for (let i = 2; i < 2 * count; i++) {
    const a1 = force(angle)
    const a2 = force(angle + h / 2 * turn)
    const a3 = force(angle + h / 2 * turn + h * h / 4 * a1)
    const a4 = force(angle + h * turn + h * h / 2 * a2)
    angle += h * turn + h * h / 6 * (a1 + a2 + a3)
    turn += h / 6 * (a1 + 2 * a2 + 2 * a3 + a4)
    if (i % 2 === 1) out.push(angle * DEGREE)
  }
  return out
}

/** Least strain over starts from rest, by a grid that closes in on its best point. */
function closest(exact: number[], law: Law, seconds: number, strain: (rest: number[]) => number, ownPace?: number): number {
  const travel = Math.abs((exact.at(-1) as number) - (exact[0] as number))
  const span = seconds * (exact.length - 1)
  const first = exact[0] as number
  const rest = (offset: number, pace: number) => {
    if (law !== 'odd-rule') return letGo(law === 'topple' ? 1 : -1, Math.exp(pace), (first + offset) / DEGREE, seconds, exact.length)
    return exact.map((_, i) => first + offset + Math.sign((exact.at(-1) as number) - first) * Math.exp(pace) * (i * seconds) ** 2)
  }
  let centre = [0, law === 'odd-rule' ? Math.log(travel / span ** 2) : Math.log((2 / span) ** 2)] as [number, number]
  let wide: [number, number] = law === 'odd-rule' ? [travel / 4, 1] : [law === 'topple' ? 6 : 30, 3]
  if (ownPace !== undefined) [centre, wide] = [[0, ownPace], [law === 'topple' ? 0.6 : 5, 0.3]]
  let least = Infinity
  for (let round = 0; round < 12; round++) {
    const at = centre
    for (let i = -3; i <= 3; i++) {
      for (let j = -3; j <= 3; j++) {
        const trial: [number, number] = [at[0] + wide[0] * i / 3, at[1] + wide[1] * j / 3]
        const worst = strain(rest(...trial))
        if (worst < least) [least, centre] = [worst, trial]
      }
    }
    wide = [wide[0] * 0.6, wide[1] * 0.6]
  }
  return least
}
