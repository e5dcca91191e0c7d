import { edgeIn, flightIn, planIn } from '~/utils/bench/plans'
import type { BenchSetup } from '~/utils/bench/setup'
import { plannedEdge, plannedFlight, plannedList } from '~/utils/motion'
import type { EdgeEvent, FlightEvent, Key, Place, PointKey } from '~/utils/motion'

/** How a setup's motion runs, not rounded. Frames count from 1; readings in degrees or drawing units. */
export interface Course {
  seconds: number
  /** Where it ends between two drawings. */
  frames: number
  keys: Key[]
  /** Drawing units from the hand or the brink, y down: of a flight, and of a body's centre that goes over the edge. */
  points: PointKey[] | null
  /** Where it comes to rest, or lands. */
  end: Moment
  edge: { release: EdgeEvent; landing: EdgeEvent; turnRate: number; reach: number } | null
  flight: { apex: FlightEvent | null; range: number; height: number } | null
}
/** One moment: the reading, and where the point lies, metres from the hand or the brink, y up. */
export interface Moment { reading: number; at: Place | null }

/** The course of a setup; lists of at most 2,000 drawings. */
export function courseIn(setup: BenchSetup): Course {
  if (setup.law === 'flight') return thrown(setup)
  if (setup.law === 'over-edge') return overEdge(setup)
  const plan = planIn({ ...setup, law: setup.law })
  const { keys, seconds, frames } = plannedList(plan)
  return { seconds, frames, keys, points: null, edge: null, flight: null, end: { reading: restsAt(setup, keys, seconds), at: null } }
}

function thrown(setup: BenchSetup): Course {
  const { keys, seconds, frames, apex, landing, range, height } = plannedFlight(flightIn(setup))
  return {
    seconds, frames, points: keys, edge: null, flight: { apex, range, height },
    keys: keys.map(({ frame, y }) => ({ frame, reading: y })),
    end: { reading: landing.y, at: metresOf(landing, setup.scale) },
  }
}

function overEdge(setup: BenchSetup): Course {
  const { angles, points, seconds, frames, release, landing, turnRate, reach } = plannedEdge(edgeIn(setup))
  return {
    seconds, frames, keys: angles, points, flight: null, edge: { release, landing, turnRate, reach },
    end: { reading: landing.angle, at: landing.centre },
  }
}

const metresOf = ({ x, y }: Place, scale: number): Place => ({ x: x / scale, y: -y / scale })

/** The reading at the very end: a list of two drawings, the first and the one at that moment. */
function restsAt(setup: BenchSetup, keys: readonly Key[], seconds: number): number {
  const plan = planIn({ ...setup, law: setup.law as never })
  return plannedList({ ...plan, exposure: seconds * setup.fps }).keys.at(-1)?.reading ?? keys[0]?.reading ?? 0
}

/** One moment per drawing, for bodies that move. */
export const momentsIn = (setup: BenchSetup, { keys, points }: Course): Moment[] =>
  keys.map(({ reading }, i) => ({ reading, at: points ? metresOf(points[i]!, setup.scale) : null }))


