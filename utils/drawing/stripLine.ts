import { textWidth } from '~/utils/drawing/labels'
import type { Place } from '~/utils/drawing/labels'
import { passesOf } from '~/utils/drawing/passes'
import type { StripClaim, StripKey, StripLayout, StripPaths } from '~/utils/drawing/stripLayout'
import type { Point } from '~/utils/drawing/strokes'
import { px } from '~/utils/drawing/strokes'
import { lineTrack } from '~/utils/drawing/track'

/** A bounce that dies away needs this many ways; later ones would be drawn over the first. The wall's small sheets have room for fewer. */
const MOST_LANES = { whole: 10, small: 6 }
const ABOVE_PLAIN = 26
/** The lozenge of a joint that breaks stands above the ticks. */
const ABOVE_JOINT = 42
const ABOVE_BROKEN = 74
const BELOW = 40
/** More, where spans meet: the words of their laws. */
const JOINT_WORDS = 26

/** A fall, a ramp, a throw: drawn level, posted above the line and the law's below. Each way there and back has its own line. */
export function stripLine(keys: readonly StripKey[], claim: StripClaim, width: number, small: boolean, { joints = [] }: StripPaths = {}): StripLayout {
  const readings = keys.flatMap(({ reading, law }) => (law === null ? [reading] : [reading, law]))
  const track = lineTrack(readings, width, small ? 14 : 28)
  const span = Math.max(...readings) - Math.min(...readings)
  const slack = Math.max(2 * claim.slop, span / 100)
  const passes = passesOf(
    keys.map(({ reading, law }) => law ?? reading),
    slack,
  )
  const lanes = passes.map((pass) => pass % (small ? MOST_LANES.small : MOST_LANES.whole))
  const count = Math.max(0, ...lanes) + 1
  const plain = joints.some(({ holds }) => !holds) ? ABOVE_JOINT : ABOVE_PLAIN
  const baselines: number[] = []
  let height = 0
  for (let lane = 0; lane < count; lane++) {
    const breaks = keys.some((key, i) => key.breaks && lanes[i] === lane)
    const above = small ? 30 : breaks ? ABOVE_BROKEN : plain
    baselines.push(height + above)
    height += above + (small ? 22 : BELOW + (joints.length > 0 ? JOINT_WORDS : 0))
  }
  const yOf = (i: number) => baselines[lanes[i]!]!
  const posted = keys.map(({ reading }, i) => track.spot(reading, yOf(i)))

  return {
    width,
    height,
    pivot: null,
    base: baselines.map((y) => `M${px(track.from)} ${px(y)}H${px(track.to)}`).join('') + turnsPath(passes, posted),
    posted,
    law: keys.map(({ law }, i) => (law === null ? null : track.spot(law, yOf(i)))),
    framePlace: (i) => {
      const spot = track.spot(keys[i]!.law ?? keys[i]!.reading, yOf(i))
      return { x: spot.x, y: spot.y + 31, anchor: 'middle' }
    },
    breakPlaces: (i, text) => rowsAbove(posted[i]!, text, width),
    body: () => null,
    sides: 'posted above the line, the law below',
  }
}

/** Two rows over the cross, moved sideways as far as the edge of the paper asks. */
function rowsAbove(spot: Point, text: string, width: number): Place[] {
  const half = textWidth(text, 12, true) / 2 + 3
  const x = Math.min(Math.max(spot.x, half), width - half)
  const places: Place[] = []
  for (const up of [45, 61]) {
    const y = spot.y - up
    const hair = { x: spot.x - 1, y: y + 3, width: 2, height: up - 40 }
    places.push({ x, y, anchor: 'middle', hair })
    if (spot.x + 2 * half < width) places.push({ x: spot.x - 4, y, anchor: 'start', hair })
    if (spot.x - 2 * half > 0) places.push({ x: spot.x + 4, y, anchor: 'end', hair })
  }
  return places
}

/** Where the motion turns, a small bow leads from one line to the next. */
function turnsPath(passes: readonly number[], posted: readonly Point[]): string {
  let path = ''
  for (let i = 1; i < passes.length; i++) {
    const [from, to] = [posted[i - 1]!, posted[i]!]
    if (passes[i] === passes[i - 1] || to.y <= from.y) continue
    const before = posted[i - 2] ?? to
    const bow = from.x >= before.x ? 18 : -18
    path += `M${px(from.x)} ${px(from.y)}C${px(from.x + bow)} ${px(from.y)} ${px(from.x + bow)} ${px(to.y)} ${px(from.x)} ${px(to.y)}`
  }
  return path
}
