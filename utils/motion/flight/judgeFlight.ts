import { without } from '../path/nothing'
import type { Judgement } from '../readings'
import type { PointCheck } from '../types'

export function judgeFlight(request: PointCheck): Judgement {
  return without(request, null, 'Flights are not judged yet.')
}
