/** How a motion gets onto paper: exposures, pencil and rounding. */
import type { Chance } from './random'

const DEGREE = 180 / Math.PI

export interface Paper { fps: number, measure: 'angle' | 'distance' | 'arc', unit: string, slop: number, step: number, radius: number, zeroAt: number }

export function paperFor(chance: Chance, measure: 'angle' | 'distance' | 'arc'): Paper {
  const fps = chance.one([24, 24, 24, 12, 25, 30, 23.976, 60])
  if (measure === 'angle') {
    return { fps, measure, unit: 'deg', slop: 0.3, step: 0.1, radius: 0, zeroAt: chance.next() < 0.15 ? chance.between(-20, 20) : 0 }
  }
  const step = chance.one([0.5, 1])
  return { fps, measure, unit: 'px', slop: step === 0.5 ? 1 : 1.5, step, radius: measure === 'arc' ? chance.spread(150, 900) : 0, zeroAt: 0 }
}

/** Frames of the keys: ones to fours throughout, or uneven. */
export function exposuresFor(chance: Chance, frames: number, uneven: boolean): number[] {
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
export function toPaper(angle: number, paper: Paper): number {
  return paper.measure === 'arc' ? angle * paper.radius : angle * DEGREE - paper.zeroAt
}

export interface Drawn { frames: number[], exact: number[], reading: number[], allowance: number[] }

/**
 * Pencil and rounding. The pencil stays inside the slop: a bell or an even spread of some part of it; `rough`, an even spread over nearly
 * all that rounding leaves.
 */
export function draw(
  chance: Chance, at: number[], readings: number[], paper: Paper, delay: (i: number) => number, rough = false,
): Drawn {
  const exact = at.map((frame, i) => readings[frame - delay(i)] as number)
  const plain = at.map(frame => readings[frame] as number)
  const room = paper.slop - paper.step / 2
  const even = chance.next() < 0.5 || rough
  const part = rough ? chance.between(0.85, 1) * room / paper.slop : chance.between(0.2, 0.65)
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
