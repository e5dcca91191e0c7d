/** Lists of the laws beyond the first four, with their truth. Shares no code with the judge. */
import { backward, misplace } from './faults'
import type { MadeList, MoreLaw, TruthOf } from './made'
import { GRAVITY, swung } from './motion'
import { bounced, dragged } from './moreMotion'
import { draw, exposuresFor, paperFor } from './paper'
import type { Paper } from './paper'
import { Chance } from './random'

type Family =
  | 'clean' | 'misplaced' | 'held' | 'skipped' | 'wrong-scale' | 'backward' | 'even' | 'few'
  | 'as-odd-rule' | 'as-pendulum' | 'odd-rule-as' | 'swing-as'

/** What else the judge should read off a list. */
export interface MoreTruth extends TruthOf {
  figure?: { kind: 'stop' | 'turns' | 'share-lost' | 'restitution', value: number }
}
export interface MoreList extends MadeList { truth: MoreTruth }

interface Motion {
  readings: number[]
  size?: number
  figure?: MoreTruth['figure']
  turns: boolean
  /** Reading units after which readings begin again; 0 where they don't. */
  within: number
  /** Frames between which the list has something to show. */
  least: number
  /** Frames after which no other motion of the law comes near, whatever a fault leaves of it; not told where that is soon. */
  known?: number
  /** Share of the amplitude that is lost by the end. */
  lost?: number
}

const DEGREE = 180 / Math.PI

function slowing(chance: Chance, frames: number): Motion {
  const stop = frames * chance.between(0.6, 1)
  const travel = chance.spread(80, 2000) * chance.one([1, -1])
  const zero = chance.one([0, 0, chance.between(-200, 200)])
  return {
    readings: Array.from({ length: frames + 1 }, (_, i) => zero + travel * (1 - Math.max(0, 1 - i / stop) ** 2)),
    figure: { kind: 'stop', value: stop }, turns: false, within: 0, least: stop,
  }
}

function spinning(chance: Chance, paper: Paper, frames: number, every: number): Motion {
  const circle = paper.measure === 'arc' ? 2 * Math.PI * paper.radius : 360
  // Less than three eighths of a turn from drawing to drawing, or nobody can say which way it goes.
  const perFrame = circle * chance.spread(0.01, 0.35) / every * chance.one([1, -1])
  const begun = circle * chance.next()
  return {
    readings: Array.from({ length: frames + 1 }, (_, i) => begun + perFrame * i),
    figure: { kind: 'turns', value: Math.abs(perFrame) * paper.fps / circle }, turns: false, within: chance.next() < 0.6 ? circle : 0, least: 0,
  }
}

function dying(chance: Chance, paper: Paper, every: number): Motion | null {
  const size = chance.spread(0.15, 40)
  const k = Math.sqrt(GRAVITY / size)
  if (k * every / paper.fps > 0.7) return null
  const amplitude = chance.between(12, 50) / DEGREE
  const share = chance.between(0.03, 0.15)
  const air = chance.next() < 0.5
  const start = amplitude * chance.one([1, -1, chance.between(-0.9, 0.9)])
  const turn = chance.one([1, -1]) * 2 * k * Math.sqrt(Math.max(0, Math.sin(amplitude / 2) ** 2 - Math.sin(start / 2) ** 2))
  const swings = chance.between(1.5, 5)
  const frames = Math.round(swings * 2 * Math.PI / k * paper.fps)
  const unit = paper.measure === 'arc' ? paper.radius : DEGREE
  return {
    readings: dragged(k * k, -Math.log(1 - share), air, start, turn, paper.fps, frames).map(angle => angle * unit - (paper.measure === 'angle' ? paper.zeroAt : 0)),
    // In air a wide swing loses more of itself than a small one: no one share.
    size, figure: air ? undefined : { kind: 'share-lost', value: 100 * share }, turns: true, within: 0, least: 0, lost: 1 - (1 - share) ** swings,
  }
}

function bouncing(chance: Chance, paper: Paper, every: number): Motion | null {
  const restitution = chance.between(0.35, 0.92)
  const drop = chance.spread(0.1, 8)
  const scale = chance.spread(150, 1200) / drop
  const fall = Math.sqrt(2 * drop / GRAVITY)
  // How far into the first flight the list begins: at the apex, falling, or still rising.
  const way = chance.one(['apex', 'falling', 'rising'] as const)
  const into = way === 'apex' ? 0 : way === 'falling' ? fall * chance.between(0.1, 0.6) : -fall * chance.between(0.1, 0.9)
  const first = (fall - into) * paper.fps
  const hop = 2 * restitution * fall * paper.fps
  // A flight drawn fewer than four times is not drawn.
  if (first < 4 * every || hop < 4 * every) return null
  const hops = chance.between(0.7, 4)
  let frames = first
  for (let i = 0, length = hop; i < hops; i++, length *= restitution) frames += length * Math.min(1, hops - i)
  const height = drop - GRAVITY * into * into / 2
  const { heights } = bounced(height, -GRAVITY * into, restitution, paper.fps, Math.round(frames))
  const zero = chance.one([0, 0, chance.between(-200, 200)])
  const up = chance.one([1, -1])
  return {
    readings: heights.map(metres => zero + up * scale * metres), size: scale, figure: { kind: 'restitution', value: restitution },
    turns: true, within: 0, least: first + 4 * every, known: first + hop * (1 + restitution / 2),
  }
}

function motionFor(chance: Chance, family: Family, law: MoreLaw, paper: Paper, frames: number, every: number): Motion | null {
  const still = { turns: false, within: 0, least: 0 }
  if (family === 'even') {
    const gap = chance.spread(5, 40)
    return { ...still, readings: Array.from({ length: frames + 1 }, (_, i) => gap / every * i) }
  }
  if (family === 'odd-rule-as') {
    const travel = chance.spread(100, 2000)
    return { ...still, readings: Array.from({ length: frames + 1 }, (_, i) => travel * (i / frames) ** 2) }
  }
  if (family === 'swing-as') {
    const k = 2 * Math.PI * chance.between(1.2, 2.5) / frames * paper.fps
    const unit = paper.measure === 'arc' ? paper.radius : DEGREE
    return { ...still, readings: swung(-1, k * k, chance.between(20, 60) / DEGREE, 0, paper.fps, frames).map(angle => angle * unit), turns: true }
  }
  switch (law) {
    case 'slow-in': return slowing(chance, frames)
    case 'spin': return spinning(chance, paper, frames, every)
    case 'swing-decay': return dying(chance, paper, every)
    case 'bounce': return bouncing(chance, paper, every)
  }
}

/** The law that a family's lists are posted under, and what they should read as. */
function posted(family: Family, law: MoreLaw): { claimed: MadeList['request']['law'], reads?: string } {
  switch (family) {
    case 'as-odd-rule': return { claimed: 'odd-rule', reads: law }
    case 'as-pendulum': return { claimed: 'pendulum', reads: law }
    case 'odd-rule-as': return { claimed: law, reads: 'odd-rule' }
    case 'swing-as': return { claimed: law, reads: 'pendulum' }
    case 'even': return { claimed: law, reads: 'steady' }
    default: return { claimed: law }
  }
}

/** One list of a family, or null where this throw of the dice gave no usable one. */
function attempt(chance: Chance, family: Family, law: MoreLaw): MoreList | null {
  const turning = law === 'spin' || law === 'swing-decay'
  const paper = paperFor(chance, turning ? (chance.next() < 0.75 ? 'angle' : 'arc') : 'distance')
  if (law === 'spin') paper.zeroAt = 0
  const uneven = chance.next() < 0.2
  const every = uneven ? 4 : chance.whole(1, 4)
  const motion = motionFor(chance, family, law, paper, chance.whole(10, 36) * every, every)
  if (!motion) return null
  const { readings } = motion
  const last = readings.length - 1
  let at = uneven ? exposuresFor(chance, last, true) : Array.from({ length: Math.floor(last / every) + 1 }, (_, i) => i * every)
  if (at.length > 60) at = at.slice(0, 60)
  if (family === 'few') at = at.slice(0, law === 'spin' ? 3 : 4)
  else if (at.length < 10 || (at.at(-1) as number) < motion.least) return null
  const { claimed, reads } = posted(family, law)
  const truth: MoreTruth = { kind: 'clean', frames: [], size: motion.size, figure: motion.figure }
  if (reads) Object.assign(truth, { kind: 'wrong-law', reads, size: undefined, figure: undefined })
  if (family === 'few') truth.kind = 'undecided'
  // One swing that lost a little passes for one that lost nothing.
  if (family === 'as-pendulum' && (motion.lost ?? 0) * Math.min(1, (at.at(-1) as number) / last) < 0.25) return null
  // A stop with no rest after it is an odd rule as well.
  if (family === 'as-odd-rule' && law === 'slow-in' && motion.least > 0.75 * (at.at(-1) as number)) return null

  const n = at.length
  let delay = (_i: number) => 0
  let from = -1
  if (family === 'held' || family === 'skipped') {
    if ((at.at(-1) as number) < (motion.known ?? 0)) return null
    from = chance.whole(3, n - 4)
    const exposure = family === 'held' ? (at[from] as number) - (at[from - 1] as number) : (at[from] as number) - (at[from + 1] as number)
    if (family === 'skipped') at = at.slice(0, -1)
    delay = i => (i >= from ? exposure : 0)
    if (at.some((frame, i) => frame - delay(i) > last)) return null
    truth.kind = family
  }
  const drawn = draw(chance, at, readings, paper, delay)
  const first = chance.one([0, 1, 101, 1001])
  const frameOf = (i: number) => first + (at[i] as number)
  if (from >= 0) {
    // Half of the drawings that are late have to show it, and the first of them must.
    const off = (i: number) => Math.abs((drawn.exact[i] as number) - (readings[at[i] as number] as number)) / (drawn.allowance[i] as number)
    if (off(from) < 3 || at.filter((_, i) => i >= from && off(i) > 3).length < 3) return null
    truth.frames = [frameOf(from)]
  }
  if (family === 'misplaced' && !misplace(chance, drawn, 1, motion.turns, paper, truth, frameOf)) return null
  if (family === 'backward' && !backward(chance, drawn, paper, truth, frameOf)) return null
  if (truth.figure?.kind === 'stop') truth.figure = { kind: 'stop', value: truth.figure.value + first }

  const within = motion.within
  const shown = (reading: number) => (within > 0 ? Number((reading - within * Math.floor(reading / within)).toFixed(3)) : reading)
  const request: MadeList['request'] = {
    law: claimed, fps: paper.fps, measure: paper.measure, unit: paper.unit, slop: paper.slop, tolerance: 0.1,
    keys: drawn.reading.map((reading, i) => ({ frame: frameOf(i), reading: shown(reading) })),
  }
  if (paper.measure === 'arc') request.radius = paper.radius
  if (paper.zeroAt !== 0) request.zeroAt = paper.zeroAt
  if (family === 'wrong-scale' && motion.size !== undefined) {
    const factor = chance.one([3, 6, 1 / 3, 1 / 6])
    truth.kind = 'wrong-scale'
    request.subject = law === 'bounce' ? { unitsPerMetre: motion.size * factor } : { shape: 'bob', length: motion.size * factor }
  }
  return { family: `${law}: ${family}`, request, truth }
}

const PLAN: [Family, MoreLaw][] = [
  ['clean', 'slow-in'], ['clean', 'spin'], ['clean', 'swing-decay'], ['clean', 'bounce'],
  ['misplaced', 'slow-in'], ['misplaced', 'spin'], ['misplaced', 'swing-decay'], ['misplaced', 'bounce'],
  ['held', 'slow-in'], ['held', 'spin'], ['held', 'swing-decay'], ['held', 'bounce'],
  ['skipped', 'slow-in'], ['skipped', 'spin'], ['skipped', 'swing-decay'], ['skipped', 'bounce'],
  ['wrong-scale', 'swing-decay'], ['wrong-scale', 'bounce'],
  ['backward', 'slow-in'], ['backward', 'spin'],
  ['as-odd-rule', 'slow-in'], ['as-odd-rule', 'bounce'], ['as-pendulum', 'swing-decay'],
  ['odd-rule-as', 'slow-in'], ['odd-rule-as', 'bounce'], ['even', 'slow-in'], ['even', 'bounce'], ['swing-as', 'spin'],
  ['few', 'slow-in'], ['few', 'spin'], ['few', 'swing-decay'], ['few', 'bounce'],
]

/** `count` lists, every family in turn, from one seed. */
export function makeMoreLists(count: number, seed: number): MoreList[] {
  const lists: MoreList[] = []
  for (let i = 0; lists.length < count; i++) {
    const [family, law] = PLAN[lists.length % PLAN.length] as [Family, MoreLaw]
    const made = attempt(new Chance(seed * 1_000_003 + i), family, law)
    if (made) lists.push(made)
  }
  return lists
}
