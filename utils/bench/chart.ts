import { placeLabels, spreadOrder, textWidth } from '~/utils/drawing/labels'
import type { Placed } from '~/utils/drawing/labels'
import { px } from '~/utils/drawing/strokes'
import type { Key } from '~/utils/motion/types'

/**
 * The timing chart, as it is drawn beside a drawing: a line from one key to the next, a tick where each drawing between them lies,
 * the keys circled, the exposures numbered. One line per stretch that goes one way: a swing has one for there and one for back.
 */
export interface ChartLine {
  from: number
  to: number
  /** Baseline of the line, pixels from the top of its own strip. */
  y: number
  line: string
  ticks: string
  hairs: string
  keys: { frame: number; x: number; y: number; rx: number }[]
  numbers: Placed<number>[]
  height: number
}

const RING_Y = 17
const LINE_Y = 48
const TICK = 9
/** Rows of numbers under the line, nearest first. */
const ROWS = [LINE_Y + 26, LINE_Y + 43, LINE_Y + 60]
const RING = 11

/** Divides a list where it turns round. A stretch shares its last drawing with the next one's first. */
export function stretches(keys: readonly Key[]): Key[][] {
  const runs: Key[][] = []
  let run: Key[] = []
  let way = 0
  for (const key of keys) {
    const before = run.at(-1)
    const step = before ? Math.sign(key.reading - before.reading) : 0
    if (before && way !== 0 && step !== 0 && step !== way) {
      runs.push(run)
      run = [before]
      way = step
    } else if (step !== 0) way = step
    run.push(key)
  }
  if (run.length > 1) runs.push(run)
  return runs
}

/** Draws one stretch for a width in pixels. Ends lie far enough inside for their rings. */
export function chartLine(keys: readonly Key[], width: number): ChartLine {
  const [first, last] = [keys[0]!, keys.at(-1)!]
  const ring = (frame: number) => Math.max(RING + 2, textWidth(String(frame), 13, true) / 2 + 7)
  const inset = Math.max(ring(first.frame), ring(last.frame)) + 2
  const whole = last.reading - first.reading
  const at = ({ reading }: Key) => inset + (whole === 0 ? 0 : (reading - first.reading) / whole) * (width - 2 * inset)
  const between = keys.slice(1, -1)
  const bounds = { x: 0, y: 0, width, height: ROWS[2]! + 6 }
  const order = spreadOrder(between.length)
  const wanted = order.map((i) => {
    const x = at(between[i]!)
    return {
      item: between[i]!.frame,
      text: String(between[i]!.frame),
      places: ROWS.map((y) => ({ x, y, anchor: 'middle' as const, hair: { x: x - 0.5, y: LINE_Y + TICK, width: 1, height: y - LINE_Y - TICK - 12 } })),
    }
  })
  const numbers = placeLabels<number>(wanted, bounds, [], { gap: 3 })
  const deepest = Math.max(LINE_Y + TICK + 4, ...numbers.map(({ y }) => y + 5))
  return {
    from: first.frame,
    to: last.frame,
    y: LINE_Y,
    line: `M${px(at(first))} ${LINE_Y}H${px(at(last))}`,
    ticks:
      [first, last].map((key) => `M${px(at(key))} ${RING_Y + RING}V${LINE_Y + TICK + 3}`).join('') +
      between.map((key) => `M${px(at(key))} ${LINE_Y - TICK}V${LINE_Y + TICK}`).join(''),
    hairs: numbers.map(({ x, y }) => `M${px(x)} ${LINE_Y + TICK + 2}V${px(y - 12)}`).join(''),
    keys: [first, last].map((key) => ({ frame: key.frame, x: at(key), y: RING_Y, rx: ring(key.frame) })),
    numbers,
    height: deepest + 2,
  }
}
