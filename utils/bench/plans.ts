import { touchesAfter } from '~/utils/bench/ground'
import type { BenchLaw } from '~/utils/bench/laws'
import { ownGravityOf, subjectIn } from '~/utils/bench/setup'
import type { BenchSetup } from '~/utils/bench/setup'
import { roundFigure } from '~/utils/drawing/words'
import { uprightLean } from '~/utils/motion'
import type { EdgePlan, FlightPlan, PathSubject, Plan } from '~/utils/motion'

/** What lies on the bench, as the motion sheet's own plans: metres, degrees, drawing units. */

/** A body lies flat where its own side meets the ground: sooner than 90° past balance for what stands broad. */
export const flatAngle = (setup: BenchSetup) => 90 - uprightLean(subjectIn(setup))

export const pathIn = (setup: BenchSetup): PathSubject & { unitsPerMetre: number } => ({
  unitsPerMetre: setup.scale,
  ...(setup.law === 'odd-rule' ? { slope: setup.slope, roll: setup.roll } : {}),
  ...ownGravityOf(setup),
})

/** Seconds from the first drawing of a slow in until it stands: way = ½·speed·seconds. */
export const stopsAfter = (setup: BenchSetup) => (setup.by === 'seconds' ? setup.stopAfter : (2 * setup.way) / setup.startSpeed)
/** m/s at the first drawing of a slow in. */
export const startsWith = (setup: BenchSetup) => (setup.by === 'speed' ? setup.startSpeed : (2 * setup.way) / setup.stopAfter)

/** The plan of a law that is told by readings. */
export function planIn(setup: BenchSetup & { law: Exclude<BenchLaw, 'flight' | 'over-edge'> }): Plan {
  const paper = { fps: setup.fps, exposure: setup.on }
  const travel = setup.way * setup.scale
  switch (setup.law) {
    case 'topple': return { ...paper, law: 'topple', subject: subjectIn(setup), lean: setup.lean, to: flatAngle(setup) }
    case 'pendulum': return { ...paper, law: 'pendulum', subject: subjectIn(setup), amplitude: setup.amplitude, swings: setup.swings }
    case 'swing-decay':
      return { ...paper, law: 'swing-decay', subject: subjectIn(setup), amplitude: setup.amplitude, swings: setup.swings, share: setup.lost / 100 }
    case 'odd-rule': return { ...paper, law: 'odd-rule', subject: pathIn(setup), travel }
    case 'bounce':
      // The fall before the first contact is no hop.
      return { ...paper, law: 'bounce', subject: pathIn(setup), drop: travel, restitution: setup.back / 100, bounces: setup.bounces - 1 }
    case 'slow-in': return { ...paper, law: 'slow-in', travel, seconds: stopsAfter(setup) }
    case 'steady': return { ...paper, law: 'steady', travel, seconds: setup.way / setup.speed }
    case 'spin': return { ...paper, law: 'spin', turns: setup.turns, turnsPerSecond: setup.rate }
  }
}

/** The throw, from the hand. */
export const flightIn = (setup: BenchSetup): FlightPlan => ({
  subject: pathIn(setup), throw: { speed: setup.throwSpeed, angle: setup.throwAngle }, drop: setup.landing, fps: setup.fps, exposure: setup.on,
})

/** The fall from the brink until the body's lowest point meets the ground: the centre is then `drop` below the brink. */
export function edgeIn(setup: BenchSetup): EdgePlan {
  const subject = subjectIn(setup)
  const { drop } = touchesAfter(subject, setup.lean, setup.brink)
  return { subject, lean: setup.lean, drop, fps: setup.fps, exposure: setup.on, unitsPerMetre: setup.scale }
}

/** Degrees: nearer to the top a swing hangs there, and no plan says how it dies. */
const WIDEST_DYING = 165

/** What keeps a setup from moving at all, in one sentence; null where nothing does. */
export function problemIn(setup: BenchSetup): string | null {
  if (setup.law === 'topple') {
    const flat = flatAngle(setup)
    return setup.lean < flat ? null : `This body lies flat ${roundFigure(flat, 3)}° past balance: lean it less than that.`
  }
  if (setup.law === 'swing-decay' && setup.amplitude > WIDEST_DYING) return `A swing that dies is let go ${WIDEST_DYING}° from hanging at most.`
  if (setup.law === 'flight' && setup.landing === 0 && setup.throwAngle <= 0) return 'Thrown level or downward, it needs a drop to land in.'
  if (setup.law !== 'over-edge') return null
  const { tooSoon } = touchesAfter(subjectIn(setup), setup.lean, setup.brink)
  return tooSoon ? 'The ground is so near that the body lies on it before it lets go of the brink: put the brink higher.' : null
}
