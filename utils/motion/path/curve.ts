/**
 * Lines and circles as one family, so that an arc may flatten into a line without a break:
 * A(x² + y²) + E(x cos φ + y sin φ) + D = 0 with E² = 1 + 4AD, where 2A is the curvature (N. Chernov & C. Lesort, Least squares fitting of
 * circles, Journal of Mathematical Imaging and Vision 23 (2005) 239–252). Counted from a `base` close to the curve: there E is near 1,
 * and neither a flat arc nor a full circle comes near the one place where the form is singular, the circle's own centre.
 */
import type { Place } from '../types'

export interface Curve {
  base: Place
  /** A: half the signed curvature, 1/drawing units. 0 for a line. */
  bend: number
  /** φ: radians, the direction square to the curve at its foot, the place nearest to the base. */
  normal: number
  /** D: about how far the base lies off the curve, drawing units. */
  shift: number
}

/** E. Never the root of a negative number, however wild a trial step. */
const steepness = ({ bend, shift }: Curve) => Math.sqrt(Math.max(0, 1 + 4 * bend * shift))

/** Where a place lies by a curve. */
export interface Bearing {
  /** Signed distance from the curve, drawing units: positive along its normal. */
  off: number
  /** Way along the curve from its foot, drawing units; a circle's between half its length either way. */
  along: number
}

export function bearingOf(curve: Curve, { x, y }: Place): Bearing {
  const { base, bend, normal, shift } = curve
  const [c, s] = [Math.cos(normal), Math.sin(normal)]
  const [dx, dy] = [x - base.x, y - base.y]
  const out = c * dx + s * dy
  const across = c * dy - s * dx
  const e = steepness(curve)
  const value = bend * (dx * dx + dy * dy) + e * out + shift
  // value = off + A·off², solved without subtracting like from like.
  const off = 2 * value / (1 + Math.sqrt(Math.max(0, 1 + 4 * bend * value)))
  const along = bend === 0 ? across : Math.atan2(2 * bend * across, 2 * bend * out + e) / (2 * bend)
  return { off, along }
}

const sinc = (angle: number) => (angle === 0 ? 1 : Math.sin(angle) / angle)

/** The place on the curve this far along from its foot, and `off` from it along its normal. */
export function placeAlong(curve: Curve, along: number, off = 0): Place {
  const { base, bend, normal, shift } = curve
  const half = bend * along
  const e = steepness(curve)
  const across = along * sinc(2 * half) + 2 * bend * off * along * sinc(2 * half)
  const out = -bend * along * along * sinc(half) ** 2 - 2 * shift / (1 + e) + off * Math.cos(2 * half)
  const [c, s] = [Math.cos(normal), Math.sin(normal)]
  return { x: base.x + c * out - s * across, y: base.y + s * out + c * across }
}

/** The circle's centre; null for a line. */
export function centreOf(curve: Curve): Place | null {
  const { base, bend, normal } = curve
  if (bend === 0) return null
  const away = steepness(curve) / (2 * bend)
  return { x: base.x - away * Math.cos(normal), y: base.y - away * Math.sin(normal) }
}

/** Drawing units; Infinity for a line. */
export const radiusOf = ({ bend }: Curve): number => 1 / Math.abs(2 * bend)

/** The circle about a centre, counted from the place on it nearest to `towards`. */
export function circleAbout(centre: Place, radius: number, towards: Place): Curve {
  const [dx, dy] = [towards.x - centre.x, towards.y - centre.y]
  const normal = dx === 0 && dy === 0 ? 0 : Math.atan2(dy, dx)
  return {
    base: { x: centre.x + radius * Math.cos(normal), y: centre.y + radius * Math.sin(normal) }, bend: 1 / (2 * radius), normal, shift: 0,
  }
}

/** The circle or line through three places, counted from the middle one; null where two of them coincide. */
export function curveThrough(p: Place, q: Place, r: Place): Curve | null {
  const [px, py, rx, ry] = [p.x - q.x, p.y - q.y, r.x - q.x, r.y - q.y]
  const [pp, rr] = [px * px + py * py, rx * rx + ry * ry]
  // Cofactors of the equation's three unknowns; q itself makes D nothing.
  const a = px * ry - py * rx
  const b = py * rr - pp * ry
  const c = pp * rx - px * rr
  const size = Math.hypot(b, c)
  if (!(size > 0) || !Number.isFinite(a / size)) return null
  return { base: q, bend: a / size, normal: Math.atan2(c, b), shift: 0 }
}

/** The line through two places; null where they coincide. */
export function lineThrough(p: Place, q: Place): Curve | null {
  const [dx, dy] = [q.x - p.x, q.y - p.y]
  return dx === 0 && dy === 0 ? null : { base: p, bend: 0, normal: Math.atan2(-dx, dy), shift: 0 }
}
