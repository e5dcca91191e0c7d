import { gravities } from '~/utils/bench/gravities'
import type { GravityName } from '~/utils/bench/gravities'
import { shapeFields, shapesFor, turns } from '~/utils/claiming/form'
import type { SizeField } from '~/utils/claiming/form'
import { CHECK_LIMITS } from '~/utils/contracts/check'
import { namedSize } from '~/utils/motion'
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
  /** Metres per second. */
  speed: number
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

export const benchLaws = ['odd-rule', 'topple', 'pendulum', 'steady'] as const
export type BenchLaw = (typeof benchLaws)[number]

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
  scale: { low: 0.01, high: 100_000, usual: 100 },
  ownGravity: { low: 0.01, high: 1_000, usual: 1 },
  fps: { low: CHECK_LIMITS.minFps, high: CHECK_LIMITS.maxFps, usual: 24 },
  have: { low: 1, high: 100_000, usual: 48 },
} as const
export type NumberField = keyof typeof ranges
export const numberFields = Object.keys(ranges) as NumberField[]

export const within = (field: NumberField, value: number) => value >= ranges[field].low && value <= ranges[field].high

/** The bench as it opens. */
export function freshSetup(): BenchSetup {
  const numbers = Object.fromEntries(numberFields.map((field) => [field, ranges[field].usual])) as Record<NumberField, number>
  return { ...numbers, law: 'topple', body: 'rod', roll: 'slide', gravity: 'earth', on: 2, have: null, beside: [] }
}

/** Another law takes another body where the old one can't do it: what swings hangs, what goes over stands. */
export function withBenchLaw(setup: BenchSetup, law: BenchLaw): BenchSetup {
  const shapes = shapesFor[law]
  return { ...setup, law, body: turns(law) && !shapes.includes(setup.body) ? shapes[0]! : setup.body, beside: [] }
}

/** m/s². */
export const gravityIn = (setup: BenchSetup) => (setup.gravity === 'own' ? setup.ownGravity : gravities[setup.gravity])

/** Gravity as claims hold it: left out where it is the Earth's. */
export const ownGravityOf = (setup: BenchSetup) => (setup.gravity === 'earth' ? {} : { gravity: gravityIn(setup) })

/** The body that turns, as planned. */
export function subjectIn(setup: BenchSetup): BodySubject {
  const sizes = Object.fromEntries(shapeFields[setup.body].map((field) => [field, setup[field]]))
  return { shape: setup.body, ...sizes, ...ownGravityOf(setup) } as unknown as BodySubject
}

/** The one length, metres, by which the planned thing is named: a body's height or length, a fall's drop. */
export const sizeIn = (setup: BenchSetup) => (turns(setup.law) ? namedSize(subjectIn(setup)) : setup.way)

const lengths = ['height', 'width', 'radius', 'headHeight', 'length', 'equalLength'] as const satisfies readonly SizeField[]
/** Twelve digits: all that is meant, without the stray last bits of a multiplication. */
const tidy = (value: number) => Number(value.toPrecision(12))

/** The same thing at another size: a body keeps its proportions, a path its slope. */
export function atSize(setup: BenchSetup, size: number): BenchSetup {
  if (!turns(setup.law)) return { ...setup, way: size }
  const factor = size / sizeIn(setup)
  if (factor === 1) return setup
  const scaled = lengths.filter((field) => shapeFields[setup.body].includes(field)).map((field) => [field, tidy(setup[field] * factor)])
  return { ...setup, ...Object.fromEntries(scaled) }
}
