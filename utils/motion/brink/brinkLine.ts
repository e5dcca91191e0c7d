/** The fitted line of a body over a brink, and its drawings held against it. */
import { planarAllowances } from '../flight/planar'
import { asPosted } from '../path/sheet'
import type { JudgedKey, Place, PointCheck } from '../types'
import { LOG, brinkPlaces, releaseOfBrink } from './brinkModel'
import type { Letting, Places } from './brinkModel'
import type { BrinkStory, Tipped } from './brinkStories'

/** Where the law's gap is below this share of the slop it stands still for the eye, and an offset is worth no number of frames. */
const STANDS = 0.25
/** Steps between two drawings by which the way along the line is measured. */
const FINE = 16

export interface BrinkLine {
  /** All seven. */
  numbers: Float64Array
  /** Spans by which the line runs behind the numbers' own clock. */
  lag: number
  /** When it lets go, spans from the first drawing; as drawn, and as the law has it. */
  drawn: number
  lawful: number
  /** Places at times (spans), as the law has it unless told otherwise. */
  at(times: ArrayLike<number>, letting?: Letting): Places
  /** The way along it up to each of `times`, drawing units from the first of them: by short chords. */
  ways(times: ArrayLike<number>, letting?: Letting): number[]
}

/** The line runs with the longer side of a held or skipped drawing. */
export function brinkLine({ series }: Tipped, { model, fit, shift }: BrinkStory): BrinkLine {
  const lag = shift && series.n - shift.at > shift.at ? shift.by : 0
  const numbers = model.all(fit.numbers)
  const at = (times: ArrayLike<number>, letting: Letting = 'law') =>
    brinkPlaces(numbers, series.edgeRatio, letting, Float64Array.from(times, x => x - lag))
  const lets = (letting: Letting) => lag + releaseOfBrink(numbers, series.edgeRatio, letting).tau / Math.exp(numbers[LOG] as number)
  return {
    numbers, lag, at, drawn: lets(model.letting), lawful: lets('law'),
    ways(times, letting = 'law') {
      let way = 0
      return Array.from(times, (to, i) => {
        const from = i > 0 ? times[i - 1] as number : to
        const { x, y } = at(Array.from({ length: FINE + 1 }, (_, k) => from + (to - from) * k / FINE), letting)
        for (let k = 1; k <= FINE; k++) way += Math.hypot((x[k] as number) - (x[k - 1] as number), (y[k] as number) - (y[k - 1] as number))
        return way
      })
    },
  }
}

/**
 * Every drawing beside its place on the line. `reading` and `law` count along the line: what a drawing is ahead by, along the way the body
 * goes there, is its offset; what it is off across that way is `offPath`, positive to the left.
 */
export function brinkKeys(request: PointCheck, { sheet, series, care }: Tipped, line: BrinkLine, letting: Letting = 'law'): JudgedKey[] {
  const places = line.at(series.x, letting)
  const ways = line.ways(series.x, letting)
  const allowed = planarAllowances(places, care.slop, care.tolerance)
  const gaps = planarAllowances(places, 0, 1)
  const split = Array.from(series.x, (_, i) => {
    const [dx, dy] = [(sheet.x[i] as number) - (places.x[i] as number), (sheet.y[i] as number) - (places.y[i] as number)]
    const [vx, vy] = [places.vx[i] as number, places.vy[i] as number]
    const pace = Math.hypot(vx, vy)
    // Where it stands still nothing is ahead: it is off.
    return pace > 0
      ? { ahead: (dx * vx + dy * vy) / pace, left: (vx * dy - vy * dx) / pace, pace }
      : { ahead: 0, left: Math.hypot(dx, dy), pace }
  })
  return request.keys.map(({ frame, x, y }, i): JudgedKey => {
    const { ahead, left, pace } = split[i] as (typeof split)[number]
    const law = ways[i] as number
    const next = split[i + 1]
    const frames = ahead / (pace / series.spanFrames)
    const still = (gaps[i] as number) <= STANDS * request.slop || Math.abs(frames) > series.spanFrames
    const allowance = allowed[i] as number
    const lawPoint: Place = { x: places.x[i] as number, y: places.y[i] as number }
    return {
      frame, reading: law + ahead, law, offset: ahead,
      offsetFrames: Number.isFinite(frames) && !still ? frames : null,
      gap: next ? (ways[i + 1] as number) + next.ahead - law - ahead : null,
      lawGap: next ? (ways[i + 1] as number) - law : null,
      allowance, breaks: Math.hypot(ahead, left) > allowance,
      point: { x, y }, lawPoint: asPosted(sheet, lawPoint), offPath: left,
    }
  })
}
