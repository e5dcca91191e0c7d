import type { PlayedAnswer, PlayedClaim } from '~/utils/drawing/play/stage'
import type { Point } from '~/utils/drawing/strokes'
import type { Subject } from '~/utils/motion/types'

/**
 * Where the foot of a body is that has gone over an edge. Until it leaves, on the brink; then its centre flies a parabola with the
 * speed that it left with (motion.md, "Leaving the edge"). A list of angles says nothing of where a drawing has the body: both posted
 * and ruled fly as the law does. Lengths in units of pivot to furthest point, x the way it falls, y down.
 */

/** Pivot to centre of mass, as a share of pivot to furthest point. */
function centreShare(subject: Subject | undefined): number {
  if (!subject || !('shape' in subject) || subject.shape !== 'pole') return 0.5
  const { height, mass, headMass, headHeight } = subject
  return (mass * height / 2 + headMass * headHeight) / (mass + headMass) / Math.max(height, headHeight)
}

/** Foot per drawing; null where the list never leaves the edge, or the law found no release. */
export function overTheEdge({ keys, figures = [] }: PlayedAnswer, claim: PlayedClaim, falls: 1 | -1): ((index: number) => Point) | null {
  const release = figures.find(({ kind }) => kind === 'release')?.value
  const angle = figures.find(({ kind }) => kind === 'release-angle')?.value
  const last = keys.at(-1)
  if (claim.law !== 'over-edge' || release === undefined || angle === undefined || !last || last.frame <= release) return null
  const before = keys.at(-2)
  if (!before || last.law === null || before.law === null) return null

  // It turns at a constant rate from there on: radians per frame.
  const rate = (Math.abs(last.law - before.law) / (last.frame - before.frame)) * (Math.PI / 180)
  const left = (Math.abs(angle) * Math.PI) / 180
  const d = centreShare(claim.subject)
  // The edge carries no more when what gravity asks along the body is all that the turning takes: g cos θ = d θ′².
  const pull = (d * rate ** 2) / Math.max(Math.cos(left), 0.05)
  return (index) => {
    const key = keys[index]
    const gone = key ? key.frame - release : 0
    if (!key || gone <= 0) return { x: 0, y: 0 }
    const centre = { x: d * (Math.sin(left) + rate * Math.cos(left) * gone), y: d * (rate * Math.sin(left) * gone - Math.cos(left)) + (pull * gone ** 2) / 2 }
    const turned = left + rate * gone
    return { x: falls * (centre.x - d * Math.sin(turned)), y: centre.y + d * Math.cos(turned) }
  }
}
