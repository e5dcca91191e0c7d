import { bodyPath } from '~/utils/drawing/body'
import { textWidth } from '~/utils/drawing/labels'
import type { Anchor, Place } from '~/utils/drawing/labels'
import { passesOf } from '~/utils/drawing/passes'
import type { StripClaim, StripKey, StripLayout } from '~/utils/drawing/stripLayout'
import { TICK } from '~/utils/drawing/stripLayout'
import type { Spot } from '~/utils/drawing/strokes'
import { px } from '~/utils/drawing/strokes'
import type { ArcTrack } from '~/utils/drawing/track'
import { arcTrack, degreesOf, hangs, stands } from '~/utils/drawing/track'

const HEIGHT = 320
/** A motion that goes over the top needs room on all sides of its pivot. */
const ROUND_HEIGHT = 384
const SMALL_HEIGHT = 150

/** Something that turns about a pivot: the true arc, the body at its centre, posted ticks outside and the law's inside. */
export function stripArc(keys: readonly StripKey[], claim: StripClaim, width: number, small: boolean): StripLayout {
  const swings = hangs(claim)
  const degrees = keys.map(({ reading }) => degreesOf(claim, reading)!)
  const lawDegrees = keys.map(({ law }) => (law === null ? null : degreesOf(claim, law)))
  const all = [...degrees, ...lawDegrees.filter((one) => one !== null)]
  const [low, high] = [Math.min(...all), Math.max(...all)]
  const falls = Math.abs(high) >= Math.abs(low) ? 1 : -1
  const [from, to] = shownArc(low, high, claim, falls)

  const height = small ? SMALL_HEIGHT : to - from > 200 ? ROUND_HEIGHT : HEIGHT
  const track = arcTrack(from, to, swings, { width, height }, marginsOf(small, swings), besidePivot(claim, falls))
  const span = high - low
  const passes = passesOf(
    keys.map((_, i) => lawDegrees[i] ?? degrees[i]!),
    Math.max(span / 50, 2),
    350,
  )
  // Frame numbers stand inside the law's ticks; every lane leaves room for the widest of them.
  const widest = small ? 0 : Math.max(...keys.map(({ frame }) => textWidth(String(frame))), 12)
  const lane = small ? 2 * TICK.to + 6 : 2 * TICK.to + widest + 8
  const lanes = Math.max(1, Math.min(3, Math.floor((track.radius * 0.8) / lane)))
  const radiusOf = (i: number) => track.radius - (passes[i]! % lanes) * lane
  const used = Math.min(lanes, Math.max(0, ...passes) + 1)
  const posted = degrees.map((angle, i) => track.spot(angle, radiusOf(i)))
  const length = Math.max(12, track.radius - (used - 1) * lane - (small ? TICK.to + 8 : TICK.to + widest + 12))

  return {
    width,
    height,
    pivot: track.pivot,
    base:
      Array.from({ length: used }, (_, n) => track.path(from, to, track.radius - n * lane)).join('') +
      (swings ? ceiling(track) : stands(claim) ? ground(track, width, falls, Math.max(high * falls, low * falls)) : ''),
    posted,
    law: lawDegrees.map((angle, i) => (angle === null ? null : track.spot(angle, radiusOf(i)))),
    framePlace: (i) => {
      const spot = track.spot(lawDegrees[i] ?? degrees[i]!, radiusOf(i))
      // The box of the number, not its middle, keeps its distance from the ticks.
      const inwards = TICK.to + 4 + (Math.abs(spot.nx) * textWidth(String(keys[i]!.frame))) / 2 + Math.abs(spot.ny) * 6
      return { x: spot.x - spot.nx * inwards, y: spot.y - spot.ny * inwards + 4, anchor: 'middle' }
    },
    breakPlaces: (i) => outwards(posted[i]!),
    body: (i) => {
      const law = lawDegrees[i]
      return {
        posted: bodyPath(claim.subject, degrees[i]!, length, track, falls),
        law: law === null || law === undefined ? null : bodyPath(claim.subject, law, length, track, falls),
      }
    },
    sides: 'posted outside the arc, the law inside',
  }
}

/** The arc that is drawn: a topple's whole quarter from upright to flat, anything else as far as it goes. */
export function shownArc(low: number, high: number, claim: StripClaim, falls: 1 | -1): [number, number] {
  if (stands(claim)) return falls > 0 ? [Math.min(low, 0), Math.max(high, 90)] : [Math.min(low, -90), Math.max(high, 0)]
  if (hangs(claim)) {
    const reach = Math.max(Math.abs(low), Math.abs(high))
    return reach < 180 ? [-reach, reach] : [low, high]
  }
  return high > low ? [low, high] : [low - 1, high + 1]
}

function marginsOf(small: boolean, swings: boolean) {
  const words = small ? 26 : TICK.cross + 16
  const foot = small ? 10 : 26
  return swings
    ? { top: small ? 10 : 18, right: words, bottom: words, left: words }
    : { top: words, right: words, bottom: foot, left: words }
}

/** A standing block takes up its own width behind the pivot, in radii. */
export function besidePivot(claim: StripClaim, falls: 1 | -1): { left?: number; right?: number } {
  const subject = claim.subject
  if (!stands(claim) || !subject || !('shape' in subject)) return {}
  const size =
    subject.shape === 'block'
      ? [subject.width, subject.height]
      : subject.shape === 'cylinder'
        ? [subject.radius * 2, subject.height]
        : null
  if (!size) return {}
  const behind = (0.85 * size[0]!) / Math.hypot(size[0]!, size[1]!)
  return falls > 0 ? { left: behind } : { right: behind }
}

/** Words beyond the cross, away from the pivot; further out where it is crowded. */
function outwards(spot: Spot): Place[] {
  const places: Place[] = []
  const side: Anchor = spot.nx > 0.15 ? 'start' : spot.nx < -0.15 ? 'end' : 'middle'
  for (const further of [12, 24, 38, 54, 72]) {
    const out = TICK.cross + further
    const at = { x: spot.x + spot.nx * out, y: spot.y + spot.ny * out + 4 }
    places.push({ ...at, anchor: side })
    if (side !== 'middle') places.push({ ...at, anchor: 'middle' })
    else places.push({ x: at.x + 9, y: at.y + 10, anchor: 'start' }, { x: at.x - 9, y: at.y + 10, anchor: 'end' })
  }
  return places
}

/** The floor a body falls to; a brink where it goes on past flat. */
export function ground(track: ArcTrack, width: number, falls: 1 | -1, furthest: number): string {
  const { pivot, radius } = track
  const far = (sideways: number) => Math.min(Math.max(pivot.x + sideways, 4), width - 4)
  const behind = far(-falls * radius * 0.6)
  if (furthest > 92) return `M${px(behind)} ${px(pivot.y)}H${px(pivot.x)}v${px(radius * 0.35)}`
  return `M${px(behind)} ${px(pivot.y)}H${px(far(falls * (radius + 24)))}`
}

/** What a pendulum hangs from. */
export function ceiling({ pivot, radius }: ArcTrack): string {
  const half = Math.min(36, radius * 0.2)
  return `M${px(pivot.x - half)} ${px(pivot.y)}h${px(2 * half)}`
}
