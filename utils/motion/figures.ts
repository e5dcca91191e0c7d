/** What else a law's timing tells beside the size: where it stops, how fast it turns, where it lets go. */
import type { Fit } from './fit'
import { fullNumbers } from './laws/fromRest'
import { contactAfter } from './laws/hops'
import type { Line } from './line'
import { releaseFigures } from './release'
import type { Series } from './series'
import { uncertainty } from './size'
import { fullTurn } from './turns'
import type { Figure, ReadingCheck } from './types'

/** One figure with its 95 % interval: `value` ± t times the spread of the free numbers along `along` (d value / d number). */
function figureOf(kind: Figure['kind'], unit: string, value: number, along: readonly number[], fit: Fit, kept: number, least: number): Figure {
  const half = Math.min(Number.MAX_SAFE_INTEGER, uncertainty(fit, along, kept, least))
  return { kind, value, low: value - half, high: value + half, unit }
}

/** The figures of a fit, as its line is drawn. `kept`: drawings that the fit counts; `least`: spread left by rounding. */
export function figuresOf(request: ReadingCheck, series: Series, fit: Fit, line: Line, kept: number, least: number): Figure[] {
  const first = request.keys[0]?.frame ?? 0
  const { numbers } = fit
  switch (fit.model.law) {
    case 'slow-in': {
      const perSpan = series.spanFrames
      return [figureOf('stop', 'frame', first + ((numbers[0] as number) + line.lag) * perSpan, [perSpan, 0, 0], fit, kept, least)]
    }
    case 'spin': {
      // The second number is half the travel over the span.
      const perSecond = 2 / (fullTurn(request) * series.span)
      const way = Math.sign(numbers[1] as number) || 1
      return [figureOf('turns', 'turns/s', way * perSecond * (numbers[1] as number), [0, perSecond], fit, kept, least)]
    }
    case 'over-edge': return releaseFigures(request, series, fit, line.lag, kept, least)
    case 'bounce': return bounceFigures(fit, line, first, series, kept, least)
    case 'swing-decay': {
      const index = fit.model.size - 1
      const decrement = numbers[index] as number
      const along = new Array<number>(fit.model.size).fill(0)
      along[index] = 100 * Math.exp(-decrement)
      const figure = figureOf('share-lost', '%', 100 * (1 - Math.exp(-decrement)), along, fit, kept, least)
      return [{ ...figure, low: Math.max(0, figure.low), high: Math.min(100, figure.high) }]
    }
    default: return []
  }
}

/** Contacts told of at most: after so many, hops are too small to be timed. */
const MOST_CONTACTS = 8

function bounceFigures(fit: Fit, line: Line, first: number, series: Series, kept: number, least: number): Figure[] {
  const { model } = fit
  const numbers = fullNumbers(model, fit.numbers)
  const [, , , hop = 1, e = 0.5] = numbers
  const perSpan = series.spanFrames
  /** d value / d free number: the law's own numbers may hang on fewer. */
  const along = (value: (numbers: Float64Array) => number) => Array.from(fit.numbers, (number, p) => {
    const step = 1e-6 * Math.max(1e-3, Math.abs(number))
    const [up, down] = [fit.numbers.slice(), fit.numbers.slice()]
    up[p] = number + step
    down[p] = number - step
    return (value(fullNumbers(model, up)) - value(fullNumbers(model, down))) / (2 * step)
  })
  const restitution = figureOf('restitution', '', e, along(([, , , , share = 0]) => share), fit, kept, least)
  const figures: Figure[] = [{ ...restitution, low: Math.max(0, restitution.low), high: Math.min(1, restitution.high) }]
  for (let k = 0; k < MOST_CONTACTS; k++) {
    const time = (of: Float64Array) => perSpan * ((of[0] as number) + contactAfter(k, of[3] as number, of[4] as number))
    const at = time(numbers) + perSpan * line.lag
    if (at > perSpan || at < 0) break
    // Once a hop is over within a frame, nothing of it can be seen.
    if (k > 0 && hop * e ** (k - 1) * perSpan < 1) break
    figures.push(figureOf('contact', 'frame', first + at, along(time), fit, kept, least))
  }
  return figures
}
