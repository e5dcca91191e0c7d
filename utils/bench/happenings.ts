import type { Course } from '~/utils/bench/course'
import { flatAngle, startsWith, stopsAfter } from '~/utils/bench/plans'
import { gravityIn } from '~/utils/bench/setup'
import type { BenchSetup } from '~/utils/bench/setup'
import { figure, metres, roundFigure, withUnit } from '~/utils/drawing/words'

/** What happens on the way, and how much of it: one line each, in the order in which it comes. */
export interface Happening {
  what: string
  /** How much: a height, an angle, a rate. */
  much: string
  /** Frame's number, whole or not; null for what goes on all the time. */
  frame: number | null
}

export function happeningsIn(setup: BenchSetup, course: Course): Happening[] {
  switch (setup.law) {
    case 'over-edge': return overEdge(course.edge!)
    case 'flight': return thrown(setup, course)
    case 'bounce': return contacts(setup)
    case 'slow-in': return [
      { what: 'Starts with', much: `${roundFigure(startsWith(setup), 3)} m/s`, frame: null },
      { what: 'Stands', much: `after ${figure(stopsAfter(setup), 2)} s`, frame: 1 + course.frames },
    ]
    case 'swing-decay': return dying(setup, course)
    case 'spin': return turning(setup)
    default: return []
  }
}

function overEdge({ release, landing, turnRate }: NonNullable<Course['edge']>): Happening[] {
  return [
    { what: 'Lets go of the brink', much: `at ${withUnit(release.angle, 'deg')} from balance`, frame: release.frame },
    { what: 'Turns on in the air', much: `at ${roundFigure(Math.abs(turnRate) / 360, 3)} turns/s`, frame: null },
    { what: 'Touches the ground', much: `turned to ${withUnit(landing.angle, 'deg')}`, frame: landing.frame },
  ]
}

function thrown(setup: BenchSetup, { flight, frames }: Course): Happening[] {
  const { apex, range, height } = flight!
  const sideways = setup.throwSpeed * Math.cos((setup.throwAngle * Math.PI) / 180)
  return [
    ...(apex ? [{ what: 'Apex', much: `${metres(height, 3)} above the hand`, frame: apex.frame }] : []),
    { what: 'Lands', much: `${metres(range, 3)} away`, frame: 1 + frames },
    { what: 'Sideways', much: `${roundFigure((sideways * setup.scale * setup.on) / setup.fps, 3)} px from drawing to drawing`, frame: null },
  ]
}

/** More contacts than this are told by their number alone. */
const MOST_CONTACTS = 6

/** The fall takes √(2h/g); each flight after it twice that times the share of the speed that is left. */
function contacts(setup: BenchSetup): Happening[] {
  const e = setup.back / 100
  const fall = Math.sqrt((2 * setup.way) / gravityIn(setup))
  const told: Happening[] = []
  let seconds = fall
  for (let n = 1; n <= Math.min(setup.bounces, MOST_CONTACTS); n++) {
    const up = setup.way * e ** (2 * n)
    told.push({ what: `Contact ${n}`, much: n < setup.bounces ? `comes back to ${metres(up, 3)}` : 'the last', frame: 1 + seconds * setup.fps })
    seconds += 2 * fall * e ** n
  }
  if (setup.bounces > MOST_CONTACTS) told.push({ what: `${setup.bounces - MOST_CONTACTS} more`, much: 'each lower and sooner', frame: null })
  return told
}

function dying(setup: BenchSetup, { frames }: Course): Happening[] {
  const share = 1 - setup.lost / 100
  return [
    { what: 'Amplitude left', much: withUnit(setup.amplitude * share ** setup.swings, 'deg'), frame: 1 + frames },
    { what: 'Half of it', much: `after ${roundFigure(Math.log(0.5) / Math.log(share), 3)} swings`, frame: null },
  ]
}

function turning(setup: BenchSetup): Happening[] {
  const step = (setup.rate * 360 * setup.on) / setup.fps
  return [
    { what: 'From drawing to drawing', much: withUnit(step, 'deg'), frame: null },
    ...(step > 180 ? [{ what: 'More than half a turn each', much: 'it reads as turning the other way', frame: null }] : []),
    { what: 'One turn', much: `${roundFigure(setup.fps / setup.rate, 3)} frames`, frame: null },
  ]
}

/**
 * Where a broad body's topple ends, in a sentence: its side meets the ground before its middle is down at 90°, where the law ends for
 * the judge. Null where the two are the same.
 */
export function endsEarly(setup: BenchSetup): string | null {
  if (setup.law !== 'topple') return null
  const flat = flatAngle(setup)
  if (90 - flat < 0.05) return null
  const behind = withUnit(90 - flat, 'deg')
  return `Planned until its side meets the ground, ${withUnit(flat, 'deg')} past balance: 90° less the ${behind} by which its middle stands behind the edge when it stands square. The judge counts a topple up to 90°, however broad the body.`
}
