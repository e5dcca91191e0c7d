/** A found division in the words of a claim. */
import type { CheckRequest, Law, Span } from '../../types'
import type { Piece } from './piece'
import type { Found } from './search'

/** The division's spans. A slowing that ends in rest is one law with the rest that follows: the stop is in it. */
export function spansOf(request: CheckRequest, { division: { joints, contacts }, pieces, scene: { frames, n } }: Found): Span[] {
  const at = (i: number) => request.keys[i]?.frame ?? 0
  const ends = [0, ...joints, n - 1]
  const spans: Span[] = []
  pieces.forEach((piece, s) => {
    const [from, to] = [ends[s] as number, ends[s + 1] as number]
    const before = spans[spans.length - 1]
    if (before?.law === 'slow-in' && !before.contact && rests(piece, to, frames, from, request.slop)) {
      before.to = at(to)
      return
    }
    const span: Span = { from: at(from), to: at(to), law: lawOf(piece, from, to, frames) }
    if (contacts[s]) span.contact = true
    spans.push(span)
  })
  return spans
}

function rests(piece: Piece, to: number, frames: Float64Array, from: number, slop: number): boolean {
  const travel = piece.at(to).values.map((value, r) => value - (piece.at(from).values[r] as number))
  return piece.kind === 'even' && Math.hypot(...travel) <= 2 * slop && (frames[to] as number) > (frames[from] as number)
}

function lawOf(piece: Piece, from: number, to: number, frames: Float64Array): Law {
  if (piece.kind === 'even') return 'steady'
  if (piece.kind === 'swing') return piece.pull > 0 ? 'topple' : 'pendulum'
  return stopsAt(piece, from, to, frames) ? 'slow-in' : 'odd-rule'
}

/** True where the line slows all the way and stands still within an exposure of its last drawing. */
function stopsAt(piece: Piece, from: number, to: number, frames: Float64Array): boolean {
  const [first = 0] = piece.at(from).speeds
  const [last = 0] = piece.at(to).speeds
  const change = (last - first) / ((frames[to] as number) - (frames[from] as number))
  const exposure = (frames[to] as number) - (frames[to - 1] as number)
  return Math.abs(last) < Math.abs(first) && Math.abs(last) <= exposure * Math.abs(change)
}
