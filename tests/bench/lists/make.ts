/**
 * Spacing lists with their truth: a motion by integration, an animator's exposures, pencil and rounding, then at most one fault.
 * Shares no code with the judge.
 */
import { Chance } from './random'
import { GRAVITY, swung } from './motion'

export interface TruthOf {
  kind: 'clean' | 'misplaced' | 'held' | 'skipped' | 'wrong-law' | 'wrong-scale' | 'backward' | 'undecided'
  frames: number[]
  /** Metres, height of the rod or length of the bob. */
  size?: number
  reads?: string | null
  /** Share of the way from start to flat, or of a full swing, that the list covers; where it applies. */
  covers?: number
}

export interface MadeList {
  family: string
  // Written out here on purpose: the judge's own types are not imported.
  request: {
    law: 'odd-rule' | 'topple' | 'pendulum' | 'steady', fps: number, measure: 'angle' | 'distance' | 'arc', unit: string
    slop: number, tolerance: number, keys: { frame: number, reading: number }[], radius?: number, zeroAt?: number
    subject?: { shape: 'rod', height: number } | { shape: 'bob', length: number } | { unitsPerMetre: number }
  }
  truth: TruthOf
}

const DEGREE = 180 / Math.PI

interface Exact {
  /** Reading at every whole frame, before any pencil. */
  readings: number[]
  law: 'odd-rule' | 'topple' | 'pendulum' | 'steady'
  size?: number
  covers?: number
  /** True where the readings turn back on the way. */
  turns: boolean
}

interface Paper { fps: number, measure: 'angle' | 'distance' | 'arc', unit: string, slop: number, step: number, radius: number, zeroAt: number }

function paperFor(chance: Chance, measure: 'angle' | 'distance' | 'arc'): Paper {
  const fps = chance.one([24, 24, 24, 12, 25, 30, 23.976, 60])
  if (measure === 'angle') {
    return { fps, measure, unit: 'deg', slop: 0.3, step: 0.1, radius: 0, zeroAt: chance.next() < 0.15 ? chance.between(-20, 20) : 0 }
  }
  const step = chance.one([0.5, 1])
  return { fps, measure, unit: 'px', slop: step === 0.5 ? 1 : 1.5, step, radius: measure === 'arc' ? chance.spread(150, 900) : 0, zeroAt: 0 }
}

/** Frames of the keys: ones to fours throughout, or uneven. */
function exposuresFor(chance: Chance, frames: number, uneven: boolean): number[] {
  const every = chance.whole(1, 4)
  const at = [0]
  let last = 0
  while (last < frames) {
    last += uneven ? chance.whole(1, 4) : every
    if (last <= frames) at.push(last)
  }
  return at
}

/** Radians to what is written down. */
function toPaper(angle: number, paper: Paper): number {
  return paper.measure === 'arc' ? angle * paper.radius : angle * DEGREE - paper.zeroAt
}

function toppleMotion(chance: Chance, paper: Paper, size: number): Exact {
  const kSquared = GRAVITY / (2 * size / 3)
  const k = Math.sqrt(kSquared)
  const way = chance.one(['rest', 'rest', 'pushed', 'middle'] as const)
  const lean = (way === 'middle' ? chance.between(8, 30) : chance.between(1, 12)) / DEGREE
  const turn = way === 'rest' ? 0 : way === 'pushed' ? k * chance.between(0.02, 0.5) : k * 2 * Math.sin(lean / 2) * chance.between(0.6, 1)
  const end = chance.between(50, 92) / DEGREE
  const readings = swung(1, kSquared, lean, turn, paper.fps, Math.ceil(8 / k * paper.fps), end).map(angle => toPaper(angle, paper))
  return { readings, law: 'topple', size, covers: (end - lean) / (Math.PI / 2 - lean), turns: false }
}

function swingMotion(chance: Chance, paper: Paper, size: number): Exact {
  const kSquared = GRAVITY / size
  const k = Math.sqrt(kSquared)
  const amplitude = chance.between(10, 75) / DEGREE
  const way = chance.one(['end', 'bottom', 'middle'] as const)
  const start = way === 'end' ? amplitude : way === 'bottom' ? 0 : amplitude * chance.between(-0.8, 0.8)
  // Energy: (θ′/2k)² = sin²(A/2) − sin²(θ/2).
  const turn = chance.one([1, -1]) * 2 * k * Math.sqrt(Math.max(0, Math.sin(amplitude / 2) ** 2 - Math.sin(start / 2) ** 2))
  const swings = chance.between(0.6, 2)
  const frames = Math.round(swings * 2 * Math.PI / k * (1 + amplitude * amplitude / 16) * paper.fps)
  const readings = swung(-1, kSquared, start, turn, paper.fps, frames).map(angle => toPaper(angle, paper))
  return { readings, law: 'pendulum', size, covers: swings, turns: true }
}

function fallMotion(chance: Chance, keys: number, every: number): Exact {
  const frames = keys * every
  const travel = chance.spread(60, 2500)
  const way = chance.one(['rest', 'rest', 'pushed', 'apex'] as const)
  const apex = way === 'rest' ? 0 : way === 'apex' ? frames * chance.between(0.15, 0.6) : -frames * chance.between(0.1, 1)
  const far = Math.max(frames - apex, apex)
  const near = way === 'apex' ? 0 : Math.max(0, -apex)
  const a = travel / (far * far - near * near)
  const sign = chance.one([1, 1, -1])
  const zero = chance.one([0, 0, chance.between(-200, 200)])
  const readings = Array.from({ length: frames + 1 }, (_, i) => zero + sign * a * ((i - apex) ** 2 - near * near))
  return { readings, law: 'odd-rule', turns: way === 'apex' }
}

interface Drawn { frames: number[], exact: number[], reading: number[], allowance: number[] }

/** Pencil and rounding. The pencil stays inside the slop: a bell or an even spread of some part of it. */
function draw(chance: Chance, at: number[], readings: number[], paper: Paper, delay: (i: number) => number): Drawn {
  const exact = at.map((frame, i) => readings[frame - delay(i)] as number)
  const plain = at.map(frame => readings[frame] as number)
  const even = chance.next() < 0.5
  const part = chance.between(0.2, 0.65)
  const room = paper.slop - paper.step / 2
  const reading = exact.map((value) => {
    const pencil = even
      ? chance.between(-part, part) * paper.slop
      : Math.max(-room, Math.min(room, chance.bell() * paper.slop * part * 0.5))
    // Rounding a whole number of steps may leave the last bits of a binary fraction; nobody writes those down.
    return Number((Math.round((value + pencil) / paper.step) * paper.step).toFixed(3))
  })
  const allowance = plain.map((value, i) => {
    const left = i > 0 ? Math.abs(value - (plain[i - 1] as number)) : -1
    const right = i < plain.length - 1 ? Math.abs(value - (plain[i + 1] as number)) : -1
    return paper.slop + 0.1 * (left < 0 ? right : right < 0 ? left : (left + right) / 2)
  })
  return { frames: at, exact, reading, allowance }
}

type Family =
  | 'clean' | 'misplaced' | 'misplaced-two' | 'held' | 'skipped' | 'wrong-scale' | 'backward'
  | 'even' | 'ease' | 'fall-as-topple' | 'topple-as-fall' | 'short' | 'few'

/** One list of a family, or null where this throw of the dice gave no usable one. */
function attempt(chance: Chance, family: Family, law: 'odd-rule' | 'topple' | 'pendulum' | 'steady'): MadeList | null {
  const turning = law === 'topple' || law === 'pendulum'
  const measure = turning || family === 'topple-as-fall' ? (chance.next() < 0.75 ? 'angle' : 'arc') : (chance.next() < 0.9 ? 'distance' : 'angle')
  const paper = paperFor(chance, measure)
  const size = chance.spread(0.15, 40)
  const uneven = chance.next() < 0.2
  const motion = motionFor(chance, family, law, paper, size)
  if (!motion) return null
  const { readings } = motion
  // An angle has no drawing scale to be wrong about.
  if (family === 'wrong-scale' && law === 'odd-rule' && measure === 'angle') return null
  const last = readings.length - 1
  let at = exposuresFor(chance, last, uneven)
  const most = 60
  // Another law over part of its way may well pass for the claimed one.
  if (at.length > most && (family === 'fall-as-topple' || family === 'topple-as-fall' || family === 'ease')) return null
  if (at.length > most) at = turning ? exposuresFor(chance, last, uneven).filter((_, i, all) => i >= all.length - most) : at.slice(0, most)
  const offset = at[0] ?? 0
  const gaps = at.slice(1).map((frame, i) => frame - (at[i] as number))
  const longest = Math.max(...gaps)
  if (family === 'few') at = at.slice(0, chance.whole(3, law === 'steady' ? 3 : 4))
  else if (at.length < 8) return null
  // A swing drawn fewer than eight times per turn back and forth is not drawn at all.
  if (motion.law === 'pendulum' && motion.size !== undefined && Math.sqrt(GRAVITY / motion.size) * longest / paper.fps > 0.75) return null
  if (motion.law === 'topple' && motion.size !== undefined && Math.sqrt(GRAVITY * 1.5 / motion.size) * longest / paper.fps > 0.75) return null

  // Any short stretch of a smooth motion passes for a parabola.
  if (family === 'topple-as-fall' && (at.length < 10 || (motion.covers ?? 0) < 0.75)) return null

  const n = at.length
  const truth: TruthOf = { kind: 'clean', frames: [], size: motion.size, covers: offset > 0 ? 0.9 : motion.covers }
  let delay = (_i: number) => 0
  let from = -1
  if (family === 'held' || family === 'skipped') {
    from = chance.whole(3, n - 3)
    const exposure = family === 'held'
      ? (at[from] as number) - (at[from - 1] as number)
      : -((at[from + 1] ?? NaN) - (at[from] as number))
    const end = n - (family === 'skipped' ? 1 : 0)
    if (family === 'skipped') at = at.slice(0, end)
    if (from > at.length - 3) return null
    delay = i => (i >= from ? exposure : 0)
    if (at.some((frame, i) => frame - delay(i) > last || frame - delay(i) < 0)) return null
    truth.kind = family
  }
  const drawn = draw(chance, at, readings, paper, delay)
  const first = chance.one([0, 1, 101, 1001])
  const frameOf = (i: number) => first + (at[i] as number) - (at[0] as number)
  if (from >= 0) {
    const moved = Math.abs((drawn.exact[from] as number) - (readings[at[from] as number] as number))
    if (moved < 3 * (drawn.allowance[from] as number)) return null
    truth.frames = [frameOf(from)]
  }
  if (family === 'misplaced' || family === 'misplaced-two') {
    if (!misplace(chance, drawn, family === 'misplaced' ? 1 : 2, motion.turns, paper, truth, frameOf)) return null
  }
  if (family === 'backward' && motion.turns) return null
  if (family === 'backward' && !backward(chance, drawn, paper, truth, frameOf)) return null
  if (family === 'even' || family === 'ease' || family === 'fall-as-topple' || family === 'topple-as-fall') {
    truth.kind = 'wrong-law'
    truth.reads = family === 'even' ? 'steady' : family === 'ease' ? null : family === 'fall-as-topple' ? 'odd-rule' : null
    truth.size = undefined
  }
  if (family === 'short' || family === 'few') truth.kind = 'undecided'

  const request: MadeList['request'] = {
    law, fps: paper.fps, measure: paper.measure, unit: paper.unit, slop: paper.slop, tolerance: 0.1,
    keys: drawn.reading.map((reading, i) => ({ frame: frameOf(i), reading })),
  }
  if (paper.measure === 'arc') request.radius = paper.radius
  if (paper.zeroAt !== 0) request.zeroAt = paper.zeroAt
  if (family === 'wrong-scale' || (motion.law === law && motion.size !== undefined && chance.next() < 0.4)) {
    const factor = family === 'wrong-scale' ? chance.one([3, 6, 1 / 3, 1 / 6]) : 1
    if (law === 'odd-rule') {
      const a = Math.abs((readings[2] as number) - 2 * (readings[1] as number) + (readings[0] as number)) * paper.fps ** 2
      request.subject = { unitsPerMetre: a / GRAVITY * factor }
    } else {
      request.subject = law === 'topple' ? { shape: 'rod', height: size * factor } : { shape: 'bob', length: size * factor }
    }
    if (family === 'wrong-scale') truth.kind = 'wrong-scale'
  }
  return { family: `${law}: ${family}`, request, truth }
}

function motionFor(chance: Chance, family: Family, law: MadeList['request']['law'], paper: Paper, size: number): Exact | null {
  const keys = chance.whole(8, 36)
  const every = chance.whole(1, 4)
  const frames = keys * every
  if (family === 'short') {
    // Less than the slop allows, from first drawing to last.
    const travel = paper.slop * chance.between(0.3, 1.2)
    return { readings: Array.from({ length: frames + 1 }, (_, i) => travel * (i / frames) ** 2), law, turns: false }
  }
  if (family === 'even') {
    const gap = chance.spread(5, 40) * (paper.measure === 'angle' ? 0.15 : 1)
    return { readings: Array.from({ length: frames + 1 }, (_, i) => gap / every * i), law: 'steady', turns: false }
  }
  if (family === 'ease') {
    const travel = paper.measure === 'angle' ? chance.between(60, 88) : chance.spread(150, 1500)
    const strength = chance.between(1, 2)
    const ease = (u: number) => {
      // Slow out and slow in, more or less of it: a blend of even spacing and 3u² − 2u³.
      const s = u * u * (3 - 2 * u)
      return strength <= 1 ? s : s + (strength - 1) * (s * s * (3 - 2 * s) - s)
    }
    return { readings: Array.from({ length: frames + 1 }, (_, i) => travel * ease(i / frames)), law: 'steady', turns: false }
  }
  if (family === 'fall-as-topple') {
    const lean = chance.between(2, 12)
    const reach = chance.between(78, 88)
    const scale = paper.measure === 'arc' ? paper.radius / DEGREE : 1
    return {
      readings: Array.from({ length: frames + 1 }, (_, i) => scale * (lean + (reach - lean) * (i / frames) ** 2) - paper.zeroAt), law: 'odd-rule', turns: false,
    }
  }
  if (family === 'topple-as-fall') return toppleMotion(chance, paper, size)
  if (law === 'topple') return toppleMotion(chance, paper, size)
  if (law === 'pendulum') return swingMotion(chance, paper, size)
  if (law === 'steady') {
    const gap = chance.spread(5, 60) * chance.one([1, -1])
    return { readings: Array.from({ length: frames + 1 }, (_, i) => gap / every * i), law: 'steady', turns: false }
  }
  return fallMotion(chance, keys, every)
}

/** Moves drawings by at least three allowances; where the motion never turns they stay between their neighbours. */
function misplace(
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
function backward(chance: Chance, drawn: Drawn, paper: Paper, truth: TruthOf, frameOf: (i: number) => number): boolean {
  const n = drawn.reading.length
  const way = Math.sign((drawn.exact[n - 1] as number) - (drawn.exact[0] as number))
  const i = chance.whole(2, n - 3)
  const back = paper.slop * chance.between(3, 8)
  drawn.reading[i] = Number((Math.round(((drawn.reading[i - 1] as number) - way * back) / paper.step) * paper.step).toFixed(3))
  truth.kind = 'backward'
  truth.frames = [frameOf(i)]
  return true
}

const PLAN: [Family, MadeList['request']['law']][] = [
  ['clean', 'topple'], ['clean', 'topple'], ['clean', 'pendulum'], ['clean', 'pendulum'], ['clean', 'odd-rule'], ['clean', 'odd-rule'], ['clean', 'steady'],
  ['misplaced', 'topple'], ['misplaced', 'pendulum'], ['misplaced', 'odd-rule'], ['misplaced', 'steady'],
  ['misplaced-two', 'topple'], ['misplaced-two', 'pendulum'], ['misplaced-two', 'odd-rule'],
  ['held', 'topple'], ['held', 'pendulum'], ['held', 'odd-rule'], ['held', 'steady'],
  ['skipped', 'topple'], ['skipped', 'pendulum'], ['skipped', 'odd-rule'], ['skipped', 'steady'],
  ['wrong-scale', 'topple'], ['wrong-scale', 'pendulum'], ['wrong-scale', 'odd-rule'],
  ['backward', 'topple'], ['backward', 'odd-rule'],
  ['even', 'odd-rule'], ['even', 'topple'], ['even', 'pendulum'],
  ['ease', 'odd-rule'], ['ease', 'topple'], ['ease', 'pendulum'],
  ['fall-as-topple', 'topple'], ['topple-as-fall', 'odd-rule'],
  ['short', 'topple'], ['short', 'odd-rule'], ['few', 'topple'], ['few', 'odd-rule'], ['few', 'steady'],
]

/** `count` lists, every family in turn, from one seed. */
export function makeLists(count: number, seed: number): MadeList[] {
  const lists: MadeList[] = []
  for (let i = 0; lists.length < count; i++) {
    const [family, law] = PLAN[lists.length % PLAN.length] as [Family, MadeList['request']['law']]
    const made = attempt(new Chance(seed * 1_000_003 + i), family, law)
    if (made) lists.push(made)
  }
  return lists
}
