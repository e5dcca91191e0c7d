import { courseIn } from '~/utils/bench/course'
import { cornersAt } from '~/utils/bench/ground'
import { hangs } from '~/utils/bench/laws'
import { subjectIn } from '~/utils/bench/setup'
import type { BenchSetup } from '~/utils/bench/setup'
import { edgeMotion } from '~/utils/motion'

/** Metres that a motion takes up around its anchor: the pivot, the hand, the brink, or where a way ends. */
export interface Reach { left: number; right: number; up: number; down: number }

const rad = (degrees: number) => (degrees * Math.PI) / 180

/** Metres from the pivot to the body's furthest point, as drawn. */
export function outreach(setup: BenchSetup): number {
  switch (setup.body) {
    case 'block': return Math.hypot(setup.width, setup.height)
    case 'cylinder': return Math.hypot(2 * setup.radius, setup.height)
    case 'pole': return Math.max(setup.height, setup.headHeight) * 1.06
    case 'rod': return setup.height
    case 'custom': return setup.equalLength
    default: return setup.length * 1.06
  }
}

export function reachOf(setup: BenchSetup): Reach {
  const { law } = setup
  if (law === 'over-edge') return overEdge(setup)
  if (law === 'topple') {
    const out = outreach(setup)
    return { left: behind(setup), right: out, up: out, down: 0 }
  }
  if (hangs(law)) {
    const out = outreach(setup)
    const side = out * Math.sin(rad(Math.min(setup.amplitude, 90)))
    return { left: side, right: side, up: Math.max(0, -out * Math.cos(rad(setup.amplitude))), down: out }
  }
  if (law === 'spin') return { left: 1, right: 1, up: 1, down: 1 }
  if (law === 'flight') {
    const { range, height } = courseIn(setup).flight!
    return { left: 0, right: range, up: height, down: setup.landing }
  }
  if (law === 'bounce') return { left: 0, right: 0, up: setup.way, down: 0 }
  return { left: 0, right: setup.way * Math.cos(rad(setup.slope)), up: setup.way * Math.sin(rad(setup.slope)), down: 0 }
}

/** What stands broad takes up its own width behind the pivot. */
const behind = ({ body, width, radius }: BenchSetup) => (body === 'block' ? width : body === 'cylinder' ? 2 * radius : 0)

const LOOKS = 48
/** As far as any corner gets on the way down; the brink itself shows some ground to stand on. */
function overEdge(setup: BenchSetup): Reach {
  const { seconds } = courseIn(setup)
  const subject = subjectIn(setup)
  const motion = edgeMotion(subject, setup.lean)
  const out = outreach(setup)
  let [right, up] = [0, out]
  const leaves = motion.release.tau / motion.k
  for (let i = 0; i <= LOOKS; i++) {
    const { angle, centre } = motion.at(leaves + ((seconds - leaves) * i) / LOOKS)
    const pivot = { x: centre.x - motion.reach * Math.sin(rad(angle)), y: centre.y - motion.reach * Math.cos(rad(angle)) }
    for (const { x, y } of cornersAt(subject, angle)) [right, up] = [Math.max(right, pivot.x + x), Math.max(up, pivot.y + y)]
  }
  return { left: Math.max(behind(setup), out * 0.3), right, up, down: setup.brink }
}
