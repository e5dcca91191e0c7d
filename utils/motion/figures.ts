/** What else a law's timing tells beside the size: where it stops, how fast it turns, where it lets go. */
import type { Fit } from './fit'
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
    default: return []
  }
}
