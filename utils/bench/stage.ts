import type { Moment } from '~/utils/bench/course'
import { hangs } from '~/utils/bench/laws'
import { comparedIn } from '~/utils/bench/planning'
import { sizeLabel } from '~/utils/bench/size'
import type { BenchSetup } from '~/utils/bench/setup'
import { reachOf } from '~/utils/bench/stageReach'
import type { Reach } from '~/utils/bench/stageReach'
import { BALL, drawnFor } from '~/utils/bench/stageDrawn'
import { circlePath } from '~/utils/drawing/circle'
import { textWidth } from '~/utils/drawing/labels'
import { px } from '~/utils/drawing/strokes'
import { metres } from '~/utils/drawing/words'

/** The stage on which the planned bodies move: side by side on one ground, all to one scale. */
export interface StageBody {
  planned: boolean
  label: string
  labelX: number
  labelY: number
  /** What it moves against: a brink, a ceiling, a ledge. */
  scene: string
  /** Path of action, hairline. */
  path: string
  pose: (moment: Moment) => string
}
export interface Stage {
  height: number
  ground: string
  bodies: StageBody[]
  /** A length to measure by: its line and its word; null where nothing has a length. */
  rule: { path: string; x: number; y: number; text: string } | null
}

const EDGE = 10
const APART = 20

/** The largest scale, pixels per metre, at which all stand beside each other. A column is never narrower than its word. */
function scaleFor(reaches: readonly Reach[], words: readonly number[], room: number, tall: number): number {
  const need = (scale: number) =>
    reaches.reduce((sum, { left, right }, i) => sum + Math.max(words[i]!, (left + right) * scale), (reaches.length - 1) * APART)
  const high = Math.max(...reaches.map(({ up, down }) => up + down))
  const wide = reaches.reduce((sum, { left, right }) => sum + left + right, 0)
  let [low, top] = [0, Math.min(high > 0 ? tall / high : Infinity, wide > 0 ? room / wide : Infinity)]
  if (need(top) <= room) return top
  for (let i = 0; i < 50; i++) {
    const middle = (low + top) / 2
    if (need(middle) <= room) low = middle
    else top = middle
  }
  return low
}

/** Draws the stage for a width in pixels: the planned thing and those beside it, smallest first. */
export function drawStage(setup: BenchSetup, width: number): Stage {
  if (setup.law === 'steady' || setup.law === 'slow-in') return rows(setup, width)
  const compared = comparedIn(setup)
  const setups = compared.map((each) => each.setup)
  const labels = setups.map((each) => sizeLabel(each))
  const words = labels.map((label) => textWidth(label, 13, true))
  const reaches = setups.map(reachOf)
  const room = width - 2 * EDGE - 2 * BALL
  const scale = scaleFor(reaches, words, room, width < 480 ? 200 : 260)
  const hung = hangs(setup.law)
  // What hangs is hung from one ceiling; everything else ends on one ground.
  const above = 16 + Math.max(...reaches.map(({ up, down }) => (hung ? up : up + down))) * scale
  const foot = hung ? above + Math.max(...reaches.map(({ down }) => down)) * scale + 14 : above
  const widths = reaches.map(({ left, right }, i) => Math.max(words[i]!, (left + right) * scale))
  const used = widths.reduce((sum, one) => sum + one, (widths.length - 1) * APART)
  // What is left over goes between them, so that they stand in the middle and not in a corner.
  const spare = Math.max(0, room - used) / (widths.length + 1)
  let left = EDGE + BALL + spare
  const bodies = compared.map(({ setup: one, planned }, i): StageBody => {
    const reach = reaches[i]!
    const drawn = (reach.left + reach.right) * scale
    const anchor = { x: left + (widths[i]! - drawn) / 2 + reach.left * scale, y: hung ? above : above - reach.down * scale }
    const column = { from: left - spare / 2, to: left + widths[i]! }
    const label = { planned, label: labels[i]!, labelX: left + widths[i]! / 2, labelY: foot + 22 }
    left += widths[i]! + APART + spare
    return { ...label, ...drawnFor(one, anchor, scale, Math.max(2, column.from)) }
  })
  const height = foot + 56
  const level = !hung && setup.law !== 'spin'
  return {
    height, bodies,
    ground: level ? `M${EDGE} ${px(above + 1)}H${width - EDGE}` : '',
    rule: setup.law === 'spin' ? null : ruler(scale, width, height),
  }
}

/** What goes along a level way: one row each, so that ways can be compared end to end. */
function rows(setup: BenchSetup, width: number): Stage {
  const compared = comparedIn(setup)
  const scale = (width - 2 * EDGE - 2 * BALL) / Math.max(...compared.map((each) => each.setup.way))
  const bodies = compared.map(({ setup: one, planned }, i): StageBody => {
    const y = 22 + i * 46
    const label = sizeLabel(one)
    const x = (reading: number) => EDGE + BALL + (reading / one.scale) * scale
    const end = x(one.way * one.scale)
    return {
      planned, label, labelX: EDGE + textWidth(label, 13, true) / 2, labelY: y + 24,
      scene: one.law === 'slow-in' ? `M${px(end)} ${y - 10}v20` : '',
      path: `M${px(x(0))} ${y}H${px(end)}`,
      pose: ({ reading }) => circlePath({ x: x(reading), y }, BALL),
    }
  })
  const height = 22 + compared.length * 46 + 30
  return { height, ground: '', bodies, rule: ruler(scale, width, height) }
}

const LENGTHS = [0.001, 0.002, 0.005, 0.01, 0.02, 0.05, 0.1, 0.2, 0.5, 1, 2, 5, 10, 20, 50, 100, 200, 500, 1_000]
/** The longest round length that stays short on the page. */
function ruler(scale: number, width: number, height: number): Stage['rule'] {
  const length = LENGTHS.findLast((one) => one * scale <= Math.min(110, width / 3)) ?? LENGTHS[0]!
  const y = height - 10
  const to = EDGE + length * scale
  return { path: `M${EDGE} ${y - 4}v8M${EDGE} ${y}H${px(to)}M${px(to)} ${y - 4}v8`, x: to + 8, y: y + 4, text: metres(length, 2) }
}
