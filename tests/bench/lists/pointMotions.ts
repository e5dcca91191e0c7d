/**
 * The motions that lists of points are drawn from, laid on a line, an arc or a parabola somewhere on the drawing: by integration or
 * school algebra, before any pencil. Shares no code with the judge.
 */
import { GRAVITY, swung } from './motion'
import { bounced, dragged } from './moreMotion'
import type { Chance } from './random'

export type PointLaw = 'odd-rule' | 'slow-in' | 'steady' | 'topple' | 'pendulum' | 'swing-decay' | 'spin' | 'flight' | 'bounce'

export type PointFamily =
  | 'clean' | 'misplaced' | 'off-path' | 'held' | 'skipped' | 'wrong-scale' | 'no-path' | 'short'
  | 'even' | 'ease' | 'straight' | 'slowing' | 'falling-line'

export interface Place { x: number, y: number }

/** A motion on paper, y up. `at` takes frames, whole or not, `last` at most. */
export interface Motion {
  at(frame: number): Place
  last: number
  turns: boolean
  /** Fastest turn per frame, radians: what is drawn too seldom isn't drawn at all. */
  fastest: number
  size?: number
  covers?: number
  pivot?: Place
  path: 'line' | 'circle' | 'parabola'
}

/** Angles at whole frames with straight pieces between them: only whole frames and small shifts along the path are asked for. */
function between(readings: number[], frame: number): number {
  const i = Math.max(0, Math.min(readings.length - 2, Math.floor(frame)))
  return (readings[i] as number) + (frame - i) * ((readings[i + 1] as number) - (readings[i] as number))
}

function turning(chance: Chance, angles: number[], hanging: boolean): Omit<Motion, 'turns' | 'fastest'> {
  const radius = chance.spread(70, 900)
  const pivot = { x: chance.between(-500, 500), y: chance.between(-500, 500) }
  const side = chance.one([1, -1])
  const up = hanging ? -1 : 1
  return {
    last: angles.length - 1, path: 'circle', pivot,
    at: frame => ({ x: pivot.x + side * radius * Math.sin(between(angles, frame)), y: pivot.y + up * radius * Math.cos(between(angles, frame)) }),
  }
}

function toppleMotion(chance: Chance, fps: number, size: number): Motion {
  const kSquared = GRAVITY / (2 * size / 3)
  const k = Math.sqrt(kSquared)
  const rest = chance.next() < 0.6
  const lean = chance.between(1, 12) * Math.PI / 180
  const end = chance.between(50, 92) * Math.PI / 180
  const angles = swung(1, kSquared, lean, rest ? 0 : k * chance.between(0.02, 0.5), fps, Math.ceil(8 / k * fps), end)
  return { ...turning(chance, angles, false), turns: false, size, covers: (end - lean) / (Math.PI / 2 - lean), fastest: 1.4 * k / fps }
}

function swingMotion(chance: Chance, fps: number, size: number): Motion {
  const k = Math.sqrt(GRAVITY / size)
  const amplitude = chance.between(15, 75) * Math.PI / 180
  const start = chance.one([amplitude, 0, amplitude * chance.between(-0.8, 0.8)])
  const turn = chance.one([1, -1]) * 2 * k * Math.sqrt(Math.max(0, Math.sin(amplitude / 2) ** 2 - Math.sin(start / 2) ** 2))
  const swings = chance.between(0.6, 2)
  const frames = Math.round(swings * 2 * Math.PI / k * (1 + amplitude * amplitude / 16) * fps)
  return { ...turning(chance, swung(-1, k * k, start, turn, fps, frames), true), turns: true, size, covers: swings, fastest: k / fps }
}

function dyingMotion(chance: Chance, fps: number, size: number): Motion {
  const k = Math.sqrt(GRAVITY / size)
  const [amplitude, share] = [chance.between(18, 50) * Math.PI / 180, chance.between(0.04, 0.15)]
  const swings = chance.between(1.5, 4)
  const angles = dragged(k * k, -Math.log(1 - share), false, chance.one([amplitude, -amplitude]), 0, fps, Math.round(swings * 2 * Math.PI / k * fps))
  return { ...turning(chance, angles, true), turns: true, size, covers: swings, fastest: k / fps }
}

/** Let go at some height, off sideways all the while. */
function bounceMotion(chance: Chance, fps: number): Motion | null {
  const [restitution, drop] = [chance.between(0.45, 0.9), chance.spread(0.3, 8)]
  const scale = chance.spread(150, 1000) / drop
  const fall = Math.sqrt(2 * drop / GRAVITY) * fps
  if (2 * restitution * fall < 12) return null
  const frames = Math.round(fall * (1 + 2 * restitution + chance.between(0.4, 1.6) * restitution * restitution))
  const { heights } = bounced(drop, 0, restitution, fps, frames)
  // Of a bounce in place a hold in the first fall can't be told from a lower start.
  const [start, perFrame] = [chance.between(-500, 500), chance.one([1, -1]) * chance.spread(3, 14)]
  return { last: frames, turns: true, fastest: 0, path: 'line', at: frame => ({ x: start + perFrame * frame, y: scale * between(heights, frame) }) }
}

function slowingMotion(chance: Chance, frames: number, path: Motion['path']): Motion {
  const [stop, travel] = [frames * chance.between(0.65, 1), chance.spread(120, 2000)]
  return { ...laid(chance, Array.from({ length: frames + 1 }, (_, i) => travel * (1 - Math.max(0, 1 - i / stop) ** 2)), path), turns: false }
}

/** Distances laid along a straight line or an arc. */
function laid(chance: Chance, distances: number[], path: Motion['path']): Omit<Motion, 'turns'> {
  const start = { x: chance.between(-500, 500), y: chance.between(-500, 500) }
  // Steep enough to fall, or any way at all for what is only moved.
  const heading = chance.between(0, 2 * Math.PI)
  if (path === 'line') {
    return {
      last: distances.length - 1, fastest: 0, path,
      at: (frame) => {
        const d = between(distances, frame)
        return { x: start.x + d * Math.cos(heading), y: start.y + d * Math.sin(heading) }
      },
    }
  }
  const length = Math.max(...distances) - Math.min(...distances)
  if (path === 'parabola') return bowed(chance, distances, length, start)
  const radius = length / chance.between(0.8, 4)
  return {
    last: distances.length - 1, fastest: 0, path, pivot: start,
    at: (frame) => {
      const angle = heading + between(distances, frame) / radius
      return { x: start.x + radius * Math.cos(angle), y: start.y + radius * Math.sin(angle) }
    },
  }
}

/** Distances along an upright parabola, walked off in steps too small to matter. */
function bowed(chance: Chance, distances: number[], length: number, start: Place): Omit<Motion, 'turns'> {
  const bend = chance.one([1, -1]) * chance.between(0.8, 3) / length
  const from = -length * chance.between(0.1, 0.7)
  const step = length / 8000
  const xs = [from]
  for (let x = from, way = 0; way <= length * 1.01; way += step) {
    // The midpoint rule.
    const half = x + step / 2 / Math.hypot(1, 2 * bend * x)
    x += step / Math.hypot(1, 2 * bend * half)
    xs.push(x)
  }
  const least = Math.min(...distances)
  return {
    last: distances.length - 1, fastest: 0, path: 'parabola',
    at: (frame) => {
      const x = between(xs, (between(distances, frame) - least) / step)
      return { x: start.x + x, y: start.y + bend * x * x }
    },
  }
}

function fallDistances(chance: Chance, frames: number): { distances: number[], turns: boolean, perFrame: number } {
  const travel = chance.spread(80, 2000)
  const way = chance.one(['rest', 'rest', 'pushed', 'apex'] as const)
  const apex = way === 'rest' ? 0 : way === 'apex' ? frames * chance.between(0.15, 0.6) : -frames * chance.between(0.1, 1)
  const a = travel / (Math.max(frames - apex, apex) ** 2 - (way === 'apex' ? 0 : apex * apex))
  return { distances: Array.from({ length: frames + 1 }, (_, i) => a * ((i - apex) ** 2)), turns: way === 'apex', perFrame: 2 * a }
}

function throwMotion(chance: Chance, frames: number, fps: number): Motion & { scale: number } {
  const [sideways, height] = [chance.spread(80, 1500) * chance.one([1, -1]), chance.spread(80, 900)]
  // The apex may lie before, in or after the list.
  const apex = frames * chance.one([0, chance.between(0.2, 0.8), -chance.between(0.1, 0.6), 1])
  const far = Math.max(Math.abs(frames - apex), Math.abs(apex))
  const a = height / (far * far)
  const start = { x: chance.between(-500, 500), y: chance.between(-500, 500) }
  return {
    last: frames, turns: false, fastest: 0, path: 'parabola', scale: 2 * a * fps * fps / GRAVITY,
    at: frame => ({ x: start.x + sideways * frame / frames, y: start.y - a * (frame - apex) ** 2 }),
  }
}

const ease = (u: number) => u * u * (3 - 2 * u)

/** Motions that claim a law they don't keep. */
function otherMotion(chance: Chance, family: PointFamily, law: PointLaw, frames: number): Motion | null {
  if (law === 'flight') {
    const dx = chance.spread(150, 1200) * chance.one([1, -1])
    const dy = chance.spread(100, 700)
    const course = (x: (u: number) => number, y: (u: number) => number, path: Motion['path']): Motion =>
      ({ last: frames, turns: false, fastest: 0, path, at: frame => ({ x: dx * x(frame / frames), y: dy * y(frame / frames) }) })
    switch (family) {
      case 'straight': return course(u => u, u => -u, 'line')
      case 'falling-line': return course(u => u * u, u => -u * u, 'line')
      case 'slowing': {
        const drag = chance.between(0.8, 2.5)
        return course(u => (1 - Math.exp(-drag * u)) / (1 - Math.exp(-drag)), u => 1.5 * u - 2.5 * u * u, 'parabola')
      }
      case 'ease': return course(u => u, u => Math.sin(Math.PI * ease(u)) * 0.8 - ease(u), 'parabola')
      default: return null
    }
  }
  if (law === 'topple' || law === 'pendulum') {
    if (family === 'straight') return { ...laid(chance, Array.from({ length: frames + 1 }, (_, i) => 40 * i), 'line'), turns: false }
    if (family !== 'even') return null
    const [from, to] = law === 'topple' ? [chance.between(2, 10), chance.between(70, 88)] : [-chance.between(20, 60), chance.between(20, 60)]
    const angles = Array.from({ length: frames + 1 }, (_, i) => (from + (to - from) * i / frames) * Math.PI / 180)
    return { ...turning(chance, angles, law === 'pendulum'), turns: false }  as Motion
  }
  const travel = chance.spread(150, 1500)
  const shape = family === 'even' ? (u: number) => u : family === 'ease' ? ease : null
  return shape && { ...laid(chance, Array.from({ length: frames + 1 }, (_, i) => travel * shape(i / frames)), 'line'), turns: false }
}

/** A motion that keeps its law, or the one that the family puts in its place; null where the two don't go together. */
export function motionFor(chance: Chance, family: PointFamily, law: PointLaw, fps: number, frames: number): (Motion & { scale?: number }) | null {
  if (family === 'short') {
    const tiny = chance.between(0.2, 0.8)
    return { ...laid(chance, Array.from({ length: frames + 1 }, (_, i) => tiny * i / frames), 'line'), turns: false }
  }
  const other = otherMotion(chance, family, law, frames)
  if (other) return other
  if (['even', 'ease', 'straight', 'slowing', 'falling-line'].includes(family)) return null
  const path = chance.one(['line', 'line', 'line', 'circle', 'parabola'] as const)
  switch (law) {
    case 'topple': return toppleMotion(chance, fps, chance.spread(0.15, 40))
    case 'pendulum': return swingMotion(chance, fps, chance.spread(0.15, 40))
    case 'swing-decay': return dyingMotion(chance, fps, chance.spread(0.15, 40))
    case 'bounce': return bounceMotion(chance, fps)
    case 'slow-in': return slowingMotion(chance, frames, path)
    case 'flight': return throwMotion(chance, frames, fps)
    case 'odd-rule': {
      const { distances, turns, perFrame } = fallDistances(chance, frames)
      return { ...laid(chance, distances, path), turns, scale: perFrame * fps * fps / GRAVITY }
    }
    case 'steady': {
      const gap = chance.spread(4, 50)
      return { ...laid(chance, Array.from({ length: frames + 1 }, (_, i) => gap * i), path), turns: false }
    }
    case 'spin': {
      const gap = chance.between(3, 30) * Math.PI / 180
      return { ...turning(chance, Array.from({ length: frames + 1 }, (_, i) => gap * i), false), turns: false, fastest: gap }
    }
  }
}
