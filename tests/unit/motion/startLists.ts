/**
 * Lists claimed to start from rest, with their truth: school algebra for falls, the bench's own integrator for turning bodies. Shares no
 * code with the judge.
 */
import { GRAVITY, swung } from '../../bench/lists/motion'
import { Chance } from '../../bench/lists/random'

export interface StartList {
  law: 'odd-rule' | 'topple' | 'pendulum'
  fps: number
  measure: 'angle' | 'distance'
  unit: string
  slop: number
  tolerance: number
  keys: { frame: number, reading: number }[]
  start: 'rest'
  /** Frames before the first key at which the motion was let go; 0 from rest. */
  before: number
}

const DEGREE = 180 / Math.PI

/** One list, or null where this throw of the dice gave one too short, or too fast for its exposure. */
function attempt(chance: Chance, law: StartList['law'], moving: boolean): StartList | null {
  const fps = chance.one([24, 24, 12, 25, 30, 23.976])
  const every = chance.whole(1, 3)
  const count = chance.whole(10, 32)
  const turning = law !== 'odd-rule'
  const slop = turning ? 0.3 : 1
  const step = turning ? 0.1 : 0.5
  // Half an exposure to three before the first drawing.
  const exposures = moving ? chance.between(0.5, 3) : 0
  const before = exposures * every
  let exact: number[]
  if (law === 'odd-rule') {
    const c = chance.spread(60, 2500) / (count * every) ** 2 * chance.one([1, -1])
    exact = Array.from({ length: count }, (_, i) => c * ((i * every + before) ** 2 - before ** 2))
  } else {
    const k = Math.sqrt(GRAVITY / (law === 'topple' ? 2 / 3 : 1) / chance.spread(0.3, 40))
    if (k * every / fps > 0.5) return null
    const from = (law === 'topple' ? chance.between(1.5, 12) : chance.between(12, 70) * chance.one([1, -1])) / DEGREE
    const pull = law === 'topple' ? 1 : -1
    // Once to the first key, at a rate that lands on it; from there on frame by frame.
    const ahead = before === 0 ? [from, from] : swung(pull, k * k, from, 0, fps / before, 1)
    const angle = ahead[1] as number
    // Energy: θ′² = 2k²|cos θ₀ − cos θ|, away from upright and towards hanging.
    const away = law === 'topple' ? 1 : -Math.sign(from)
    const turn = before === 0 ? 0 : away * Math.sqrt(2 * k * k * Math.abs(Math.cos(from) - Math.cos(angle)))
    const end = law === 'topple' ? 90 / DEGREE : Infinity
    exact = swung(pull, k * k, angle, turn, fps, (count - 1) * every, end).filter((_, i) => i % every === 0).map(a => a * DEGREE)
    // Enough of the motion to show its curve: a third of the way down, a third of a swing.
    const shown = law === 'topple' ? Math.abs((exact.at(-1) ?? 0) / 90) : k * exact.length * every / fps / (2 * Math.PI)
    if (exact.length < 10 || shown < 0.35) return null
  }
  const keys = exact.map((value, i) => ({
    frame: 1 + i * every, reading: Number((Math.round((value + chance.between(-0.4, 0.4) * slop) / step) * step).toFixed(3)),
  }))
  const list: StartList = {
    law, fps, measure: turning ? 'angle' : 'distance', unit: turning ? 'deg' : 'px', slop, tolerance: 0.1, keys, start: 'rest', before,
  }
  return moving && !noticeable(exact, law, every / fps, slop) ? null : list
}

/**
 * True where no start from rest of the same law comes within twice the allowance of every drawing: for a fall the best constant and
 * square of time, for a turning body a search over angle and pace.
 */
function noticeable(exact: number[], law: StartList['law'], seconds: number, slop: number): boolean {
  const allowance = exact.map((value, i) => {
    const gaps = [i - 1, i + 1].filter(j => j >= 0 && j < exact.length).map(j => Math.abs(value - (exact[j] as number)))
    return slop + 0.1 * gaps.reduce((sum, gap) => sum + gap, 0) / gaps.length
  })
  const strain = (rest: number[]) => Math.max(...exact.map((value, i) => Math.abs(value - (rest[i] ?? 1e9)) / (allowance[i] as number)))
  return closest(exact, law, seconds, strain) > 2
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
function closest(exact: number[], law: StartList['law'], seconds: number, strain: (rest: number[]) => number): number {
  const travel = Math.abs((exact.at(-1) as number) - (exact[0] as number))
  const span = seconds * (exact.length - 1)
  const first = exact[0] as number
  const rest = (offset: number, pace: number) => {
    if (law !== 'odd-rule') return letGo(law === 'topple' ? 1 : -1, Math.exp(pace), (first + offset) / DEGREE, seconds, exact.length)
    return exact.map((_, i) => first + offset + Math.sign((exact.at(-1) as number) - first) * Math.exp(pace) * (i * seconds) ** 2)
  }
  let centre = [0, law === 'odd-rule' ? Math.log(travel / span ** 2) : Math.log((2 / span) ** 2)] as [number, number]
  let wide: [number, number] = law === 'odd-rule' ? [travel / 4, 1] : [law === 'topple' ? 6 : 30, 3]
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

/** `count` lists, the three laws in turn. */
export function startLists(count: number, moving: boolean, seed: number): StartList[] {
  const lists: StartList[] = []
  for (let i = 0; lists.length < count; i++) {
    const law = (['odd-rule', 'topple', 'pendulum'] as const)[lists.length % 3] as StartList['law']
    const made = attempt(new Chance(seed * 1_000_003 + i), law, moving)
    if (made) lists.push(made)
  }
  return lists
}
