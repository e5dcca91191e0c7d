/**
 * A rigid body over a brink, by odex from Newton's laws in plain coordinates: held by the brink while the force along its length pushes,
 * free afterwards. The moment of leaving is found by halving, not from any formula for the angle. Shares nothing with the judge.
 */
import { Solver } from './odex'
import type { OdexSolver } from './odex'

export interface EdgeBody {
  /** Metres from brink to centre of mass. */
  d: number
  /** Moment of inertia about the centre over mass, m². */
  inertia: number
  gravity: number
}

/** Metres and radians; y up from the brink. */
export interface EdgeState { t: number, angle: number, turn: number, x: number, y: number, vx: number, vy: number, free: boolean }

function solver(size: number): OdexSolver {
  const made = new Solver(size)
  made.absoluteTolerance = 1e-12
  made.relativeTolerance = 1e-12
  return made
}

/** Turning about the brink: I·θ″ = m·g·d·sin θ with I = inertia + d². */
function onBrink({ d, inertia, gravity }: EdgeBody, from: [number, number], seconds: number): [number, number] {
  if (seconds === 0) return from
  const pull = gravity * d / (inertia + d * d)
  const { y } = solver(2).solve((_t, [angle = 0, turn = 0]) => [turn, pull * Math.sin(angle)], 0, from, seconds)
  return [y[0] as number, y[1] as number]
}

/** Force along the body over mass: what of gravity is left when the circle has had its share. */
export function pressing({ d, gravity }: EdgeBody, angle: number, turn: number): number {
  return gravity * Math.cos(angle) - d * turn * turn
}

/**
 * States at every `step` seconds from (angle, turn) on, `count` of them after the first, until `stop` says so.
 * `leavesAt` (radians), given, overrules the force: the body is let go there, as no real one would. `sideways` false stops it dead
 * sideways at that moment.
 */
export function overEdgeStates(
  body: EdgeBody, angle: number, turn: number, step: number, count: number, stop: (state: EdgeState) => boolean,
  { leavesAt, sideways = true }: { leavesAt?: number, sideways?: boolean } = {},
): { states: EdgeState[], release: EdgeState | null } {
  const held = ([a, w]: [number, number]) => (leavesAt === undefined ? pressing(body, a, w) > 0 : Math.abs(a) < leavesAt)
  const circling = (t: number, [a, w]: [number, number]): EdgeState => ({
    t, angle: a, turn: w, free: false,
    x: body.d * Math.sin(a), y: body.d * Math.cos(a), vx: body.d * w * Math.cos(a), vy: -body.d * w * Math.sin(a),
  })
  const flying = (from: EdgeState, t: number): EdgeState => {
    if (t <= from.t) return { ...from, t }
    const { y } = solver(6).solve(
      (_t, [, w = 0, , , vx = 0, vy = 0]) => [w, 0, vx, vy, 0, -body.gravity], 0,
      [from.angle, from.turn, from.x, from.y, from.vx, from.vy], t - from.t,
    )
    const [a = 0, w = 0, x = 0, up = 0, vx = 0, vy = 0] = y
    return { t, angle: a, turn: w, x, y: up, vx, vy, free: true }
  }
  let now: [number, number] = [angle, turn]
  let release: EdgeState | null = null
  const letGo = (t: number, state: [number, number]) => {
    const there = circling(t, state)
    release = { ...there, vx: sideways ? there.vx : 0, free: true }
    return release
  }
  if (!held(now)) letGo(0, now)
  const states = [circling(0, now)]
  for (let i = 1; i <= count; i++) {
    const t = i * step
    if (!release) {
      const next = onBrink(body, now, step)
      if (held(next)) {
        now = next
      } else {
        let [early, late] = [0, step]
        for (let half = 0; half < 60; half++) {
          const middle = (early + late) / 2
          if (held(onBrink(body, now, middle))) early = middle
          else late = middle
        }
        letGo(t - step + late, onBrink(body, now, late))
      }
    }
    const state = release ? flying(release, t) : circling(t, now)
    states.push(state)
    if (stop(state)) break
  }
  return { states, release }
}
