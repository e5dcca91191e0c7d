import type { Claim } from '~/utils/contracts/production'
import type { TakeSketch } from '~/utils/contracts/take'
import type { CheckResult, JudgedKey, Place } from '~/utils/motion/types'
import { headline } from './headline'

/** A sheet has room for no more. */
export const MAX_MARKS = 60

/**
 * A take drawn small: what a sheet of the wall shows, kept beside the judge's answer. Readings are rounded to what a
 * thousand-pixel strip could show, so that four hundred sheets stay light.
 */
export function makeSketch(number: number, answer: CheckResult, claim: Claim): TakeSketch {
  const round = rounder(answer.keys)
  return {
    number,
    verdict: answer.verdict,
    headline: headline(answer, claim),
    drawings: answer.keys.length,
    marks: chosen(answer.keys).map(({ frame, reading, law, breaks, point, lawPoint }) => ({
      frame,
      reading: round(reading),
      law: law === null ? null : round(law),
      breaks,
      ...(point && { point: onPaper(point), lawPoint: lawPoint ? onPaper(lawPoint) : null }),
    })),
  }
}

/** A tenth of a drawing unit is finer than any sheet of the wall. */
const onPaper = ({ x, y }: Place): Place => ({ x: Number(x.toFixed(1)), y: Number(y.toFixed(1)) })

function rounder(keys: readonly JudgedKey[]): (value: number) => number {
  const readings = keys.map((key) => key.reading)
  const span = Math.max(...readings) - Math.min(...readings)
  const places = span > 0 ? Math.min(9, Math.max(0, Math.ceil(3 - Math.log10(span)))) : 3
  return (value) => Number(value.toFixed(places))
}

/** All of a short list; of a long one its ends, every breaking drawing that there is room for, and an even spread of the rest. */
function chosen(keys: readonly JudgedKey[]): JudgedKey[] {
  if (keys.length <= MAX_MARKS) return [...keys]
  const last = keys.length - 1
  const breaking = keys.flatMap((key, i) => (key.breaks && i > 0 && i < last ? [i] : []))
  const holding = keys.flatMap((key, i) => (!key.breaks && i > 0 && i < last ? [i] : []))
  const room = MAX_MARKS - 2
  const first = spread(breaking, room)
  const picked = [0, last, ...first, ...spread(holding, room - first.length)]
  return picked.sort((a, b) => a - b).map((i) => keys[i]!)
}

/** At most `count` of `list`, evenly spread. */
function spread(list: readonly number[], count: number): number[] {
  if (list.length <= count) return [...list]
  return Array.from({ length: count }, (_, i) => list[Math.floor(((i + 0.5) * list.length) / count)]!)
}
