/** The motion that a list shows, exactly, at every whole frame. */
import type { Kind, Law } from './made'
import { GRAVITY, swung } from './motion'
import { toPaper } from './paper'
import type { Paper } from './paper'
import type { Chance } from './random'

const DEGREE = 180 / Math.PI

export interface Exact {
  /** Reading at every whole frame, before any pencil. */
  readings: number[]
  law: Law
  size?: number
  covers?: number
  /** True where the readings turn back on the way. */
  turns: boolean
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

export function motionFor(chance: Chance, family: Kind, law: Law, paper: Paper, size: number): Exact | null {
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
