import { atSize, ownGravityOf, sizeIn, subjectIn } from '~/utils/bench/setup'
import type { BenchSetup } from '~/utils/bench/setup'
import { turns } from '~/utils/claiming/form'
import type { Claim } from '~/utils/contracts/production'
import { roundFigure } from '~/utils/drawing/words'
import { framesFor, plannedList, secondsFor, uprightLean } from '~/utils/motion'
import type { JudgedKey, Key, PathSubject, Plan } from '~/utils/motion'

/** From what lies on the bench to figures and drawings. Metres, degrees, drawing units; frames count from 1. */

/** A body lies flat where its own side meets the ground: sooner than 90° past balance for what stands broad. */
export const flatAngle = (setup: BenchSetup) => 90 - uprightLean(subjectIn(setup))

const pathIn = (setup: BenchSetup): PathSubject & { unitsPerMetre: number } => ({
  unitsPerMetre: setup.scale, slope: setup.slope, roll: setup.roll, ...ownGravityOf(setup),
})

/** The motion sheet's plan of a setup. */
export function planIn(setup: BenchSetup): Plan {
  const paper = { fps: setup.fps, exposure: setup.on }
  switch (setup.law) {
    case 'topple': return { ...paper, law: 'topple', subject: subjectIn(setup), lean: setup.lean, to: flatAngle(setup) }
    case 'pendulum': return { ...paper, law: 'pendulum', subject: subjectIn(setup), amplitude: setup.amplitude, swings: setup.swings }
    case 'odd-rule': return { ...paper, law: 'odd-rule', subject: pathIn(setup), travel: setup.way * setup.scale }
    case 'steady': return { ...paper, law: 'steady', travel: setup.way * setup.scale, seconds: setup.way / setup.speed }
  }
}

/** What keeps a setup from moving at all, in one sentence; null where nothing does. */
export function problemIn(setup: BenchSetup): string | null {
  if (setup.law !== 'topple') return null
  const flat = flatAngle(setup)
  return setup.lean < flat ? null : `This body lies flat ${roundFigure(flat, 3)}° past balance: lean it less than that.`
}

export interface Outcome {
  /** Metres. */
  size: number
  seconds: number
  /** Not rounded: where the motion ends between two drawings. */
  frames: number
  /** Whole frames that hold it. */
  wholeFrames: number
  /** On the chosen exposure, up to the end. */
  drawings: number
}

/** How long the planned motion takes, at its own size or another. */
export function outcomeIn(setup: BenchSetup, size = sizeIn(setup)): Outcome {
  const plan = planIn(atSize(setup, size))
  const seconds = secondsFor(plan)
  const frames = seconds * setup.fps
  return { size, seconds, frames, wholeFrames: framesFor(plan), drawings: Math.floor(frames / setup.on + 1e-9) + 1 }
}

/** The planned size and those beside it, smallest first. */
export const comparedIn = (setup: BenchSetup): Outcome[] =>
  [...new Set([sizeIn(setup), ...setup.beside])].sort((a, b) => a - b).map((size) => outcomeIn(setup, size))

/** The size in metres as which the same motion reads when it takes `frames`. Sizes go by time squared; at a given speed, ways go by time. */
export function sizeForFrames(setup: BenchSetup, frames: number): number {
  const need = outcomeIn(setup)
  const share = frames / need.frames
  return need.size * (setup.law === 'steady' ? share : share ** 2)
}

/** What readings are rounded to: a tenth, finer where the whole list spans little. */
export function pencilStep(span: number): number {
  return span > 0 ? Math.min(0.1, 10 ** Math.floor(Math.log10(span / 200))) : 0.1
}
const spanOf = (setup: BenchSetup) => (turns(setup.law) ? 90 : setup.way * setup.scale)

/** The spacing list: rounded readings on the exposure's frames, from frame 1. At most 2,000 drawings. */
export const listIn = (setup: BenchSetup): Key[] => plannedList({ ...planIn(setup), step: pencilStep(spanOf(setup)) }).keys

/** Unrounded readings, one per drawing, for bodies that move; where it has ended, `end` is what it rests at. */
export function motionIn(setup: BenchSetup, size: number): { readings: number[]; end: number; frames: number } {
  const plan = planIn(atSize(setup, size))
  const { keys, frames } = plannedList(plan)
  const readings = keys.map(({ reading }) => reading)
  const end = plan.law === 'topple' ? plan.to! : plan.law === 'pendulum' ? swungTo(setup) : 'travel' in plan && readings.length > 0 ? plan.travel : 0
  return { readings, end, frames }
}
/** Where the last swing is when its time is up: a list of two drawings, the first and the one at the very end. */
function swungTo(setup: BenchSetup): number {
  const plan = planIn(setup)
  return plannedList({ ...plan, exposure: secondsFor(plan) * setup.fps }).keys.at(-1)?.reading ?? setup.amplitude
}

/** The claim that the take drawings draw by. */
export function claimIn(setup: BenchSetup): Claim {
  const angle = turns(setup.law)
  return {
    law: setup.law,
    measure: angle ? 'angle' : 'distance',
    unit: angle ? 'deg' : 'px',
    slop: 0.3,
    tolerance: 0.1,
    subject: angle ? subjectIn(setup) : pathIn(setup),
  }
}

/** Six decimals: the same text on every machine, whatever the last bits of a sine were. */
const settle = (value: number) => Number(value.toFixed(6))

/** The list with the exact law beside the rounded readings, in the shape that the drawings take. */
export function planKeysIn(setup: BenchSetup): JudgedKey[] {
  const exact = plannedList(planIn(setup)).keys
  const rounded = listIn(setup)
  return rounded.map(({ frame, reading }, i) => {
    const law = settle(exact[i]!.reading)
    const [next, nextLaw] = [rounded[i + 1]?.reading, exact[i + 1]?.reading]
    return {
      frame, reading, law, offset: settle(reading - law), offsetFrames: null, allowance: null, breaks: false,
      gap: next === undefined ? null : settle(next - reading),
      lawGap: nextLaw === undefined ? null : settle(nextLaw - law),
    }
  })
}
