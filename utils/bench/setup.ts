import { gravities } from '~/utils/bench/gravities'
import type { GravityName } from '~/utils/bench/gravities'
import { hasBody } from '~/utils/bench/laws'
import type { BenchLaw } from '~/utils/bench/laws'
import { shapeFields, shapesFor } from '~/utils/claiming/form'
import type { SizeField } from '~/utils/claiming/form'
import { CHECK_LIMITS } from '~/utils/contracts/check'
import type { BodySubject, Roll, Shape } from '~/utils/motion/types'

/** What lies on the bench: whole numbers and metres, never half-typed text. The form keeps what is being typed to itself. */
export interface BenchSetup extends Record<SizeField, number> {
  law: BenchLaw
  /** The body that turns; of no matter to what moves on a path. */
  body: Shape
  /** Degrees past balance, let go at rest. */
  lean: number
  /** Degrees to either side of hanging rest. */
  amplitude: number
  /** Full swings: there and back. */
  swings: number
  /** Metres along the path. */
  way: number
  /** Degrees; 90 is a free fall. */
  slope: number
  roll: Roll
  /** Metres per second, kept all the way. */
  speed: number
  /** How a slow in is told: by the seconds until it stops, or by the speed it starts with. */
  by: (typeof slowings)[number]
  /** Seconds until the stop. */
  stopAfter: number
  /** Metres per second at the first drawing, of what slows in. */
  startSpeed: number
  /** Metres per second at the throw. */
  throwSpeed: number
  /** Degrees above level; below it where negative. */
  throwAngle: number
  /** Metres from the hand down to the landing. */
  landing: number
  /** Metres from the brink down to the ground. */
  brink: number
  /** Turns per second. */
  rate: number
  /** Full turns. */
  turns: number
  /** Percent of the amplitude that each full swing loses. */
  lost: number
  /** Percent of the speed that a bounce gives back. */
  back: number
  /** Contacts with the ground, the last one included. */
  bounces: number
  /** Drawing units per metre. */
  scale: number
  gravity: GravityName
  /** m/s². */
  ownGravity: number
  fps: number
  /** Frames per drawing. */
  on: number
  /** "I have so many frames"; null while nobody asks. */
  have: number | null
  /** Named sizes, metres, that stand beside the planned one. */
  beside: number[]
}

export const slowings = ['seconds', 'speed'] as const
export const exposures = [1, 2, 3, 4] as const
/** Planned body and its neighbours: four are what a phone can still show side by side. */
export const MOST_BESIDE = 3

const metres = (usual: number) => ({ low: 0.01, high: 1_000, usual })
/** What each number may be, and what it is until somebody says otherwise. */
export const ranges = {
  height: metres(2),
  width: metres(0.5),
  radius: metres(0.3),
  mass: { low: 0.001, high: 1e6, usual: 4 },
  headMass: { low: 0.001, high: 1e6, usual: 6 },
  headHeight: metres(1.8),
  length: metres(1),
  equalLength: metres(1),
  lean: { low: 0.01, high: 89, usual: 1 },
  amplitude: { low: 0.1, high: 179, usual: 30 },
  swings: { low: 0.25, high: 50, usual: 1 },
  way: metres(2),
  slope: { low: 0.1, high: 90, usual: 90 },
  speed: { low: 0.001, high: 10_000, usual: 1.5 },
  stopAfter: { low: 0.01, high: 1_000, usual: 1 },
  startSpeed: { low: 0.001, high: 10_000, usual: 4 },
  throwSpeed: { low: 0.1, high: 300, usual: 6 },
  throwAngle: { low: -85, high: 85, usual: 45 },
  landing: { low: 0, high: 1_000, usual: 1 },
  brink: metres(5),
  rate: { low: 0.01, high: 100, usual: 1 },
  turns: { low: 0.05, high: 1_000, usual: 2 },
  lost: { low: 0.1, high: 50, usual: 10 },
  back: { low: 5, high: 95, usual: 70 },
  bounces: { low: 1, high: 20, usual: 3, whole: true },
  scale: { low: 0.01, high: 100_000, usual: 100 },
  ownGravity: { low: 0.01, high: 1_000, usual: 1 },
  fps: { low: CHECK_LIMITS.minFps, high: CHECK_LIMITS.maxFps, usual: 24 },
  have: { low: 1, high: 100_000, usual: 48 },
} as const satisfies Record<string, { low: number; high: number; usual: number; whole?: true }>
export type NumberField = keyof typeof ranges
export const numberFields = Object.keys(ranges) as NumberField[]

export const isWhole = (field: NumberField) => 'whole' in ranges[field]
export const within = (field: NumberField, value: number) =>
  value >= ranges[field].low && value <= ranges[field].high && (!isWhole(field) || Number.isInteger(value))

/** The bench as it opens. */
export function freshSetup(): BenchSetup {
  const numbers = Object.fromEntries(numberFields.map((field) => [field, ranges[field].usual])) as Record<NumberField, number>
  return { ...numbers, law: 'topple', body: 'rod', roll: 'slide', by: 'seconds', gravity: 'earth', on: 2, have: null, beside: [] }
}

/** Another law takes another body where the old one can't do it: what swings hangs, what goes over stands. */
export function withBenchLaw(setup: BenchSetup, law: BenchLaw): BenchSetup {
  const shapes = shapesFor[law]
  return { ...setup, law, body: hasBody(law) && !shapes.includes(setup.body) ? shapes[0]! : setup.body, beside: [] }
}

/** The same slow in, told the other way: a way covered while slowing evenly is half the first speed times the seconds. */
export function toldBy(setup: BenchSetup, by: BenchSetup['by']): Partial<BenchSetup> {
  const twice = 2 * setup.way
  if (by === setup.by) return {}
  return by === 'speed'
    ? { by, startSpeed: fitted('startSpeed', twice / setup.stopAfter) }
    : { by, stopAfter: fitted('stopAfter', twice / setup.startSpeed) }
}
const fitted = (field: NumberField, value: number) => Math.min(ranges[field].high, Math.max(ranges[field].low, Number(value.toPrecision(4))))

/** m/s². */
export const gravityIn = (setup: BenchSetup) => (setup.gravity === 'own' ? setup.ownGravity : gravities[setup.gravity])

/** Gravity as claims hold it: left out where it is the Earth's. */
export const ownGravityOf = (setup: BenchSetup) => (setup.gravity === 'earth' ? {} : { gravity: gravityIn(setup) })

/** The body that turns, as planned. */
export function subjectIn(setup: BenchSetup): BodySubject {
  const sizes = Object.fromEntries(shapeFields[setup.body].map((field) => [field, setup[field]]))
  return { shape: setup.body, ...sizes, ...ownGravityOf(setup) } as unknown as BodySubject
}
