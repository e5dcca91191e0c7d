/** A list of points on the drawing: its path of action found, its timing judged along it. */
import type { Judgement } from './readings'
import type { PointCheck } from './types'

export function judgePoints(_request: PointCheck): Judgement {
  throw new Error('not yet')
}
