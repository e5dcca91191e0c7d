import { flatAngle } from '~/utils/bench/planning'
import { atSize, subjectIn } from '~/utils/bench/setup'
import type { BenchSetup } from '~/utils/bench/setup'
import { turns } from '~/utils/claiming/form'
import { bodyPath } from '~/utils/drawing/body'
import { textWidth } from '~/utils/drawing/labels'
import { px } from '~/utils/drawing/strokes'
import type { Point } from '~/utils/drawing/strokes'
import type { ArcTrack } from '~/utils/drawing/track'
import { metres } from '~/utils/drawing/words'

/** The stage on which the planned bodies move: side by side on one ground, all to one scale. */
export interface StageBody {
  size: number
  label: string
  labelX: number
  labelY: number
  /** Path of action, hairline. */
  path: string
  /** The body at a reading (degrees, or drawing units of the setup's scale). */
  pose: (reading: number) => string
}
export interface Stage {
  height: number
  ground: string
  bodies: StageBody[]
  /** A length to measure by: its line and its word. */
  rule: { path: string; x: number; y: number; text: string }
}

/** Metres that a body takes up around its anchor: the pivot, or where a way ends. */
interface Reach { left: number; right: number; up: number; down: number }

const EDGE = 10
const APART = 20
const BALL = 6

const rad = (degrees: number) => degrees * Math.PI / 180

/** Metres from the pivot to the body's furthest point. */
function outreach(setup: BenchSetup): number {
  switch (setup.body) {
    case 'block': return Math.hypot(setup.width, setup.height)
    case 'cylinder': return Math.hypot(2 * setup.radius, setup.height)
    case 'pole': return Math.max(setup.height, setup.headHeight) * 1.06
    case 'rod': return setup.height
    case 'custom': return setup.equalLength
    default: return setup.length * 1.06
  }
}
function reachOf(setup: BenchSetup): Reach {
  if (setup.law === 'topple') {
    const out = outreach(setup)
    const behind = setup.body === 'block' ? setup.width : setup.body === 'cylinder' ? 2 * setup.radius : 0
    return { left: behind, right: out, up: out, down: 0 }
  }
  if (setup.law === 'pendulum') {
    const out = outreach(setup)
    const side = out * Math.sin(rad(Math.min(setup.amplitude, 90)))
    return { left: side, right: side, up: Math.max(0, -out * Math.cos(rad(setup.amplitude))), down: out }
  }
  if (setup.law === 'steady') return { left: 0, right: setup.way, up: 0, down: 0 }
  return { left: 0, right: setup.way * Math.cos(rad(setup.slope)), up: setup.way * Math.sin(rad(setup.slope)), down: 0 }
}

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

/** Draws the stage for a width in pixels; sizes in metres, in the order they stand in. */
export function drawStage(setup: BenchSetup, sizes: readonly number[], width: number): Stage {
  const setups = sizes.map((size) => atSize(setup, size))
  const labels = sizes.map((size) => metres(size, 3))
  const words = labels.map((label) => textWidth(label, 13, true))
  const reaches = setups.map(reachOf)
  const room = width - 2 * EDGE - 2 * BALL
  if (setup.law === 'steady') return rows(setup, setups, labels, width, room)
  const tall = width < 480 ? 200 : 260
  const scale = scaleFor(reaches, words, room, tall)
  const up = Math.max(...reaches.map((reach) => reach.up)) * scale
  const down = Math.max(...reaches.map((reach) => reach.down)) * scale
  const base = 16 + up
  const widths = reaches.map(({ left, right }, i) => Math.max(words[i]!, (left + right) * scale))
  const used = widths.reduce((sum, one) => sum + one, (widths.length - 1) * APART)
  // What is left over goes between them, so that they stand in the middle and not in a corner.
  const spare = Math.max(0, room - used) / (widths.length + 1)
  let left = EDGE + BALL + spare
  const foot = base + down + (setup.law === 'pendulum' ? 14 : 0)
  const bodies = setups.map((one, i): StageBody => {
    const reach = reaches[i]!
    const drawn = (reach.left + reach.right) * scale
    const anchor = { x: left + (widths[i]! - drawn) / 2 + reach.left * scale, y: base }
    const label = { size: sizes[i]!, label: labels[i]!, labelX: left + widths[i]! / 2, labelY: foot + 22 }
    left += widths[i]! + APART + spare
    return { ...label, ...(turns(one.law) ? turning(one, anchor, scale) : falling(one, anchor, scale)) }
  })
  const height = foot + 56
  const ground = setup.law === 'pendulum' ? '' : `M${EDGE} ${px(base + 1)}H${width - EDGE}`
  return { height, ground, bodies, rule: ruler(scale, width, height) }
}

function rows(setup: BenchSetup, setups: readonly BenchSetup[], labels: readonly string[], width: number, room: number): Stage {
  const scale = room / Math.max(...setups.map(({ way }) => way))
  const bodies = setups.map((one, i): StageBody => {
    const y = 22 + i * 46
    const x = (reading: number) => EDGE + BALL + (reading / setup.scale) * scale
    return {
      size: one.way, label: labels[i]!, labelX: EDGE + textWidth(labels[i]!, 13, true) / 2, labelY: y + 24,
      path: `M${px(x(0))} ${y}H${px(x(one.way * setup.scale))}`,
      pose: (reading) => circle({ x: x(reading), y }, BALL),
    }
  })
  const height = 22 + setups.length * 46 + 30
  return { height, ground: '', bodies, rule: ruler(scale, width, height) }
}

function turning(setup: BenchSetup, pivot: Point, scale: number): Pick<StageBody, 'path' | 'pose'> {
  const hangs = setup.law === 'pendulum'
  const length = Math.max(hangs ? 16 : 8, outreach(setup) * scale)
  const spot = (degrees: number, at: number) => {
    const way = { x: Math.sin(rad(degrees)), y: (hangs ? 1 : -1) * Math.cos(rad(degrees)) }
    return { x: pivot.x + way.x * at, y: pivot.y + way.y * at, nx: way.x, ny: way.y }
  }
  const track: ArcTrack = { kind: 'arc', pivot, radius: length, spot, path: () => '', hangs }
  const arc = (from: number, to: number) => {
    const [a, b] = [spot(from, length), spot(to, length)]
    return `M${px(a.x)} ${px(a.y)}A${px(length)} ${px(length)} 0 ${Math.abs(to - from) > 180 ? 1 : 0} ${hangs ? 0 : 1} ${px(b.x)} ${px(b.y)}`
  }
  const path = hangs
    ? `${arc(-setup.amplitude, setup.amplitude)}M${px(pivot.x - 12)} ${px(pivot.y)}h24`
    : arc(setup.lean, flatAngle(setup))
  const subject = subjectIn(setup)
  return { path, pose: (reading) => bodyPath(subject, reading, length, track, 1) + circle(pivot, 2.5) }
}

/** Down to the right; a free fall straight down. */
function falling(setup: BenchSetup, anchor: Point, scale: number): Pick<StageBody, 'path' | 'pose'> {
  const long = setup.way * scale
  const along = { x: Math.cos(rad(setup.slope)), y: Math.sin(rad(setup.slope)) }
  const top = { x: anchor.x, y: anchor.y - along.y * long }
  // The body rides on the slope, half its own width above it; in a free fall on the line itself.
  const lift = setup.slope < 90 ? BALL : 0
  const pose = (reading: number) => {
    const gone = (reading / setup.scale) * scale
    const at = { x: top.x + along.x * gone + along.y * lift, y: top.y + along.y * gone - along.x * lift }
    return circle({ x: at.x, y: setup.slope < 90 ? at.y : at.y - BALL }, BALL)
  }
  return { path: `M${px(top.x)} ${px(top.y)}L${px(top.x + along.x * long)} ${px(anchor.y)}`, pose }
}

const circle = ({ x, y }: Point, r: number) =>
  `M${px(x - r)} ${px(y)}a${r} ${r} 0 1 0 ${2 * r} 0a${r} ${r} 0 1 0 ${-2 * r} 0Z`

const LENGTHS = [0.001, 0.002, 0.005, 0.01, 0.02, 0.05, 0.1, 0.2, 0.5, 1, 2, 5, 10, 20, 50, 100, 200, 500, 1_000]
/** The longest round length that stays short on the page. */
function ruler(scale: number, width: number, height: number): Stage['rule'] {
  const length = LENGTHS.findLast((one) => one * scale <= Math.min(110, width / 3)) ?? LENGTHS[0]!
  const y = height - 10
  const to = EDGE + length * scale
  return { path: `M${EDGE} ${y - 4}v8M${EDGE} ${y}H${px(to)}M${px(to)} ${y - 4}v8`, x: to + 8, y: y + 4, text: metres(length, 2) }
}
