import { hangs } from '~/utils/bench/laws'
import type { BenchSetup } from '~/utils/bench/setup'

/** What the numbers of a law mean, in a sentence or two: the words under the small drawing. */
export function meaningOf({ law, body, slope }: Pick<BenchSetup, 'law' | 'body' | 'slope'>): string {
  const broad = body === 'block' || body === 'cylinder'
  const lean = broad
    ? 'Lean is counted from balance: the dashed line, where the body’s middle stands over the edge it turns on. There the pivot is.'
    : 'Lean is counted from upright: the dashed line through the pivot, the foot that stays where it is.'
  if (law === 'topple') return lean
  if (law === 'over-edge') return `${lean} It turns on the brink, lets go, and its middle flies on to the ground below.`
  if (law === 'swing-decay') return 'Amplitude is counted from hanging rest: the dashed line under the pivot. Each swing, there and back, loses the same share of it.'
  if (hangs(law)) return 'Amplitude is counted from hanging rest: the dashed line under the pivot. It swings as far to the other side.'
  if (law === 'spin') return 'Turns are counted from the first drawing, and go on past 360°. A small wheel and a large one take as long.'
  if (law === 'bounce') return 'The drop is measured from where it is let go. What comes back of the speed, squared, comes back of the height.'
  if (law === 'flight') return 'The angle is counted from level where it leaves the hand. The drop is from there down to where it lands.'
  if (law === 'slow-in') return 'The way is measured from the first drawing to the stop. Half of the first speed is its mean.'
  if (law === 'steady') return 'The way is what is covered from the first drawing to the last, always at the same speed.'
  return slope < 90
    ? 'The way is measured along the slope, from where it is let go. Slope is counted from level ground.'
    : 'The drop is measured straight down, from where it is let go.'
}
