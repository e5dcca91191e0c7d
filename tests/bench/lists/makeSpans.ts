/**
 * Lists of two and three spans with their truth: pieces of motion by school algebra and by integration, put together so that position
 * and speed carry over (or, at a contact, position alone), drawn on an animator's exposures, then at most one fault. Shares no code with
 * the judge.
 */
import { Chance } from './random'
import { swung } from './motion'

type SpanLaw = 'odd-rule' | 'slow-in' | 'steady' | 'topple' | 'pendulum'

// Written out here on purpose: the judge's own types are not imported.
export interface MadeSpan { from: number, to: number, law: SpanLaw, contact?: boolean }

export interface MadeSpans {
  family: string
  request: {
    law: SpanLaw, fps: number, measure: 'angle' | 'distance', unit: string, slop: number, tolerance: number
    keys: { frame: number, reading: number }[]
  }
  spans: MadeSpan[]
  truth: { kind: 'clean' | 'misplaced' | 'broken-joint' | 'wrong-law', frames: number[] }
}

/** A piece of motion over whole exposures: readings at any time, exposures, from its own beginning; and the speed that it ends with. */
interface Piece { law: SpanLaw, exposures: number, at: (time: number) => number, speed: (time: number) => number, contact: boolean }

interface Paper { fps: number, measure: 'angle' | 'distance', unit: string, slop: number, step: number, every: number }

function paperFor(chance: Chance, measure: 'angle' | 'distance'): Paper {
  const fps = chance.one([24, 24, 24, 12, 25, 30, 60])
  const every = chance.one([1, 2, 2, 3])
  if (measure === 'angle') return { fps, measure, unit: 'deg', slop: 0.3, step: 0.1, every }
  const step = chance.one([0.5, 1])
  return { fps, measure, unit: 'px', slop: step === 0.5 ? 1 : 1.5, step, every }
}

/** Reading r, speed v and acceleration a per exposure. */
function even(law: SpanLaw, r: number, v: number, a: number, exposures: number, contact = false): Piece {
  return { law, exposures, contact, at: t => r + v * t + a * t * t / 2, speed: t => v + a * t }
}

/** A swing or a topple, degrees; beyond its last exposure it is carried on evenly, where nothing asks for it. */
function turning(law: 'topple' | 'pendulum', start: number, turn: number, kPerExposure: number, exposures: number): Piece {
  const FINE = 8
  const degree = 180 / Math.PI
  const angles = swung(law === 'topple' ? 1 : -1, (kPerExposure / FINE) ** 2, start, turn / FINE, 1, exposures * FINE + FINE)
    .map(angle => angle * degree)
  const at = (t: number) => angles[Math.round(t * FINE)] ?? NaN
  // Energy of the pendulum of unit length gives the speed: ½ω² ± k² cos θ is kept.
  const pull = law === 'topple' ? 1 : -1
  const speed = (t: number) => {
    const now = at(t)
    const square = turn * turn + 2 * pull * kPerExposure ** 2 * (Math.cos(start) - Math.cos(now / degree))
    const next = angles[Math.round(t * FINE) + 1] ?? now
    return Math.sign(next - now) * Math.sqrt(Math.max(0, square)) * degree
  }
  return { law, exposures, contact: false, at, speed }
}

type Motion = 'out-steady-in' | 'out-steady' | 'steady-in' | 'fall-contact-steady' | 'fall-contact-rise' | 'fall-contact-rest'
  | 'topple-steady' | 'swing-steady' | 'steady-swing'

export const MOTIONS: readonly Motion[] = [
  'out-steady-in', 'out-steady', 'steady-in', 'fall-contact-steady', 'fall-contact-rise', 'fall-contact-rest',
  'topple-steady', 'swing-steady', 'steady-swing',
]

function piecesFor(chance: Chance, motion: Motion): { pieces: Piece[], measure: 'angle' | 'distance' } | null {
  const keys = () => chance.whole(6, 14)
  const angle = motion.includes('swing') || motion.includes('topple')
  const way = chance.one([1, 1, -1])
  const start = angle ? 0 : chance.one([0, 0, chance.between(-200, 400)])
  const speed = way * chance.spread(8, 60)
  const [n1, n2, n3] = [keys(), keys(), keys()]
  switch (motion) {
    case 'out-steady-in': {
      const first = even('odd-rule', start, 0, speed / n1, n1)
      const second = even('steady', first.at(n1), speed, 0, n2)
      return { measure: 'distance', pieces: [first, second, even('slow-in', second.at(n2), speed, -speed / n3, n3)] }
    }
    case 'out-steady': {
      const first = even('odd-rule', start, 0, speed / n1, n1)
      return { measure: 'distance', pieces: [first, even('steady', first.at(n1), speed, 0, n2)] }
    }
    case 'steady-in': {
      const first = even('steady', start, speed, 0, n1)
      return { measure: 'distance', pieces: [first, even('slow-in', first.at(n1), speed, -speed / n2, n2)] }
    }
    case 'fall-contact-steady': {
      const fall = even('odd-rule', start, 0, speed / n1, n1, true)
      return { measure: 'distance', pieces: [fall, even('steady', fall.at(n1), speed * chance.one([-0.5, 0.3, -0.3, -0.7]), 0, n2)] }
    }
    case 'fall-contact-rise': {
      const fall = even('odd-rule', start, 0, speed / n1, n1, true)
      return { measure: 'distance', pieces: [fall, even('odd-rule', fall.at(n1), -speed * chance.between(0.4, 0.85), speed / n1, n2)] }
    }
    case 'fall-contact-rest': {
      const fall = even('odd-rule', start, 0, speed / n1, n1, true)
      return { measure: 'distance', pieces: [fall, even('steady', fall.at(n1), 0, 0, n2)] }
    }
    case 'topple-steady': {
      const lean = chance.between(3, 12) * Math.PI / 180
      const k = chance.between(3, 4.5) / (n1 + 4)
      const fall = turning('topple', lean, 0, k, n1 + 4)
      const end = fall.at(n1 + 4)
      // Near balance or flat out, where a topple still curves: a joint that shows.
      if (!(end > 35 && end < 80)) return null
      return { measure: 'angle', pieces: [fall, even('steady', end, fall.speed(n1 + 4), 0, n2)] }
    }
    case 'swing-steady': case 'steady-swing': {
      const amplitude = chance.between(25, 70) * Math.PI / 180
      const k = chance.between(0.2, 0.5)
      const n = Math.round(chance.between(0.6, 1.3) * 2 * Math.PI / k)
      const swing = turning('pendulum', way * amplitude, 0, k, n)
      const end = swing.at(n)
      if (Math.abs(end) < 12) return null
      if (motion === 'swing-steady') return { measure: 'angle', pieces: [swing, even('steady', end, swing.speed(n), 0, n2)] }
      // Run backward, a swing is a swing.
      const back: Piece = { ...swing, at: t => swing.at(n - t), speed: t => -swing.speed(n - t) }
      const into = even('steady', end + swing.speed(n) * n2, -swing.speed(n), 0, n2)
      return { measure: 'angle', pieces: [into, back] }
    }
  }
}

type Family = 'clean' | 'misplaced' | 'speed-jump' | 'position-jump' | 'wrong-law'

interface Drawing { frame: number, exact: number, reading: number, allowance: number }

const toStep = (value: number, step: number) => Number((Math.round(value / step) * step).toFixed(3))

function attempt(chance: Chance, family: Family, motion: Motion): MadeSpans | null {
  const made = piecesFor(chance, motion)
  if (!made) return null
  const { pieces, measure } = made
  const paper = paperFor(chance, measure)
  if (measure === 'angle' && !showsJoints(pieces, paper.slop)) return null
  const joints = pieces.slice(0, -1).reduce<number[]>((ends, piece) => [...ends, (ends[ends.length - 1] ?? 0) + piece.exposures], [])
  const total = pieces.reduce((sum, piece) => sum + piece.exposures, 0)
  // A contact falls where it falls: at a drawing, or anywhere before the next one.
  const late = pieces[0]?.contact && family !== 'position-jump' ? chance.one([0, chance.between(0, 1)]) : 0
  const first = chance.one([0, 1, 101, 1001])
  const frameAt = (place: number) => first + place * paper.every

  const bent = family === 'wrong-law' ? chance.whole(0, pieces.length - 1) : -1
  const broken = family === 'speed-jump' || family === 'position-jump' ? chance.whole(0, joints.length - 1) : -1
  if (broken >= 0 && pieces[broken]?.contact && family === 'speed-jump') return null
  const exactAt = (place: number) => {
    const which = joints.filter((joint, i) => place > joint + (pieces[i]?.contact ? late : 0)).length
    const piece = pieces[which] as Piece
    const begins = which > 0 ? joints[which - 1] as number : 0
    const shifted = which > 0 && pieces[which - 1]?.contact ? late : 0
    // A late contact: the fall has gone on until then, and the rest begins from there.
    const drop = shifted > 0 ? (pieces[which - 1] as Piece).at((pieces[which - 1] as Piece).exposures + shifted) - piece.at(0) : 0
    return piece.at(place - begins - shifted) + drop
  }
  const exact = Array.from({ length: total + 1 }, (_, place) => exactAt(place))
  if (bent >= 0 && !bend(chance, exact, joints, total, pieces, bent, paper)) return null
  if (broken >= 0) breakJoint(chance, exact, pieces, joints, broken, family === 'speed-jump', paper)

  const drawn = draw(chance, exact, paper, frameAt)
  const frames: number[] = []
  if (family === 'misplaced') {
    const oneWay = exact.map((_, place) => {
      const which = joints.filter(joint => place > joint).length
      const piece = pieces[which] as Piece
      const rises = motion === 'fall-contact-rise' && which > 0
      return piece.law !== 'pendulum' && !rises && Math.abs(piece.at(piece.exposures) - piece.at(0)) > 2 * paper.slop
    })
    const place = misplace(chance, drawn, joints, oneWay, paper)
    if (place === null) return null
    frames.push(frameAt(place))
  }
  if (broken >= 0) frames.push(frameAt(joints[broken] as number))
  if (bent >= 0) frames.push(frameAt(bent > 0 ? joints[bent - 1] as number : 0), frameAt(joints[bent] ?? total))
  const ends = [0, ...joints, total]
  const spans = pieces.map((piece, i): MadeSpan => ({
    from: frameAt(ends[i] as number), to: frameAt(ends[i + 1] as number), law: piece.law, ...(piece.contact ? { contact: true } : {}),
  }))
  return {
    family: `${motion}: ${family}`,
    request: {
      law: (pieces[0] as Piece).law, fps: paper.fps, measure, unit: paper.unit, slop: paper.slop, tolerance: 0.1,
      keys: drawn.map(({ frame, reading }) => ({ frame, reading })),
    },
    spans,
    truth: { kind: family === 'clean' ? 'clean' : family === 'misplaced' ? 'misplaced' : broken >= 0 ? 'broken-joint' : 'wrong-law', frames },
  }
}

/** A joint where nothing changes is no joint: the acceleration must change by a good part of the slop per exposure. */
function showsJoints(pieces: readonly Piece[], slop: number): boolean {
  return pieces.slice(1).every((after, i) => {
    const before = pieces[i] as Piece
    const bendBefore = before.at(before.exposures) - 2 * before.at(before.exposures - 1) + before.at(before.exposures - 2)
    const bendAfter = after.at(2) - 2 * after.at(1) + after.at(0)
    return Math.abs(bendBefore - bendAfter) > 1.5 * slop
  })
}

/** Makes the speed or the position jump at one joint: from there on, or up to there where what follows swings or stops and would be another motion. */
function breakJoint(chance: Chance, exact: number[], pieces: Piece[], joints: number[], which: number, ofSpeed: boolean, paper: Paper): void {
  const at = joints[which] as number
  const before = pieces[which] as Piece
  const after = pieces[which + 1] as Piece
  const speeds = [before.speed(before.exposures), after.speed(0)] as const
  const jump = chance.one([1, -1]) * chance.between(4, 9) * (paper.slop + 0.05 * (Math.abs(speeds[0]) + Math.abs(speeds[1])))
  // Around a contact, lines that cross within an exposure do meet; a position that jumps there jumps further than that.
  const size = before.contact ? jump + Math.sign(jump) * 1.2 * Math.abs(speeds[1] - speeds[0]) : jump
  const fromStart = pieces.slice(which + 1).some(({ law }) => law !== 'steady' && law !== 'odd-rule')
  exact.forEach((reading, place) => {
    if (fromStart ? place < at : place > at) exact[place] = reading + size * (ofSpeed ? place - at : 1)
  })
}

/** Puts another motion between the ends of one span: even where the law curves, eased where it is even. */
function bend(chance: Chance, exact: number[], joints: number[], total: number, pieces: Piece[], which: number, paper: Paper): boolean {
  const from = which > 0 ? joints[which - 1] as number : 0
  const to = joints[which] ?? total
  const start = exact[from] as number
  const travel = (exact[to] as number) - start
  if (Math.abs(travel) < 40 * paper.slop || to - from < 8) return false
  const isEven = pieces[which]?.law === 'steady'
  const power = chance.between(1.8, 2.4)
  let most = 0
  for (let place = from; place <= to; place++) {
    const u = (place - from) / (to - from)
    const put = start + travel * (isEven ? u ** power : u)
    most = Math.max(most, Math.abs(put - (exact[place] as number)))
    exact[place] = put
  }
  return most > 8 * paper.slop
}

/** Pencil and rounding; the pencil stays inside the slop. */
function draw(chance: Chance, exact: readonly number[], paper: Paper, frameAt: (place: number) => number): Drawing[] {
  const evenly = chance.next() < 0.5
  const part = chance.between(0.2, 0.65)
  const room = paper.slop - paper.step / 2
  return exact.map((value, place) => {
    const pencil = evenly
      ? chance.between(-part, part) * paper.slop
      : Math.max(-room, Math.min(room, chance.bell() * paper.slop * part * 0.5))
    const gaps = [exact[place - 1], exact[place + 1]].flatMap(next => (next === undefined ? [] : [Math.abs(next - value)]))
    const gap = gaps.reduce((sum, each) => sum + each, 0) / gaps.length
    return { frame: frameAt(place), exact: value, reading: toStep(value + pencil, paper.step), allowance: paper.slop + 0.1 * gap }
  })
}

/** Moves one drawing by at least three allowances, not next to an end of a span or of the list; its place, or null. */
function misplace(chance: Chance, drawn: Drawing[], joints: readonly number[], oneWay: readonly boolean[], paper: Paper): number | null {
  for (let tries = 0; tries < 40; tries++) {
    const place = chance.whole(2, drawn.length - 3)
    const here = drawn[place] as Drawing
    if (joints.some(joint => Math.abs(place - joint) < 2)) continue
    const moved = toStep(here.reading + chance.one([1, -1]) * here.allowance * chance.between(3, 7), paper.step)
    if (Math.abs(moved - here.exact) < 3 * here.allowance) continue
    // Beyond its neighbours a drawing runs backward; that is another family's matter. What turns or rests has no backward.
    const [left, right] = [drawn[place - 1]?.reading ?? NaN, drawn[place + 1]?.reading ?? NaN]
    if (oneWay[place] && !(moved > Math.min(left, right) && moved < Math.max(left, right))) continue
    here.reading = moved
    return place
  }
  return null
}

const FAMILIES: readonly Family[] = ['clean', 'clean', 'misplaced', 'speed-jump', 'position-jump', 'wrong-law']

const PLAN = MOTIONS.flatMap(motion => FAMILIES.map(family => ({ motion, family })))
  // Contact lets speed jump; and what rests has no motion to be wrong about, nor to be out of place in.
  .filter(({ motion, family }) => !(motion.includes('contact') && family === 'speed-jump') && !(motion.endsWith('rest') && family === 'wrong-law'))

/** `count` lists of two and three spans, every family in turn, from one seed. */
export function makeSpans(count: number, seed: number): MadeSpans[] {
  const lists: MadeSpans[] = []
  for (let i = 0; lists.length < count; i++) {
    const { motion, family } = PLAN[lists.length % PLAN.length] as (typeof PLAN)[number]
    const made = attempt(new Chance(seed * 1_000_003 + i), family, motion)
    if (made) lists.push(made)
  }
  return lists
}

/** How many lists make one round of all families. */
export const SPAN_ROUND = PLAN.length
