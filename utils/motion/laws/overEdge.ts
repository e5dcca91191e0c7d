/** A body that goes over a brink: a topple up to where it leaves, an even turn from there on. */
import { edgeEnergy, leavingCosine, overBrink, releaseAt } from '../edge'
import { RADIAN } from '../series'
import type { Series } from '../series'
import type { LawModel, Trace } from './model'
import { beginSwing, confineSwing, traceTurning } from './swinging'
import type { Turning } from './swinging'

/** Where a search may have the body let go, radians: less is no arc, more is underneath the brink. */
const LEAST_ANGLE = 2 * RADIAN
const MOST_ANGLE = 170 * RADIAN
/** Beginnings that are followed up. */
const FOLLOWED = 3

/** Turning that is let go at cos θ = `cosine`, which may hang on the state's energy. */
function lettingGo(cosine: (start: number, push: number) => number): Turning {
  return {
    fill: (start, push, ...rest) => overBrink(start, push, releaseAt(start, push, cosine(start, push)), ...rest),
    pull: (start, push) => (Math.cos(start) <= cosine(start, push) ? 0 : Math.sin(start)),
  }
}

const byLaw = ({ edgeRatio }: Series) => lettingGo((start, push) => leavingCosine(edgeRatio, edgeEnergy(start, push)))

/** Numbers as of a topple; where it leaves follows from them and the body's q. */
export const overEdge: LawModel = {
  law: 'over-edge',
  size: 3,
  linear: false,
  trace: (series, numbers, x, withColumns) => traceTurning(series, numbers, x, withColumns, byLaw(series)),
  confine: confineSwing,
  begin: (series, y) => {
    const rest = Math.acos(leavingCosine(series.edgeRatio, 1))
    // A push takes it off earlier, a lean to start from later.
    return likeliest(overEdge, series, y, [0.6, 0.8, 1, 1.2].map(share => beginning(series, y, share * rest)))
  },
}

/** The same with a leaving angle of its own as a fourth number, radians from upright on whichever side: what was drawn, not what would be. */
export const ownRelease: LawModel = {
  law: 'over-edge',
  size: 4,
  linear: false,
  trace(series, numbers, x, withColumns): Trace {
    const cosine = Math.cos(ownAngle(numbers))
    const trace = traceTurning(series, numbers, x, withColumns, lettingGo(() => cosine))
    if (!withColumns) return trace
    const kappa = Math.exp(numbers[0] as number)
    const { tau, angle, turn } = releaseAt(numbers[1] as number, (numbers[2] as number) / kappa, cosine)
    // θ = ψ + ω(τ − τᵣ) after it, with dτᵣ/dψ = 1/ω and dω/dψ = sin ψ/ω.
    const slope = tau > 0 && turn !== 0 ? Math.sin(angle) / Math.abs(turn) * series.perRadian : 0
    return { ...trace, columns: [...trace.columns, x.map(at => slope * Math.max(0, at * kappa - tau))] }
  },
  confine: confineSwing,
  begin(series, y) {
    const far = y.reduce((most, reading) => Math.max(most, Math.abs(reading / series.perRadian + series.zero)), 0)
    const upTo = Math.min(far, MOST_ANGLE)
    const shares = Array.from({ length: 10 }, (_, i) => (i + 1) / 11)
    return likeliest(ownRelease, series, y, shares.map(share => Float64Array.of(...beginning(series, y, share * upTo), share * upTo)))
  },
}

/** The leaving angle that an own release counts by, radians. */
export function ownAngle(numbers: Float64Array): number {
  return Math.min(MOST_ANGLE, Math.max(LEAST_ANGLE, numbers[3] as number))
}

const beginning = (series: Series, y: Float64Array, upTo: number) => beginSwing(series, y, true, upTo)[0] as Float64Array

/** The beginnings that already lie nearest to the list, best first. */
function likeliest(model: LawModel, series: Series, y: Float64Array, begun: Float64Array[]): Float64Array[] {
  return begun
    .map((numbers) => {
      const { value } = model.trace(series, numbers, series.x, false)
      return { numbers, cost: value.reduce((sum, at, i) => sum + Math.abs(at - (y[i] as number)), 0) }
    })
    .sort((a, b) => a.cost - b.cost)
    .slice(0, FOLLOWED)
    .map(({ numbers }) => numbers)
}
