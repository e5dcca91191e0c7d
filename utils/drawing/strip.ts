import type { Box, Placed, Wanted } from '~/utils/drawing/labels'
import { placeLabels, spreadOrder } from '~/utils/drawing/labels'
import { stripArc } from '~/utils/drawing/stripArc'
import { TICK } from '~/utils/drawing/stripLayout'
import type { StripClaim, StripKey, StripLayout, StripPaths } from '~/utils/drawing/stripLayout'
import { stripLine } from '~/utils/drawing/stripLine'
import { noJoints, stripJoints } from '~/utils/drawing/stripJoints'
import type { StripJoints } from '~/utils/drawing/stripJoints'
import { offPathMarks, stripPath } from '~/utils/drawing/stripPath'
import type { Point, Spot } from '~/utils/drawing/strokes'
import { crossesPath, dotsPath, keepApart, px, ticksPath } from '~/utils/drawing/strokes'
import { turns } from '~/utils/drawing/track'
import { earlyOrLate } from '~/utils/drawing/words'

/** The strip: the path of action with a tick per drawing, the posted ones on one side and the law's on the other. */

export type { StripClaim, StripKey } from '~/utils/drawing/stripLayout'

/** Where one drawing stands on the strip, and what is shown while the cursor is on it. */
export interface StripCursor {
  posted: Spot
  law: Spot | null
  postedBody: string | null
  lawBody: string | null
}
export interface StripDrawing {
  width: number
  height: number
  /** The path of action itself, ground and turns: hairlines. */
  base: string
  pivot: Point | null
  posted: string
  law: string
  broken: string
  crosses: string
  leaders: string
  /** Posted drawings that are points on the paper: dots, to be stroked with round caps. */
  dots: string
  brokenDots: string
  /** Drawings off the path: a shape round each, and a hair to the path. */
  offPath: { rings: string; hairs: string }
  joints: StripJoints
  frames: Placed<number>[]
  breaks: Placed<number>[]
  /** One per key, for finding the drawing nearest to a pointer. */
  spots: Spot[]
  cursorAt: (index: number) => StripCursor | null
  /** Which side is whose, for the caption. */
  sides: string
}

const CROSS_ARM = 4.5

/** How plainly a drawing breaks: its offset in allowances. */
const severity = (key: StripKey) => Math.abs(key.offset ?? key.reading - (key.law ?? key.reading)) / (key.allowance || 1)

/**
 * Draws the strip of a list for a width in pixels. `small` leaves the words out: for the sheets of the wall. `found` is what the
 * judge found besides the drawings.
 */
export function drawStrip(keys: readonly StripKey[], claim: StripClaim, width: number, small = false, found: StripPaths = {}): StripDrawing {
  const layout = layOut(keys, claim, width, small, found)
  const broken = keys.map((key, i) => ({ key, i })).filter(({ key }) => key.breaks)
  const crossAt = (i: number): Point => {
    const spot = layout.posted[i]!
    const out = small ? TICK.to + 8 : TICK.cross
    return { x: spot.x + spot.nx * out, y: spot.y + spot.ny * out }
  }
  const crosses = keepApart(
    broken.map(({ i }) => crossAt(i)),
    small ? 9 : 11,
  )
  const joints = small ? noJoints : stripJoints(keys, layout, found)
  const words = small ? { frames: [], breaks: [] } : placeWords(keys, layout, crosses, broken, joints)
  const held = layout.posted.filter((_, i) => !keys[i]!.breaks)
  return {
    width,
    height: layout.height,
    base: layout.base,
    pivot: layout.pivot,
    posted: layout.dots ? '' : ticksPath(held, TICK.from, TICK.to),
    dots: layout.dots ? dotsPath(held) : '',
    brokenDots: layout.dots ? dotsPath(broken.map(({ i }) => layout.posted[i]!)) : '',
    offPath: offPathMarks(layout.offPath ?? []),
    joints,
    law: ticksPath(
      layout.law.filter((spot) => spot !== null),
      -TICK.from,
      -TICK.to,
    ),
    broken: ticksPath(
      broken.map(({ i }) => layout.posted[i]!),
      layout.dots ? 6 : TICK.from,
      small ? TICK.to : TICK.broken,
    ),
    crosses: crossesPath(crosses, CROSS_ARM),
    leaders: leadersPath(words.breaks, crossAt),
    ...words,
    spots: layout.posted,
    cursorAt: (index) => {
      const posted = layout.posted[index]
      if (!posted) return null
      const body = layout.body(index)
      return { posted, law: layout.law[index] ?? null, postedBody: body?.posted ?? null, lawBody: body?.law ?? null }
    },
    sides: layout.sides,
  }
}

function layOut(keys: readonly StripKey[], claim: StripClaim, width: number, small: boolean, found: StripPaths): StripLayout {
  if (keys.some(({ point }) => point)) return stripPath(keys, claim, width, small, found)
  return turns(claim) ? stripArc(keys, claim, width, small) : stripLine(keys, claim, width, small, found)
}

/** Numbers of frames along the law's side and words at the worst of the breaking drawings: none touches another. */
function placeWords(
  keys: readonly StripKey[],
  layout: StripLayout,
  crosses: readonly Point[],
  broken: { key: StripKey; i: number }[],
  joints: StripJoints,
): { frames: Placed<number>[]; breaks: Placed<number>[] } {
  const bounds: Box = { x: 1, y: 1, width: layout.width - 2, height: layout.height - 2 }
  const frames = placeLabels<number>(
    spreadOrder(keys.length).map((i) => ({ item: i, text: String(keys[i]!.frame), places: [layout.framePlace(i)] })),
    bounds,
    joints.words.map(({ box }) => box),
    { gap: 8 },
  )
  const every = Math.ceil(layout.posted.length / 400)
  const ticks = layout.posted
    .filter((_, i) => i % every === 0)
    .map((s) => ({ x: s.x + s.nx * TICK.to - 2, y: s.y + s.ny * TICK.to - 2, width: 4, height: 4 }))
  const marks = crosses.map(({ x, y }) => ({ x: x - CROSS_ARM, y: y - CROSS_ARM, width: 2 * CROSS_ARM, height: 2 * CROSS_ARM }))
  const strayed = new Set(layout.offPath?.map(({ index }) => index))
  // On a path that bends, words for each of a run would lie across the drawings: the first of the run speaks for it.
  const telling = layout.dots ? broken.filter(({ i }) => !keys[i - 1]?.breaks) : broken
  const wanted: Wanted<number>[] = [...telling]
    .sort((a, b) => severity(b.key) - severity(a.key))
    .slice(0, 60)
    .map(({ key, i }) => {
      const off = strayed.has(i) ? 'off the path' : earlyOrLate(key.offsetFrames ?? null)
      const text = off ? `${key.frame} · ${off}` : String(key.frame)
      return { item: i, text, places: layout.breakPlaces(i, text) }
    })
  const breaks = placeLabels(wanted, bounds, [...marks, ...ticks, ...[...frames, ...joints.words].map(({ box }) => box)], {
    bold: true,
    most: layout.width < 480 ? 4 : 8,
  })
  return { frames, breaks }
}

/** A hair from a cross to its words where they had to move away from it. */
function leadersPath(labels: readonly Placed<number>[], crossAt: (i: number) => Point): string {
  return labels
    .map(({ item, box }) => {
      const from = crossAt(item)
      const to = {
        x: Math.min(Math.max(from.x, box.x + 4), box.x + box.width - 4),
        y: from.y > box.y + box.height / 2 ? box.y + box.height + 1 : box.y - 1,
      }
      return Math.hypot(from.x - to.x, from.y - to.y) < 18 ? '' : `M${px(from.x)} ${px(from.y)}L${px(to.x)} ${px(to.y)}`
    })
    .join('')
}

/** Position of the key whose posted tick lies nearest to a point. */
export function nearestSpot(spots: readonly Spot[], at: Point): number {
  let best = -1
  let least = Number.POSITIVE_INFINITY
  spots.forEach((spot, i) => {
    const far = (spot.x - at.x) ** 2 + (spot.y - at.y) ** 2
    if (far < least) [best, least] = [i, far]
  })
  return best
}
