/** A motion, an animator's exposures, pencil and rounding, then at most one fault. */
import { backward, misplace } from './faults'
import type { Family, Kind, Law, MadeList, TruthOf } from './made'
import { GRAVITY } from './motion'
import { motionFor } from './exact'
import { draw, exposuresFor, paperFor } from './paper'
import type { Chance } from './random'

/** One list of a family, or null where this throw of the dice gave no usable one. */
export function attempt(chance: Chance, named: Family, law: Law): MadeList | null {
  const brief = named.endsWith('-brief')
  const family = (brief ? named.slice(0, -'-brief'.length) : named) as Kind
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
  else if (at.length < 8 || (brief && at.length > 11)) return null
  if (family === 'misplaced-many' && (at.length < 12 || at.length > 15)) return null
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
  const drawn = draw(chance, at, readings, paper, delay, family === 'rough')
  const first = chance.one([0, 1, 101, 1001])
  const frameOf = (i: number) => first + (at[i] as number) - (at[0] as number)
  if (from >= 0) {
    const moved = Math.abs((drawn.exact[from] as number) - (readings[at[from] as number] as number))
    if (moved < 3 * (drawn.allowance[from] as number)) return null
    truth.frames = [frameOf(from)]
  }
  if (family === 'misplaced' || family === 'misplaced-two' || family === 'misplaced-many') {
    const count = family === 'misplaced' ? 1 : family === 'misplaced-two' ? 2 : chance.whole(3, 4)
    if (!misplace(chance, drawn, count, motion.turns, paper, truth, frameOf)) return null
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
  return { family: `${law}: ${named}`, request, truth }
}
