/** A swing or a topple by its exact solution, in the place of the search's first approach to it. */
import { BRIEF, refine } from '../../fit'
import { LAWS } from '../../laws/index'
import { seriesOf } from '../../series'
import { solve3 } from '../../solve'
import type { ReadingCheck } from '../../types'
import { remembered } from './piece'
import type { Piece } from './piece'
import type { Scene } from './scene'

/** Share of the span over which a slope is taken. */
const NUDGE = 1e-4

/** The piece from..to fitted exactly, begun from `rough`; null where no swing can be had. */
export function exactSwing(request: ReadingCheck, scene: Scene, rough: Piece, from: number, to: number): Piece | null {
  const model = LAWS[rough.pull > 0 ? 'topple' : 'pendulum']
  const [row] = scene.rows
  const first = request.keys[from]
  if (!row || !first) return null
  const middle = first.reading - (row[from] as number)
  const series = seriesOf({ ...request, keys: request.keys.slice(from, to + 1) })
  const weights = scene.weights.slice(from, to + 1)
  // A misplaced drawing would bend the beginning.
  const calm = series.y.map((value, i) => (weights[i] === 0 ? (rough.at(from + i).values[0] ?? 0) + middle : value))
  const [begin] = model.begin(series, calm)
  if (!begin) return null
  const fit = refine(model, series, series.x, calm, weights, begin, BRIEF)
  const { size } = model
  const solve = (gradient: Float64Array) => solve3(fit.normal, gradient, size) ?? new Float64Array(size)
  return {
    kind: 'swing', size, cost: fit.cost, pull: rough.pull,
    at: remembered((i) => {
      const x = ((scene.frames[i] as number) - (scene.frames[from] as number)) / series.spanFrames
      const { value, rate, columns } = model.trace(series, fit.numbers, Float64Array.of(x - NUDGE, x, x + NUDGE), true)
      const byValue = Float64Array.from(columns, column => column[1] as number)
      const bySpeed = Float64Array.from(columns, column => ((column[2] as number) - (column[0] as number)) / (2 * NUDGE * series.spanFrames))
      return {
        values: [(value[1] as number) - middle], speeds: [(rate[1] as number) / series.spanFrames],
        byValue, bySpeed, solvedValue: solve(byValue), solvedSpeed: solve(bySpeed),
      }
    }),
  }
}
