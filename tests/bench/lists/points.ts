/**
 * Lists of points with their truth: a motion by integration or school algebra, laid on a line, an arc or a parabola somewhere on the
 * drawing, pencil and rounding in x and y, then at most one fault. Shares no code with the judge.
 */
import { motionFor } from './pointMotions'
import type { Motion, Place, PointFamily, PointLaw } from './pointMotions'
import { Chance } from './random'

export interface MadePoints {
  family: string
  // Written out here on purpose: the judge's own types are not imported.
  request: {
    law: PointLaw, fps: number, measure: 'point', unit: string, slop: number, tolerance: number
    keys: { frame: number, x: number, y: number }[]
    yAxis?: 'down' | 'up', path?: 'line' | 'circle' | 'parabola', pivot?: { x: number, y: number }
    subject?: { shape: 'rod', height: number } | { shape: 'bob', length: number } | { unitsPerMetre: number }
  }
  truth: {
    kind: 'clean' | 'misplaced' | 'off-path' | 'held' | 'skipped' | 'wrong-law' | 'wrong-scale' | 'undecided'
    /** Empty for the whole list. */
    frames: number[]
    /** Metres for a body, units per metre for a path. */
    size?: number
    reads?: string | null
    covers?: number
  }
}

const apart = (p: Place, q: Place) => Math.hypot(p.x - q.x, p.y - q.y)

/** What the trade lets pass at each drawing of the exact motion: slop and a tenth of the gaps around it. */
function allowancesOf(places: Place[], slop: number): number[] {
  return places.map((place, i) => {
    const left = i > 0 ? apart(place, places[i - 1] as Place) : -1
    const right = i < places.length - 1 ? apart(place, places[i + 1] as Place) : -1
    return slop + 0.1 * (left < 0 ? right : right < 0 ? left : (left + right) / 2)
  })
}

/** The way the motion goes at a frame, a unit long; null where it stands. */
function headingOf(motion: Motion, frame: number): Place | null {
  const [p, q] = [motion.at(Math.max(0, frame - 0.5)), motion.at(Math.min(motion.last, frame + 0.5))]
  const length = apart(p, q)
  return length > 1e-6 ? { x: (q.x - p.x) / length, y: (q.y - p.y) / length } : null
}

/** Moves along the path by `by` drawing units, by finding the frame that is so far away. Null beyond half a neighbouring gap. */
function slid(motion: Motion, frame: number, by: number, room: number): Place | null {
  const from = motion.at(frame)
  const way = Math.sign(by)
  for (let step = 0.02; step < room; step += 0.02) {
    const at = frame + way * step
    if (at < 0 || at > motion.last) return null
    const place = motion.at(at)
    if (apart(place, from) >= Math.abs(by)) return place
  }
  return null
}

function attempt(chance: Chance, family: PointFamily, law: PointLaw): MadePoints | null {
  const fps = chance.one([24, 24, 24, 12, 25, 30, 60])
  const step = chance.one([0.5, 1])
  const slop = step === 0.5 ? 1 : 1.5
  const uneven = chance.next() < 0.2
  const every = chance.whole(1, 3)
  const motion = motionFor(chance, family, law, fps, chance.whole(9, 36) * every)
  if (!motion) return null
  let at = [0]
  for (let next = uneven ? chance.whole(1, 3) : every; next <= motion.last; next += uneven ? chance.whole(1, 3) : every) at.push(next)
  // A dying swing shows its pivot best while it is wide.
  if (at.length > 50) at = law === 'swing-decay' ? at.slice(0, 50) : at.slice(-50)
  if (at.length < 9) return null
  const longest = Math.max(...at.slice(1).map((frame, i) => frame - (at[i] as number)))
  if (motion.fastest * longest > 0.75) return null
  const truth: MadePoints['truth'] = { kind: 'clean', frames: [], covers: motion.covers }
  const first = chance.one([0, 1, 101, 1001])
  const frameOf = (i: number) => first + (at[i] as number) - (at[0] as number)

  let delay = (_i: number) => 0
  let from = -1
  if (family === 'held' || family === 'skipped') {
    from = chance.whole(3, at.length - 4)
    const exposure = family === 'held' ? (at[from] as number) - (at[from - 1] as number) : (at[from] as number) - (at[from + 1] as number)
    if (family === 'skipped') at = at.slice(0, -1)
    delay = i => (i >= from ? exposure : 0)
    truth.kind = family
    truth.frames = [frameOf(from)]
  }
  if (at.some((frame, i) => frame - delay(i) > motion.last)) return null
  const plain = at.map(frame => motion.at(frame))
  const exact = at.map((frame, i) => motion.at(frame - delay(i)))
  const allowed = allowancesOf(plain, slop)
  if (from >= 0 && apart(exact[from] as Place, plain[from] as Place) < 3 * (allowed[from] as number)) return null

  const bad = family === 'misplaced' || family === 'off-path' ? chance.whole(1, 2) : 0
  const chosen: number[] = []
  for (let tries = 0; tries < 40 && chosen.length < bad; tries++) {
    const i = chance.whole(2, at.length - 3)
    if (chosen.some(other => Math.abs(other - i) < 2)) continue
    const heading = headingOf(motion, at[i] as number)
    const by = chance.one([1, -1]) * (allowed[i] as number) * chance.between(3.2, 7)
    if (!heading) continue
    const place = family === 'off-path'
      ? { x: (exact[i] as Place).x - by * heading.y, y: (exact[i] as Place).y + by * heading.x }
      : slid(motion, at[i] as number, by, 0.8 * Math.min((at[i] as number) - (at[i - 1] as number), (at[i + 1] as number) - (at[i] as number)))
    if (!place) continue
    exact[i] = place
    chosen.push(i)
  }
  if (chosen.length < bad) return null
  if (bad > 0) {
    truth.kind = family as 'misplaced' | 'off-path'
    truth.frames = chosen.sort((a, b) => a - b).map(frameOf)
  }
  if (family === 'short') truth.kind = 'undecided'
  if (family === 'no-path') truth.kind = 'off-path'
  if (['even', 'ease', 'straight', 'slowing', 'falling-line'].includes(family)) {
    truth.kind = family === 'straight' && law !== 'flight' ? 'off-path' : 'wrong-law'
    truth.reads = law === 'flight' ? (family === 'straight' ? 'steady' : family === 'falling-line' ? 'odd-rule' : null) : family === 'even' ? 'steady' : null
  }

  const yAxis = chance.one(['down', 'up'] as const)
  const up = yAxis === 'up' ? 1 : -1
  const corner = { x: chance.between(-200, 2000), y: chance.between(-200, 2000) }
  const part = chance.between(0.2, 0.6)
  const room = slop - step * 0.71
  const posted = exact.map(({ x, y }) => {
    const reach = Math.min(room, Math.abs(chance.bell()) * slop * part)
    const turn = chance.between(0, 2 * Math.PI)
    const rounded = (value: number) => Number((Math.round(value / step) * step).toFixed(3))
    return { x: rounded(corner.x + x + reach * Math.cos(turn)), y: rounded(corner.y + up * (y + reach * Math.sin(turn))) }
  })
  const request: MadePoints['request'] = {
    law, fps, measure: 'point', unit: 'px', slop, tolerance: 0.1, yAxis,
    keys: posted.map((place, i) => ({ frame: frameOf(i), ...place })),
  }
  const deep = depthOf(exact) > 15 * slop
  if (!claimPath(chance, family, law, motion, request, corner, up, deep)) return null
  if (!claimSize(chance, family, law, motion, request, truth)) return null
  return { family: `${law}: ${family}`, request, truth }
}

/** How far the drawings stand off the line from the first of them to the one furthest from it. */
function depthOf(places: Place[]): number {
  const [first = { x: 0, y: 0 }] = places
  const furthest = places.reduce((most, place) => (apart(place, first) > apart(most, first) ? place : most), first)
  const length = apart(furthest, first)
  return Math.max(...places.map(({ x, y }) => Math.abs((x - first.x) * (furthest.y - first.y) - (y - first.y) * (furthest.x - first.x)) / length))
}

/** What the claim says of the path: as little as the law lets it, or its kind, or its pivot. */
function claimPath(chance: Chance, family: PointFamily, law: PointLaw, motion: Motion, request: MadePoints['request'], corner: Place, up: number, deep: boolean): boolean {
  const named = chance.next() < 0.5
  if (family === 'no-path') {
    // An arc that is claimed to be a line.
    if (motion.path !== 'circle') return false
    request.path = 'line'
    return true
  }
  if (law === 'flight' || law === 'bounce' || family === 'short') return true
  if (law === 'odd-rule' || law === 'steady' || law === 'slow-in') {
    if (motion.path !== 'line' || named) request.path = motion.path
    return true
  }
  // Nobody finds the pivot of an arc that is hardly one.
  if ((named || !deep) && motion.pivot) request.pivot = { x: corner.x + motion.pivot.x, y: corner.y + up * motion.pivot.y }
  return true
}

function claimSize(
  chance: Chance, family: PointFamily, law: PointLaw, motion: Motion & { scale?: number }, request: MadePoints['request'], truth: MadePoints['truth'],
): boolean {
  const factor = family === 'wrong-scale' ? chance.one([3, 6, 1 / 3, 1 / 6]) : 1
  if (family === 'wrong-scale') truth.kind = 'wrong-scale'
  else if (chance.next() < 0.6 || !['clean', 'misplaced', 'off-path', 'held', 'skipped'].includes(family)) {
    truth.size = motion.size
    return true
  }
  if (motion.size !== undefined && (law === 'topple' || law === 'pendulum')) {
    truth.size = motion.size
    request.subject = law === 'topple' ? { shape: 'rod', height: motion.size * factor } : { shape: 'bob', length: motion.size * factor }
    return true
  }
  if (motion.scale === undefined) return family !== 'wrong-scale'
  if (law === 'odd-rule') {
    // Named with its slope: an arc has none of its own.
    request.subject = { unitsPerMetre: motion.scale * factor, slope: 90 } as MadePoints['request']['subject']
    return true
  }
  request.subject = { unitsPerMetre: motion.scale * factor }
  return true
}

export const POINT_PLAN: [PointFamily, PointLaw][] = [
  ['clean', 'odd-rule'], ['clean', 'steady'], ['clean', 'topple'], ['clean', 'pendulum'], ['clean', 'spin'], ['clean', 'flight'], ['clean', 'flight'],
  ['misplaced', 'odd-rule'], ['misplaced', 'steady'], ['misplaced', 'topple'], ['misplaced', 'pendulum'], ['misplaced', 'flight'],
  ['off-path', 'odd-rule'], ['off-path', 'steady'], ['off-path', 'topple'], ['off-path', 'pendulum'], ['off-path', 'spin'], ['off-path', 'flight'],
  ['clean', 'slow-in'], ['clean', 'swing-decay'], ['clean', 'bounce'], ['misplaced', 'slow-in'], ['misplaced', 'bounce'],
  ['off-path', 'slow-in'], ['off-path', 'swing-decay'], ['held', 'swing-decay'], ['held', 'bounce'],
  ['held', 'odd-rule'], ['held', 'topple'], ['held', 'pendulum'], ['held', 'flight'],
  ['skipped', 'odd-rule'], ['skipped', 'topple'], ['skipped', 'pendulum'], ['skipped', 'flight'],
  ['wrong-scale', 'odd-rule'], ['wrong-scale', 'topple'], ['wrong-scale', 'pendulum'], ['wrong-scale', 'flight'],
  ['no-path', 'odd-rule'], ['no-path', 'steady'], ['straight', 'topple'], ['straight', 'pendulum'],
  ['even', 'odd-rule'], ['even', 'topple'], ['even', 'pendulum'], ['ease', 'odd-rule'],
  ['straight', 'flight'], ['falling-line', 'flight'], ['slowing', 'flight'], ['ease', 'flight'],
  ['short', 'odd-rule'], ['short', 'flight'],
]

/** `count` lists, every family in turn, from one seed. */
export function makePointLists(count: number, seed: number, plan: readonly [PointFamily, PointLaw][] = POINT_PLAN): MadePoints[] {
  const lists: MadePoints[] = []
  for (let i = 0; lists.length < count; i++) {
    const [family, law] = plan[lists.length % plan.length] as [PointFamily, PointLaw]
    const made = attempt(new Chance(seed * 1_000_003 + i), family, law)
    if (made) lists.push(made)
  }
  return lists
}
