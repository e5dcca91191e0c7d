/**
 * Lists claimed to start from rest: those that do, those already under way by half a frame, one or two, and those with a drawing held or
 * skipped in their first few. Motions from school algebra for falls, from the bench's own integrator for turning bodies.
 */
import type { MadeList } from './made'
import { GRAVITY, swung } from './motion'
import { noticeable } from './noticeable'
import { Chance } from './random'

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
  /** Metres, height of the rod or length of the bob. */
  size?: number
}

const DEGREE = 180 / Math.PI

/** A motion let go `before` frames ahead of its first drawing, at every exposure. */
interface Let { law: StartList['law'], fps: number, every: number, before: number, slop: number, exact: number[], size?: number, kSquared?: number }

/** One motion of at most `count` drawings, or null where this throw of the dice gave one too short, or too fast for its exposure. */
function letGo(chance: Chance, law: StartList['law'], beforeOf: (every: number) => number): Let | null {
  const fps = chance.one([24, 24, 12, 25, 30, 23.976])
  const every = chance.whole(1, 3)
  const count = chance.whole(10, 32)
  const turning = law !== 'odd-rule'
  const slop = turning ? 0.3 : 1
  const before = beforeOf(every)
  if (!turning) {
    const c = chance.spread(60, 2500) / (count * every) ** 2 * chance.one([1, -1])
    return { law, fps, every, before, slop, exact: Array.from({ length: count }, (_, i) => c * ((i * every + before) ** 2 - before ** 2)) }
  }
  const size = chance.spread(0.3, 40)
  const k = Math.sqrt(GRAVITY / (law === 'topple' ? 2 / 3 : 1) / size)
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
  const exact = swung(pull, k * k, angle, turn, fps, (count - 1) * every, end).filter((_, i) => i % every === 0).map(a => a * DEGREE)
  // Enough of the motion to show its curve: a third of the way down, a third of a swing.
  const shown = law === 'topple' ? Math.abs((exact.at(-1) ?? 0) / 90) : k * exact.length * every / fps / (2 * Math.PI)
  return exact.length < 10 || shown < 0.35 ? null : { law, fps, every, before, slop, exact, size, kSquared: k * k }
}

/** Pencil and rounding. */
function drawn(chance: Chance, { law, fps, every, before, slop, exact, size }: Let): StartList {
  const turning = law !== 'odd-rule'
  const step = turning ? 0.1 : 0.5
  const keys = exact.map((value, i) => ({
    frame: 1 + i * every, reading: Number((Math.round((value + chance.between(-0.4, 0.4) * slop) / step) * step).toFixed(3)),
  }))
  return {
    law, fps, measure: turning ? 'angle' : 'distance', unit: turning ? 'deg' : 'px', slop, tolerance: 0.1, keys, start: 'rest', before,
    ...(size === undefined ? {} : { size }),
  }
}

const tells = ({ exact, law, every, fps, slop, kSquared }: Let) => noticeable(exact, law, every / fps, slop, kSquared)

const THREE = ['odd-rule', 'topple', 'pendulum'] as const

/** `count` lists, the three laws in turn: from rest, or let go half an exposure to three before the first drawing. */
export function startLists(count: number, moving: boolean, seed: number): StartList[] {
  const lists: StartList[] = []
  for (let i = 0; lists.length < count; i++) {
    const chance = new Chance(seed * 1_000_003 + i)
    const motion = letGo(chance, THREE[lists.length % 3] as StartList['law'], every => (moving ? chance.between(0.5, 3) * every : 0))
    if (!motion) continue
    const list = drawn(chance, motion)
    if (!moving || tells(motion)) lists.push(list)
  }
  return lists
}

type Family = 'from rest' | 'half a frame on' | 'one frame on' | 'two frames on' | 'from rest, held early' | 'from rest, skipped early'

const BEFORE: Partial<Record<Family, number>> = { 'half a frame on': 0.5, 'one frame on': 1, 'two frames on': 2 }

function attempt(chance: Chance, family: Family, law: StartList['law']): MadeList | null {
  const before = BEFORE[family] ?? 0
  const motion = letGo(chance, law, () => before)
  if (!motion) return null
  // A slow body has hardly begun by then, and the search would only say so at length.
  if (before > 0 && Math.sqrt(motion.kSquared ?? Infinity) * before / motion.fps < 0.12) return null
  if (before > 0 && !tells(motion)) return null
  const { exact, slop, every } = motion
  const truth: MadeList['truth'] = { kind: before > 0 ? 'not-at-rest' : 'clean', frames: before > 0 ? [1] : [], covers: 0.6 }
  if (motion.size !== undefined) truth.size = motion.size
  const fault = family === 'from rest, held early' ? 'held' : family === 'from rest, skipped early' ? 'skipped' : null
  if (fault) {
    const at = chance.whole(3, 6)
    const by = fault === 'held' ? -1 : 1
    const shown = exact.slice(0, fault === 'held' ? undefined : -1).map((_, i) => exact[i < at ? i : i + by] as number)
    const gap = Math.abs((exact[at + 1] as number) - (exact[at - 1] as number)) / 2
    if (Math.abs((shown[at] as number) - (exact[at] as number)) < 3 * (slop + 0.1 * gap) || shown.length < at + 6) return null
    motion.exact = shown
    truth.kind = fault
    truth.frames = [1 + at * every]
  }
  const { before: _, size: __, ...request } = drawn(chance, motion)
  return { family: `${law}: ${family}`, request, truth }
}

const FAMILIES: readonly Family[] = [
  'from rest', 'half a frame on', 'one frame on', 'two frames on', 'from rest, held early', 'from rest, skipped early',
]

/** Half a frame or one into a topple looks like a topple from rest at a slightly larger lean, to any pencil. */
const PLAN = FAMILIES.flatMap(family => THREE.map(law => [family, law] as const))
  .filter(([family, law]) => !(law === 'topple' && (family === 'half a frame on' || family === 'one frame on')))

/** `count` lists with their truth, every family with every law in turn. */
export function restLists(count: number, seed: number): MadeList[] {
  const lists: MadeList[] = []
  for (let i = 0; lists.length < count; i++) {
    const made = attempt(new Chance(seed * 1_000_003 + i), ...(PLAN[lists.length % PLAN.length] as (typeof PLAN)[number]))
    if (made) lists.push(made)
  }
  return lists
}
