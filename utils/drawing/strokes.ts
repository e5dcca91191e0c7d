/** SVG path strings for many small marks at once: two thousand drawings are still one element. */

/** A spot on the path of action: position in pixels and the unit direction that points to the posted side. */
export interface Spot {
  x: number
  y: number
  nx: number
  ny: number
}
export interface Point {
  x: number
  y: number
}

/** A tenth of a pixel is finer than any screen and keeps the page small. */
export const px = (value: number) => String(Math.round(value * 10) / 10)

/** Ticks from `from` to `to` pixels along each spot's direction. */
export function ticksPath(spots: readonly Spot[], from: number, to: number): string {
  return spots
    .map((s) => `M${px(s.x + s.nx * from)} ${px(s.y + s.ny * from)}L${px(s.x + s.nx * to)} ${px(s.y + s.ny * to)}`)
    .join('')
}

/** Crosses with arms of `arm` pixels. */
export function crossesPath(points: readonly Point[], arm = 4): string {
  return points
    .map(({ x, y }) => {
      const [l, r, t, b] = [px(x - arm), px(x + arm), px(y - arm), px(y + arm)]
      return `M${l} ${t}L${r} ${b}M${l} ${b}L${r} ${t}`
    })
    .join('')
}

/** Dots, to be stroked with round caps. */
export function dotsPath(points: readonly Point[]): string {
  return points.map(({ x, y }) => `M${px(x)} ${px(y)}h0`).join('')
}

/** Upright bars as one fillable path; `height` may be negative. */
export function barsPath(bars: readonly { x: number; y: number; width: number; height: number }[]): string {
  return bars.map((b) => `M${px(b.x)} ${px(b.y)}h${px(b.width)}v${px(b.height)}h${px(-b.width)}z`).join('')
}

/** A closed outline. */
export function outlinePath(points: readonly Point[]): string {
  return points.length === 0 ? '' : `M${points.map(({ x, y }) => `${px(x)} ${px(y)}`).join('L')}Z`
}

/** Every `n`th at least `apart` pixels away from those kept before: for marks that would smear into one. */
export function keepApart<P extends Point>(points: readonly P[], apart: number): P[] {
  const kept: P[] = []
  for (const point of points) {
    const near = kept.some((other) => Math.hypot(other.x - point.x, other.y - point.y) < apart)
    if (!near) kept.push(point)
  }
  return kept
}
