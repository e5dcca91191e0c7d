import type { Point } from '~/utils/drawing/strokes'

/** Where words go so that no two of them touch. */

export interface Box {
  x: number
  y: number
  width: number
  height: number
}
export type Anchor = 'start' | 'middle' | 'end'
export interface Wanted<T> {
  item: T
  text: string
  /** Tried in this order: where the text's baseline would start, and which end of it. */
  places: Place[]
}
export interface Place extends Point {
  anchor: Anchor
  /** Where a hair would lead from here to the mark: no other label may lie across it. */
  hair?: Box
}
export interface Placed<T> extends Point {
  item: T
  text: string
  anchor: Anchor
  box: Box
}

/** Width in pixels that a line of the interface's type takes at most: generous, since the real one is known only on screen. */
export function textWidth(text: string, size = 12, bold = false): number {
  let units = 0
  // East Asian characters fill the square; everything else stays within six tenths of it.
  for (const letter of text) units += letter.codePointAt(0)! > 0x2e7f ? 1 : 0.58
  return units * size * (bold ? 1.06 : 1)
}

export const overlaps = (a: Box, b: Box, gap = 2) =>
  a.x < b.x + b.width + gap && b.x < a.x + a.width + gap && a.y < b.y + b.height + gap && b.y < a.y + a.height + gap

const inside = (box: Box, bounds: Box) =>
  box.x >= bounds.x &&
  box.y >= bounds.y &&
  box.x + box.width <= bounds.x + bounds.width &&
  box.y + box.height <= bounds.y + bounds.height

export function textBox(text: string, at: Point, anchor: Anchor, size = 12, bold = false): Box {
  const width = textWidth(text, size, bold)
  const left = anchor === 'start' ? at.x : anchor === 'end' ? at.x - width : at.x - width / 2
  // From the ascender to the descender, counted from the baseline.
  return { x: left, y: at.y - size * 0.82, width, height: size * 1.08 }
}

/**
 * Places labels one by one, the most telling first: each at the first of its places that lies inside `bounds` and touches
 * neither an obstacle nor a label placed before. One that fits nowhere is left out.
 */
export function placeLabels<T>(
  wanted: readonly Wanted<T>[],
  bounds: Box,
  obstacles: readonly Box[] = [],
  style: { size?: number; bold?: boolean; gap?: number; most?: number } = {},
): Placed<T>[] {
  const { size = 12, bold = false, gap = 3, most = Number.POSITIVE_INFINITY } = style
  const taken = [...obstacles]
  const hairs: Box[] = []
  const placed: Placed<T>[] = []
  for (const { item, text, places } of wanted) {
    if (placed.length >= most) break
    for (const place of places) {
      const box = textBox(text, place, place.anchor, size, bold)
      if (!inside(box, bounds) || [...taken, ...hairs].some((other) => overlaps(box, other, gap))) continue
      const { hair } = place
      if (hair && placed.some((other) => overlaps(hair, other.box, 1))) continue
      taken.push(box)
      if (hair) hairs.push(hair)
      placed.push({ item, text, x: place.x, y: place.y, anchor: place.anchor, box })
      break
    }
  }
  return placed
}

/** Order in which a row of marks should get its numbers: the ends, then ever finer halves, so that what is left is even. */
export function spreadOrder(count: number): number[] {
  if (count <= 0) return []
  const order = [0]
  const seen = new Set(order)
  const add = (i: number) => {
    if (seen.has(i)) return
    seen.add(i)
    order.push(i)
  }
  add(count - 1)
  for (let step = 2 ** Math.ceil(Math.log2(Math.max(2, count))); step >= 1; step /= 2)
    for (let i = 0; i < count; i += step) add(i)
  return order
}

/** Moves labels in a row apart (and into `from…to`) as little as possible. Needs room for all; keeps their order. */
export function spreadRow(row: readonly { x: number; width: number }[], from: number, to: number, gap = 10): number[] {
  const order = row.map((_, i) => i).sort((a, b) => row[a]!.x - row[b]!.x)
  const xs = row.map(({ x, width }) => Math.min(Math.max(x, from + width / 2), to - width / 2))
  for (let n = 1; n < order.length; n++) {
    const [left, right] = [order[n - 1]!, order[n]!]
    const apart = (row[left]!.width + row[right]!.width) / 2 + gap
    const missing = apart - (xs[right]! - xs[left]!)
    if (missing <= 0) continue
    xs[left] = xs[left]! - missing / 2
    xs[right] = xs[right]! + missing / 2
  }
  // Back inside, from the right edge and then from the left.
  for (let n = order.length - 1, edge = to; n >= 0; n--) {
    const i = order[n]!
    xs[i] = Math.min(xs[i]!, edge - row[i]!.width / 2)
    edge = xs[i]! - row[i]!.width / 2 - gap
  }
  for (let n = 0, edge = from; n < order.length; n++) {
    const i = order[n]!
    xs[i] = Math.max(xs[i]!, edge + row[i]!.width / 2)
    edge = xs[i]! + row[i]!.width / 2 + gap
  }
  return xs
}
