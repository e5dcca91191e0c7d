import { hasBody, hasSize } from '~/utils/bench/laws'
import { gravityIn, subjectIn } from '~/utils/bench/setup'
import type { BenchSetup } from '~/utils/bench/setup'
import { shapeFields } from '~/utils/claiming/form'
import type { SizeField } from '~/utils/claiming/form'
import { metres, roundFigure } from '~/utils/drawing/words'
import { namedSize } from '~/utils/motion'

/** How big the planned thing is, and the same thing at another size. */

/**
 * Metres sideways from the hand to the landing: v·cos α·t, t the later root of landing = −v·sin α·t + ½gt². Any mechanics textbook,
 * projectile without air.
 */
export function rangeOf(setup: BenchSetup): number {
  const angle = (setup.throwAngle * Math.PI) / 180
  const [sideways, upward, g] = [setup.throwSpeed * Math.cos(angle), setup.throwSpeed * Math.sin(angle), gravityIn(setup)]
  const fall = Math.sqrt(upward * upward + 2 * g * setup.landing)
  // Thrown downward, upward + fall would cancel.
  const seconds = upward >= 0 ? (upward + fall) / g : (2 * setup.landing) / (fall - upward)
  return sideways * seconds
}

/** The one length, metres, by which the planned thing is named: a body's height or length, a fall's drop, a throw's range; null for a spin. */
export function sizeIn(setup: BenchSetup): number | null {
  if (!hasSize(setup.law)) return null
  if (hasBody(setup.law)) return namedSize(subjectIn(setup))
  return setup.law === 'flight' ? rangeOf(setup) : setup.way
}

/** The planned thing's size as people say it; a spin is named by its rate. */
export function sizeLabel(setup: BenchSetup, digits = 3): string {
  const size = sizeIn(setup)
  if (size !== null) return metres(size, digits)
  const rate = roundFigure(setup.rate, digits)
  return `${rate} ${rate === '1' ? 'turn' : 'turns'}/s`
}

const lengths = ['height', 'width', 'radius', 'headHeight', 'length', 'equalLength'] as const satisfies readonly SizeField[]
/** Twelve digits: all that is meant, without the stray last bits of a multiplication. */
const tidy = (value: number) => Number(value.toPrecision(12))

/**
 * The same thing at another size, metres: a body keeps its proportions and its brink, a path its slope, a throw its angle. What slows in
 * brakes as hard where it is told by its seconds, and starts as fast where it is told by its speed.
 */
export function atSize(setup: BenchSetup, size: number): BenchSetup {
  const from = sizeIn(setup)
  if (from === null || from === size) return setup
  const factor = size / from
  const scaled = (fields: readonly (keyof BenchSetup)[], by = factor) =>
    Object.fromEntries(fields.map((field) => [field, tidy((setup[field] as number) * by)])) as Partial<BenchSetup>
  switch (setup.law) {
    case 'flight': return { ...setup, ...scaled(['landing']), ...scaled(['throwSpeed'], Math.sqrt(factor)) }
    case 'slow-in': return { ...setup, way: size, ...(setup.by === 'seconds' ? scaled(['stopAfter'], Math.sqrt(factor)) : {}) }
    case 'odd-rule': case 'steady': case 'bounce': return { ...setup, way: size }
    default: {
      const own = lengths.filter((field) => shapeFields[setup.body].includes(field))
      return { ...setup, ...scaled(setup.law === 'over-edge' ? [...own, 'brink'] : own) }
    }
  }
}

/** How the size goes with the time: falls and swings by its square, what keeps a given speed in step with it. */
const inStep = (setup: BenchSetup) => setup.law === 'steady' || (setup.law === 'slow-in' && setup.by === 'speed')

/** The same motion `share` times as long: another size, or another rate where there is no size. */
export function lastingFor(setup: BenchSetup, share: number): BenchSetup {
  const size = sizeIn(setup)
  if (size === null) return { ...setup, rate: setup.rate / share }
  return atSize(setup, size * (inStep(setup) ? share : share ** 2))
}
