import type { Law } from '~/utils/motion/types'

/**
 * A law's own spacing as a small drawing: the path, and a tick across it for every drawing at even steps of time. Made by the law's
 * formula, so that the card never says of a law what it does not do.
 */
export interface LawPicture {
  /** The path of action, and the ground where there is one, SVG. */
  path: string
  /** The ticks, SVG. */
  ticks: string
}
export const PICTURE = { width: 120, height: 48 } as const

type Point = readonly [x: number, y: number]
const DRAWINGS = 8
const FINE = 96
const TICK = 3.5

/** A motion over time 0 to 1, on a drawing with y down. */
type Motion = (time: number) => Point

const DEGREE = Math.PI / 180
/** A place on a circle, the angle counted from straight up, to the right. */
const around = ([x, y]: Point, radius: number, angle: number): Point => [x + radius * Math.sin(angle), y - radius * Math.cos(angle)]
const along = (share: number): Point => [6 + 108 * share, 24]

/** A topple without a push is on the line between falling back and going over: tan(θ/4) grows as e^(kt) (θ″ = k² sin θ, θ′ = 2k sin(θ/2)). */
const toppling = (time: number, from: number, to: number) => {
  const [a, b] = [Math.tan(from / 4), Math.tan(to / 4)]
  return 4 * Math.atan(a * (b / a) ** time)
}

const bounceShares = (() => {
  // Lengths of the hops in time: down from rest, then up and down with e of the speed each time.
  const e = 0.72
  const lengths = [1, 2 * e, 2 * e * e]
  const whole = lengths.reduce((sum, one) => sum + one, 0)
  return { e, lengths, whole }
})()
/** Height over the floor, of the height let go from: each hop reaches e² of the one before. */
function bouncing(time: number): number {
  const { e, lengths, whole } = bounceShares
  let left = time * whole
  for (const [hop, length] of lengths.entries()) {
    if (left <= length || hop === lengths.length - 1) return hop === 0 ? 1 - left * left : e ** (2 * hop) - (left - e ** hop) ** 2
    left -= length
  }
  return 0
}

const BRINK: Point = [46, 20]
const LEAN = 8 * DEGREE
/** A rod on a brink goes from upright along its arc, lets go where cos θ = 3/5, and flies on with the speed that it has there, turning evenly. */
function overEdge(time: number): Point {
  const [length, leave, turning] = [18, Math.acos(3 / 5), 0.6]
  if (time <= turning) return around(BRINK, length, toppling(time / turning, LEAN, leave))
  const start = around(BRINK, length, leave)
  // Speed at the end of the turn, per unit of time: θ′ = 2k sin(θ/2), with k of the topple above; θ″ there gives the fall its gravity.
  const k = Math.log(Math.tan(leave / 4) / Math.tan(LEAN / 4)) / turning
  const speed = 2 * k * Math.sin(leave / 2) * length
  const gravity = k * k * length * (4 / 3)
  const t = time - turning
  return [start[0] + speed * Math.cos(leave) * t, start[1] + speed * Math.sin(leave) * t + (gravity * t * t) / 2]
}

const motions: Record<Law, Motion> = {
  'odd-rule': (t) => along(t * t),
  'slow-in': (t) => along(1 - (1 - t) ** 2),
  steady: along,
  bounce: (t) => [8 + 104 * t, 44 - 38 * bouncing(t)],
  flight: (t) => [8 + 104 * t, 44 - 38 * 4 * t * (1 - t)],
  topple: (t) => around([28, 44], 40, toppling(t, 2 * DEGREE, 88 * DEGREE)),
  pendulum: (t) => around([60, 0], -42, 50 * DEGREE * Math.cos(Math.PI * t)),
  // Three swings, each with the same share of the one before; the cord grows a little, so that they lie side by side.
  'swing-decay': (t) => around([60, -20], -(40 + 24 * t), 56 * DEGREE * 0.4 ** t * Math.cos(3 * Math.PI * t)),
  spin: (t) => around([60, 24], 19, 2 * Math.PI * t * ((DRAWINGS - 1) / DRAWINGS)),
  'over-edge': overEdge,
}
/** More drawings where the path is longer than one sweep. */
const counts: Partial<Record<Law, number>> = { bounce: 16, 'swing-decay': 16, 'over-edge': 10, flight: 9 }
/** What the motion happens on, where a path alone would not say it. */
const grounds: Partial<Record<Law, string>> = { 'over-edge': `M18 ${BRINK[1]}H${BRINK[0]}V48`, bounce: 'M2 44H118' }

const figure = (value: number) => String(Number(value.toFixed(2)))
const place = ([x, y]: Point) => `${figure(x)} ${figure(y)}`

/** The picture of a law, in a box of `PICTURE`. */
export function lawPicture(law: Law): LawPicture {
  const motion = motions[law]
  const fine = Array.from({ length: FINE + 1 }, (_, i) => motion(i / FINE))
  if (law === 'spin') fine.push(fine[0]!)
  const count = counts[law] ?? DRAWINGS
  const ticks = Array.from({ length: count }, (_, i) => tickAcross(motion, i / (count - 1)))
  return { path: `M${fine.map(place).join('L')}${grounds[law] ?? ''}`, ticks: ticks.join('') }
}

function tickAcross(motion: Motion, time: number): string {
  const [before, here, after] = [motion(Math.max(0, time - 1e-3)), motion(time), motion(Math.min(1, time + 1e-3))]
  const [dx, dy] = [after[0] - before[0], after[1] - before[1]]
  const size = Math.hypot(dx, dy) || 1
  const [nx, ny] = [(-dy / size) * TICK, (dx / size) * TICK]
  return `M${place([here[0] - nx, here[1] - ny])}L${place([here[0] + nx, here[1] + ny])}`
}
