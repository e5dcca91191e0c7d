/** Where a search for a body over a brink begins: the first so many drawings are taken for the arc, by turns. */
import { beginSwing } from '../laws/swinging'
import { centreOf, radiusOf } from '../path/curve'
import type { Sheet } from '../path/sheet'
import { taubinCircle } from '../path/taubin'
import type { Series } from '../series'
import type { Place } from '../types'
import { ALL, LOG, OWN, REACH, RIGHT, START, TURN, UP, brinkPlaces } from './brinkModel'
import type { Letting } from './brinkModel'

const SHARES = [0.35, 0.45, 0.55, 0.65, 0.75, 0.85, 1]
const FEWEST = 4

/** All seven numbers, best first. `times`: of the drawings, spans. */
export function beginnings(sheet: Sheet, series: Series, times: Float64Array, brink: Place | null, letting: Letting): Float64Array[] {
  const arcs = [...new Set(SHARES.map(share => Math.max(FEWEST, Math.round(share * sheet.n))))].filter(arc => arc <= sheet.n)
  return arcs
    .flatMap(arc => begun(sheet, series, times, brink, arc) ?? [])
    .flatMap(numbers => (letting === 'own' ? [0.85, 1].map(share => withOwn(numbers, share)) : [numbers]))
    .map((numbers) => {
      const { x, y } = brinkPlaces(numbers, series.edgeRatio, letting, times)
      let cost = 0
      for (let i = 0; i < sheet.n; i++) cost += Math.hypot((x[i] as number) - (sheet.x[i] as number), (y[i] as number) - (sheet.y[i] as number))
      return { numbers, cost }
    })
    .filter(({ cost }) => Number.isFinite(cost))
    .sort((a, b) => a.cost - b.cost)
    .map(({ numbers }) => numbers)
}

/** The leaving angle is taken for a share of the way that the arc's drawings get out. */
function withOwn(numbers: Float64Array, share: number): Float64Array {
  const out = numbers.slice()
  out[OWN] = share * (out[OWN] as number)
  return out
}

function begun(sheet: Sheet, series: Series, times: Float64Array, given: Place | null, arc: number): Float64Array | null {
  const part: Sheet = { ...sheet, n: arc, x: sheet.x.subarray(0, arc), y: sheet.y.subarray(0, arc) }
  const circle = given ? null : taubinCircle(part, new Float64Array(arc).fill(1))
  const brink = given ?? (circle && centreOf(circle))
  if (!brink) return null
  const away = (i: number) => ({ x: (part.x[i] as number) - brink.x, y: (part.y[i] as number) - brink.y })
  const radii = Float64Array.from({ length: arc }, (_, i) => Math.hypot(away(i).x, away(i).y)).sort()
  const reach = circle ? radiusOf(circle) : radii[arc >> 1] as number
  if (!(reach > 0 && reach < 1e7)) return null
  const angle = new Float64Array(arc)
  for (let i = 0; i < arc; i++) {
    const { x, y } = away(i)
    const plain = Math.atan2(x, y)
    const before = i > 0 ? angle[i - 1] as number : 0
    angle[i] = plain + 2 * Math.PI * Math.round((before - plain) / (2 * Math.PI))
  }
  const turning: Series = { ...series, n: arc, x: times.subarray(0, arc), y: angle, perRadian: 1, zero: 0 }
  const [log, start, turn] = beginSwing(turning, angle, true)[0] as Float64Array
  const numbers = new Float64Array(ALL)
  numbers[LOG] = log as number
  numbers[START] = start as number
  numbers[TURN] = turn as number
  numbers[REACH] = Math.log(reach)
  numbers[RIGHT] = brink.x
  numbers[UP] = brink.y
  numbers[OWN] = Math.min(2.9, Math.max(0.05, angle.reduce((most, at) => Math.max(most, Math.abs(at)), 0)))
  return numbers
}
