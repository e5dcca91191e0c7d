import { textWidth } from '~/utils/drawing/labels'
import type { Anchor, Place as LabelPlace } from '~/utils/drawing/labels'
import { pathShape } from '~/utils/drawing/pathShape'
import type { StripClaim, StripKey, StripLayout, StripPaths } from '~/utils/drawing/stripLayout'
import { TICK } from '~/utils/drawing/stripLayout'
import type { Point, Spot } from '~/utils/drawing/strokes'
import { px } from '~/utils/drawing/strokes'
import type { FoundPath, Place } from '~/utils/motion/types'

const TALLEST = 340
const SMALL = 150
/** A level path still leaves room for the words over and under it. */
const LOWEST = 120
const WORTH_A_PIVOT = 0.6

/** The true path of action on the drawing: posted points where they are, the law's ticks across the path. */
export function stripPath(keys: readonly StripKey[], claim: StripClaim, width: number, small: boolean, { path = null, spans, findings = [] }: StripPaths): StripLayout {
  const up = claim.yAxis === 'up'
  const onPaper = keys.map(({ point, reading }) => point ?? { x: reading, y: 0 })
  const lawful = keys.map(({ lawPoint }) => lawPoint ?? null)
  const places = [...onPaper, ...lawful.filter((one) => one !== null)]
  const inside = { x: small ? 16 : Math.min(64, width * 0.12), y: small ? 18 : 60 }
  const pivot = path?.kind === 'circle' && !path.nearlyStraight ? path.centre : null
  const room = { x: width - 2 * inside.x, y: (small ? SMALL : TALLEST) - 2 * inside.y }
  const fit = (box: { width: number; height: number }) => Math.min(room.x / Math.max(box.width, 1e-9), room.y / Math.max(box.height, 1e-9))
  const [bare, whole] = [boxOf(places, up), boxOf(pivot ? [...places, pivot] : places, up)]
  // A pivot that would make the drawings small stays off the paper.
  const box = fit(whole) >= WORTH_A_PIVOT * fit(bare) ? whole : bare
  const scale = fit(box)
  const height = small ? SMALL : Math.max(LOWEST, Math.ceil(box.height * scale) + 2 * inside.y)
  const left = inside.x + (room.x - box.width * scale) / 2
  const top = (height - box.height * scale) / 2
  const to = ({ x, y }: Place): Point => ({ x: left + (x - box.left) * scale, y: top + ((up ? -y : y) - box.top) * scale })

  const spot = (i: number, place: Place): Spot => ({ ...to(place), ...normalAt(i, place, lawful, onPaper, spans ? null : path, up) })
  const posted = onPaper.map((place, i) => spot(i, place))
  const law = lawful.map((place, i) => (place ? spot(i, place) : null))
  const shown = lawful.some(Boolean) ? lawful.filter((one) => one !== null) : onPaper
  const centre = pivot ? to(pivot) : null
  const off = new Set(findings.flatMap(({ kind, frames }) => (kind === 'off-path' ? frames : [])))

  return {
    width,
    height,
    pivot: centre && centre.y > 0 && centre.y < height && centre.x > 0 && centre.x < width ? centre : null,
    base: pathShape(spans ? null : path, shown, to),
    posted,
    law,
    dots: true,
    framePlace: (i) => {
      const { x, y, nx, ny } = law[i] ?? posted[i]!
      const out = TICK.to + 5 + (Math.abs(nx) * textWidth(String(keys[i]!.frame))) / 2 + Math.abs(ny) * 6
      return { x: x - nx * out, y: y - ny * out + 4, anchor: 'middle' }
    },
    breakPlaces: (i) => beside(posted[i]!),
    body: () => null,
    offPath: posted.flatMap((at, i) => (off.has(keys[i]!.frame) ? [{ index: i, from: at, to: law[i] ?? at }] : [])),
    sides: 'posted as dots where they are drawn, the law as ticks on the path',
  }
}

function boxOf(places: readonly Place[], up: boolean) {
  const xs = places.map(({ x }) => x)
  const ys = places.map(({ y }) => (up ? -y : y))
  const [left, top] = [Math.min(...xs), Math.min(...ys)]
  return { left, top, width: Math.max(...xs) - left, height: Math.max(...ys) - top }
}

/** Unit direction that points away from the path, in pixels: outwards of a circle, up from a level path. */
function normalAt(i: number, at: Place, lawful: readonly (Place | null)[], posted: readonly Place[], path: FoundPath | null, up: boolean): { nx: number; ny: number } {
  const flip = up ? -1 : 1
  if (path?.kind === 'circle') return unit(at.x - path.centre.x, (at.y - path.centre.y) * flip)
  const along = path?.kind === 'line' ? { x: path.to.x - path.from.x, y: path.to.y - path.from.y }
    : path?.kind === 'parabola' ? { x: 1, y: 2 * path.bend * (at.x - path.apex.x) }
      : chord(i, lawful, posted)
  // Of the two sides of the way, the upper one; of an upright way, the right one.
  const side = unit(along.y * flip, -along.x)
  return side.ny > 1e-6 || (Math.abs(side.ny) <= 1e-6 && side.nx < 0) ? { nx: -side.nx, ny: -side.ny } : side
}

function chord(i: number, lawful: readonly (Place | null)[], posted: readonly Place[]): Point {
  const at = (n: number) => lawful[n] ?? posted[n]
  const [before, here, after] = [at(i - 1), at(i)!, at(i + 1)]
  const whole = { x: (after ?? here).x - (before ?? here).x, y: (after ?? here).y - (before ?? here).y }
  if (Math.hypot(whole.x, whole.y) > 0) return whole
  return { x: 1, y: 0 }
}

function unit(x: number, y: number): { nx: number; ny: number } {
  const long = Math.hypot(x, y)
  return long > 0 ? { nx: x / long, ny: y / long } : { nx: 0, ny: -1 }
}

/** Words beyond the cross, on the posted side; further out, then on the other side, where it is crowded. */
function beside({ x, y, nx, ny }: Spot): LabelPlace[] {
  const places: LabelPlace[] = []
  for (const side of [1, -1])
    for (const further of [15, 30, 46, 64]) {
      const out = side * (TICK.cross + further)
      const [dx, dy] = [nx * out, ny * out]
      const anchor: Anchor = dx > 6 ? 'start' : dx < -6 ? 'end' : 'middle'
      places.push({ x: x + dx, y: y + dy + 4, anchor }, { x: x + dx, y: y + dy + 4, anchor: 'middle' })
    }
  return places
}

/** Rings round the drawings that sit off the path, with a hair to where the law puts them. */
export const offPathMarks = (marks: readonly { from: Point; to: Point }[]) => ({
  rings: marks.map(({ from }) => `M${px(from.x)} ${px(from.y - 8)}l8 8l-8 8l-8 -8z`).join(''),
  hairs: marks.map(({ from, to }) => `M${px(from.x)} ${px(from.y)}L${px(to.x)} ${px(to.y)}`).join(''),
})
