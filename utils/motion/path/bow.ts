/** A parabola with an upright axis as a path of action, whatever the timing along it. */
import { solveInto } from '../solve'
import type { Place } from '../types'
import { countedWithin, doubt, triples } from './curveFit'
import type { Sheet } from './sheet'

/** height = apex.y + bend · (x − apex.x)² on the sheet. */
export interface Bow { apex: Place, bend: number }

/** A bow that is no deeper than this share of its width is a line, and its apex nowhere. */
const FLAT = 1e-7

const heightAt = ({ apex, bend }: Bow, x: number) => apex.y + bend * (x - apex.x) ** 2
const slopeAt = ({ apex, bend }: Bow, x: number) => 2 * bend * (x - apex.x)

/** The place on the bow nearest to a given one: Newton's steps from straight above or below, never further off than there. */
function footOf(bow: Bow, { x, y }: Place): number {
  let at = x
  let best = Math.abs(y - heightAt(bow, x))
  for (let step = 0; step < 20; step++) {
    const [rise, slope] = [heightAt(bow, at) - y, slopeAt(bow, at)]
    const steep = 1 + slope * slope + 2 * bow.bend * rise
    const next = at - (at - x + rise * slope) / (steep > 0.2 * (1 + slope * slope) ? steep : 1 + slope * slope)
    const distance = Math.hypot(next - x, heightAt(bow, next) - y)
    if (!(distance < best)) break
    best = distance
    at = next
  }
  return at
}

/** Signed distance, positive below the bow: to the right of the way along it. */
function offBow(bow: Bow, place: Place): number {
  const x = footOf(bow, place)
  return Math.sign(heightAt(bow, place.x) - place.y) * Math.hypot(x - place.x, heightAt(bow, x) - place.y)
}

/** Way along the bow from its apex: s = (q√(1 + q²) + asinh q)/4b, q the slope (the arc length of a parabola; any calculus textbook). */
const lengthAt = (bend: number, q: number) => (q * Math.sqrt(1 + q * q) + Math.asinh(q)) / (4 * bend)

/** Way from the apex to the foot of a place, drawing units, positive to the right. */
export function alongBow(bow: Bow, place: Place): number {
  return lengthAt(bow.bend, slopeAt(bow, footOf(bow, place)))
}

/** The place on the bow so far along from its apex. */
export function placeOnBow({ apex, bend }: Bow, along: number): Place {
  // From 2bs the search for the slope comes down on its answer without crossing it.
  let q = 2 * bend * along
  for (let step = 0; step < 60; step++) {
    const next = q - (lengthAt(bend, q) - along) * 4 * bend / (2 * Math.sqrt(1 + q * q))
    if (!(Math.abs(next) < Math.abs(q))) break
    q = next
  }
  return { x: apex.x + q / (2 * bend), y: apex.y + q * q / (4 * bend) }
}

/** Least squares of heights over x, scaled by the half width; null where the drawings stand over too few places. */
function heights({ x, y, n }: Sheet, weights: Float64Array, half: number): Bow | null {
  const a = new Float64Array(9)
  const b = new Float64Array(3)
  for (let i = 0; i < n; i++) {
    const u = (x[i] as number) / half
    const row = [1, u, u * u - 1 / 3]
    for (let p = 0; p < 3; p++) {
      b[p] = (b[p] as number) + (weights[i] as number) * (row[p] as number) * (y[i] as number)
      for (let q = 0; q < 3; q++) a[3 * p + q] = (a[3 * p + q] as number) + (weights[i] as number) * (row[p] as number) * (row[q] as number)
    }
  }
  const c = new Float64Array(3)
  if (!solveInto(a, b, 3, c)) return null
  const [c0, c1, c2] = c as unknown as [number, number, number]
  if (!(Math.abs(c2) > FLAT * half)) return null
  const u = -c1 / (2 * c2)
  return { apex: { x: u * half, y: c0 + c1 * u + c2 * (u * u - 1 / 3) }, bend: c2 / (half * half) }
}

/** The bow and every drawing's distance from it; null where an upright parabola can't be told from a line. `allowed`: what each may be off. */
export function fitBow(sheet: Sheet, allowed: Float64Array, slop: number): { bow: Bow, off: Float64Array, counts: Float64Array } | null {
  const half = Math.max(...sheet.x)
  if (!(half > 0)) return null
  const offsOf = (bow: Bow) => Float64Array.from({ length: sheet.n }, (_, i) => offBow(bow, { x: sheet.x[i] as number, y: sheet.y[i] as number }))
  const weightsOf = (indexes: readonly number[]) => {
    const weights = new Float64Array(sheet.n)
    for (const i of indexes) weights[i] = 1
    return weights
  }
  const starts = [weightsOf(Array.from({ length: sheet.n }, (_, i) => i)), ...triples(sheet.n).map(weightsOf)]
    .flatMap(weights => heights(sheet, weights, half) ?? [])
    .map(bow => ({ bow, cost: doubt(offsOf(bow), allowed) }))
    .sort((a, b) => a.cost - b.cost)
    .slice(0, 3)
  let best: { bow: Bow, off: Float64Array, counts: Float64Array, cost: number } | null = null
  for (let { bow } of starts) {
    for (let round = 0; round < 12; round++) {
      const off = offsOf(bow)
      const counts = countedWithin(off, allowed, slop)
      const cost = doubt(off, allowed)
      if (!best || cost < best.cost) best = { bow, off, counts, cost }
      if (counts.reduce((sum, count) => sum + count, 0) < Math.max(4, sheet.n / 2)) break
      // A height counts for less where the bow is steep: its distance from it is that much shorter (P. D. Sampson, CGIP 18 (1982) 97–108).
      const next = heights(sheet, counts.map((count, i) => count / (1 + slopeAt(bow, sheet.x[i] as number) ** 2)), half)
      if (!next) break
      bow = next
    }
  }
  return best
}
