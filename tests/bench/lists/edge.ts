/**
 * Bodies that go over a brink, as lists with their truth: angles, or the places of their centre. The motion is integrated from Newton's
 * laws (`edgeMotion.ts`), then drawn with pencil and rounding, with at most one fault. Shares no code with the judge.
 */
import { overEdgeStates, pressing } from './edgeMotion'
import type { EdgeBody, EdgeState } from './edgeMotion'
import { GRAVITY } from './motion'
import { Chance } from './random'

type Body =
  | { shape: 'rod', height: number } | { shape: 'block', width: number, height: number }
  | { shape: 'cylinder', radius: number, height: number }
  | { shape: 'pole', height: number, mass: number, headMass: number, headHeight: number }

export interface EdgeTruth {
  kind: 'clean' | 'misplaced' | 'held' | 'skipped' | 'wrong-scale' | 'wrong-release' | 'off-path' | 'undecided'
  frames: number[]
  /** Metres, the body's height. */
  size: number
  /** Degrees late, of a wrong release; null where it falls straight down. */
  late?: number | null
  /** Degrees out at which it leaves, and the frame. */
  releaseAngle?: number
  release?: number
  straight?: boolean
}

interface Shared { law: 'over-edge', fps: number, unit: string, slop: number, tolerance: number, start?: 'rest', subject?: Body }
export type EdgeRequest = Shared & (
  | { measure: 'angle', keys: { frame: number, reading: number }[], zeroAt?: number }
  | { measure: 'point', keys: { frame: number, x: number, y: number }[], yAxis?: 'up' | 'down', pivot?: { x: number, y: number } }
)
export interface EdgeList { family: string, request: EdgeRequest, truth: EdgeTruth }

type Family =
  | 'clean from rest' | 'clean pushed' | 'arc only' | 'early' | 'late' | 'straight down' | 'misplaced' | 'misplaced-two' | 'held' | 'skipped'
  | 'wrong-scale'

const DEGREE = 180 / Math.PI

/** Textbook moments about the centre, and where the centre sits. */
function bodyOf(subject: Body): EdgeBody {
  switch (subject.shape) {
    case 'rod': return { d: subject.height / 2, inertia: subject.height ** 2 / 12, gravity: GRAVITY }
    case 'block': {
      const square = subject.width ** 2 + subject.height ** 2
      return { d: Math.sqrt(square) / 2, inertia: square / 12, gravity: GRAVITY }
    }
    case 'cylinder': {
      const { radius: r, height: h } = subject
      return { d: Math.sqrt(r * r + h * h / 4), inertia: r * r / 4 + h * h / 12, gravity: GRAVITY }
    }
    case 'pole': {
      const { height: h, mass: m, headMass: M, headHeight: c } = subject
      const d = (m * h / 2 + M * c) / (m + M)
      return { d, inertia: (m * (h * h / 12 + (h / 2 - d) ** 2) + M * (c - d) ** 2) / (m + M), gravity: GRAVITY }
    }
  }
}

function subjectFor(chance: Chance, height: number): Body {
  switch (chance.one(['rod', 'rod', 'block', 'cylinder', 'pole'] as const)) {
    case 'rod': return { shape: 'rod', height }
    case 'block': return { shape: 'block', height, width: height * chance.between(0.2, 0.9) }
    case 'cylinder': return { shape: 'cylinder', height, radius: height * chance.between(0.1, 0.4) }
    case 'pole': return { shape: 'pole', height, mass: 4, headMass: chance.between(1, 8), headHeight: height * chance.between(0.7, 1) }
  }
}

const times = (subject: Body, by: number): Body => {
  switch (subject.shape) {
    case 'rod': return { ...subject, height: subject.height * by }
    case 'block': return { ...subject, height: subject.height * by, width: subject.width * by }
    case 'cylinder': return { ...subject, height: subject.height * by, radius: subject.radius * by }
    case 'pole': return { ...subject, height: subject.height * by, headHeight: subject.headHeight * by }
  }
}

/** One list, or null where this throw of the dice gave no usable one. */
function attempt(chance: Chance, family: Family, measure: 'angle' | 'point'): EdgeList | null {
  const fps = chance.one([24, 24, 24, 12, 25, 30, 23.976, 60])
  const height = chance.spread(0.15, 40)
  const subject = subjectFor(chance, height)
  const body = bodyOf(subject)
  const { d, inertia } = body
  const k = Math.sqrt(GRAVITY * d / (inertia + d * d))
  const side = chance.next() < 0.3 ? -1 : 1
  const pushed = family === 'clean pushed' || (family !== 'clean from rest' && chance.next() < 0.3)
  const lean = chance.between(1, 14) / DEGREE
  const turn = pushed ? k * chance.between(0.02, 0.5) : 0
  const every = chance.whole(1, 4)
  const uneven = chance.next() < 0.2

  // Where it leaves, by the integration's own event; then how far on it is drawn.
  const honest = overEdgeStates(body, side * lean, side * turn, 1 / k, 40, state => state.free).release
  if (!honest) return null
  const leaves = Math.abs(honest.angle)
  const late = family === 'early' ? -chance.between(8, 26) / DEGREE : family === 'late' ? chance.between(8, 26) / DEGREE : 0
  const leavesAt = late === 0 ? undefined : leaves + late
  if (leavesAt !== undefined && leavesAt < lean + 8 / DEGREE) return null
  const let_go = leavesAt ?? leaves
  const end = family === 'arc only' ? leaves - 2 / DEGREE : let_go + chance.between(25, 130) / DEGREE
  const { states, release } = overEdgeStates(
    body, side * lean, side * turn, 1 / fps, 400, state => Math.abs(state.angle) > end, { leavesAt, sideways: family !== 'straight down' },
  )
  states.pop()
  if (family !== 'arc only' && !release) return null

  // What is drawn: a slow start may be left out, and no more than sixty keys are.
  const last = states.length - 1
  let at = [0]
  while ((at[at.length - 1] as number) < last) at.push((at[at.length - 1] as number) + (uneven ? chance.whole(1, 4) : every))
  at = at.filter(frame => frame <= last)
  if (at.length > 60) at = at.slice(-60)
  if (at.length < 9) return null
  const longest = Math.max(...at.slice(1).map((frame, i) => frame - (at[i] as number)))
  if (k * longest / fps > 0.5) return null
  const begun = at[0] as number
  const step = measure === 'angle' ? 0.1 : chance.one([0.5, 1])
  const slop = measure === 'angle' ? 0.3 : step === 0.5 ? 1 : 1.5
  const perMetre = chance.between(70, 400) / d
  const yAxis = chance.next() < 0.3 ? 'up' as const : 'down' as const
  const brink = { x: Math.round(chance.between(0, 1200)), y: Math.round(chance.between(0, 800)) }
  const zeroAt = measure === 'angle' && chance.next() < 0.15 ? chance.between(-20, 20) : 0
  const rows = (all: EdgeState[]) => all.map(({ angle, x, y }) => (measure === 'angle'
    ? [angle * DEGREE - zeroAt]
    : [brink.x + perMetre * x, brink.y + (yAxis === 'up' ? 1 : -1) * perMetre * y]))
  const exact = rows(states)

  const truth: EdgeTruth = {
    kind: 'clean', frames: [], size: height,
    ...(release && { releaseAngle: Math.abs(release.angle) * DEGREE, release: release.t * fps }),
  }
  const between = (a: number[], b: number[]) => Math.hypot(...a.map((value, i) => value - (b[i] as number)))
  const allowanceAt = (keys: number[], i: number) => {
    const row = (j: number) => exact[keys[j] as number] as number[]
    const gaps = [i > 0 ? between(row(i), row(i - 1)) : -1, i < keys.length - 1 ? between(row(i), row(i + 1)) : -1].filter(gap => gap >= 0)
    return slop + 0.1 * gaps.reduce((sum, gap) => sum + gap, 0) / gaps.length
  }
  if (release) {
    const after = at.filter(frame => frame / fps > release.t).length
    if (after < 4 || at.length - after < 4) return null
    // Nothing of an arc can be told from one that has hardly begun to be drawn.
    if (Math.abs(release.angle) - Math.abs((states[begun] as EdgeState).angle) < 15 / DEGREE) return null
  }
  if (family === 'early' || family === 'late' || family === 'straight down') {
    // The fault has to show: somewhere it is drawn three allowances from where the body would have been.
    const right = rows(overEdgeStates(body, side * lean, side * turn, 1 / fps, last, () => false).states)
    if (!at.some((frame, i) => between(exact[frame] as number[], right[frame] as number[]) > 3 * allowanceAt(at, i))) return null
    truth.kind = 'wrong-release'
    truth.late = family === 'straight down' ? null : late * DEGREE
    truth.straight = family === 'straight down'
  }

  let delay = (_i: number) => 0
  if (family === 'held' || family === 'skipped') {
    const from = chance.whole(3, at.length - 4)
    const exposure = family === 'held'
      ? (at[from] as number) - (at[from - 1] as number)
      : -((at[from + 1] as number) - (at[from] as number))
    if (family === 'skipped') at = at.slice(0, -1)
    delay = i => (i >= from ? exposure : 0)
    if (at.some((frame, i) => frame - delay(i) > last || frame - delay(i) < 0)) return null
    if (between(exact[(at[from] as number) - exposure] as number[], exact[at[from] as number] as number[]) < 3 * allowanceAt(at, from)) return null
    truth.kind = family
    truth.frames = [at[from] as number]
  }
  const even = chance.next() < 0.5
  const part = chance.between(0.2, 0.65)
  const room = slop - step / 2
  const write = (value: number) => Number((Math.round(value / step) * step).toFixed(3))
  const drawn = at.map((frame, i) => (exact[frame - delay(i)] as number[]).map((value) => {
    const share = measure === 'angle' ? 1 : Math.SQRT1_2
    const pencil = share * (even ? chance.between(-part, part) * slop : Math.max(-room, Math.min(room, chance.bell() * slop * part * 0.5)))
    return write(value + pencil)
  }))
  if (family === 'misplaced' || family === 'misplaced-two') {
    const chosen: number[] = []
    for (let tries = 0; tries < 60 && chosen.length < (family === 'misplaced' ? 1 : 2); tries++) {
      const i = chance.whole(2, at.length - 3)
      if (chosen.some(other => Math.abs(other - i) < 2)) continue
      const before = exact[at[i - 1] as number] as number[]
      const next = exact[at[i + 1] as number] as number[]
      const way = next.map((value, axis) => (value - (before[axis] as number)) / between(next, before))
      const by = chance.one([1, -1]) * chance.between(3.5, 7) * allowanceAt(at, i)
      const moved = (drawn[i] as number[]).map((value, axis) => write(value + (way[axis] as number) * by))
      // It stays between its neighbours: further, and it would be another fault.
      if (Math.abs(by) > 0.45 * between(next, before)) continue
      const beside = [drawn[i - 1] as number[], drawn[i + 1] as number[]] as const
      if (measure === 'angle' && ((moved[0] as number) - (beside[0][0] as number)) * ((moved[0] as number) - (beside[1][0] as number)) >= 0) continue
      drawn[i] = moved
      chosen.push(i)
    }
    if (chosen.length < (family === 'misplaced' ? 1 : 2)) return null
    truth.kind = 'misplaced'
    truth.frames = chosen.sort((a, b) => a - b).map(i => at[i] as number)
  }

  const first = chance.one([0, 1, 101, 1001])
  const number = (frame: number) => first + frame - begun
  truth.frames = truth.frames.map(number)
  if (truth.release !== undefined) truth.release = number(truth.release)
  const named = family === 'wrong-scale' || subject.shape !== 'rod' || chance.next() < 0.5
  if (family === 'wrong-scale') truth.kind = 'wrong-scale'
  const shared: Shared = {
    law: 'over-edge', fps, unit: measure === 'angle' ? 'deg' : 'px', slop, tolerance: 0.1,
    ...(named && { subject: family === 'wrong-scale' ? times(subject, chance.one([3, 6, 1 / 3, 1 / 6])) : subject }),
    ...(begun === 0 && !pushed && chance.next() < 0.3 && { start: 'rest' as const }),
  }
  const request: EdgeRequest = measure === 'angle'
    ? { ...shared, measure, keys: drawn.map(([reading = 0], i) => ({ frame: number(at[i] as number), reading })), ...(zeroAt !== 0 && { zeroAt }) }
    : {
        ...shared, measure, keys: drawn.map(([x = 0, y = 0], i) => ({ frame: number(at[i] as number), x, y })),
        ...((yAxis === 'up' || chance.next() < 0.5) && { yAxis }), ...(chance.next() < 0.5 && { pivot: brink }),
      }
  // A body pressed away from the start has no arc to judge.
  return pressing(body, lean, turn) > 0 ? { family: `${measure}: ${family}`, request, truth } : null
}

const ANGLES: Family[] = [
  'clean from rest', 'clean pushed', 'arc only', 'early', 'late', 'misplaced', 'misplaced-two', 'held', 'skipped', 'wrong-scale',
]
const POINTS: Family[] = [
  'clean from rest', 'clean pushed', 'early', 'late', 'straight down', 'misplaced', 'held', 'skipped', 'wrong-scale',
]

/** `count` lists, every family in turn, from one seed. */
export function makeEdgeLists(count: number, seed: number, measures: readonly ('angle' | 'point')[] = ['angle', 'point']): EdgeList[] {
  const plan = [
    ...(measures.includes('angle') ? ANGLES.map(family => [family, 'angle'] as const) : []),
    ...(measures.includes('point') ? POINTS.map(family => [family, 'point'] as const) : []),
  ]
  const lists: EdgeList[] = []
  for (let i = 0; lists.length < count; i++) {
    const [family, measure] = plan[lists.length % plan.length] as (typeof plan)[number]
    const made = attempt(new Chance(seed * 1_000_003 + i), family, measure)
    if (made) lists.push(made)
  }
  return lists
}
