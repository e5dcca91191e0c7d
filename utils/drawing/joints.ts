import { placeLabels, spreadOrder } from '~/utils/drawing/labels'
import type { Placed } from '~/utils/drawing/labels'
import { px } from '~/utils/drawing/strokes'
import { lawWords } from '~/utils/drawing/words'
import type { CheckResult } from '~/utils/motion/types'

/** Where spans meet, over the curve and the gaps: a hairline with a law's word on either side. */

export type Joined = Pick<CheckResult, 'spans' | 'joints'>

export interface JointsDrawing {
  /** Hairlines where speed carries over. */
  plain: string
  /** Hairlines where something is hit, and their sign: a wedge that stands on the line. */
  contact: string
  wedges: string
  /** Hairlines where it should carry over and doesn't, and their sign: a lozenge. */
  broken: string
  lozenges: string
  words: Placed<number>[]
}

/** `wordsY` is the baseline of the laws' words; `x` places a frame. */
export function drawJoints({ spans = [], joints = [] }: Joined, x: (frame: number) => number, top: number, bottom: number, wordsY: number): JointsDrawing {
  const lines = (list: typeof joints) => list.map(({ frame }) => `M${px(x(frame))} ${px(top)}V${px(bottom)}`).join('')
  const contacts = joints.filter(({ contact, holds }) => contact && holds)
  const broken = joints.filter(({ holds }) => !holds)
  const bounds = { x: Math.min(...spans.map(({ from }) => x(from))), y: 0, width: 0, height: bottom }
  bounds.width = Math.max(...spans.map(({ to }) => x(to))) - bounds.x
  const words = placeLabels(
    spreadOrder(spans.length).map((i) => {
      const { from, to, law } = spans[i]!
      return { item: i, text: lawWords[law], places: [{ x: (x(from) + x(to)) / 2, y: wordsY, anchor: 'middle' as const }] }
    }),
    bounds,
  )
  return {
    plain: lines(joints.filter(({ contact, holds }) => !contact && holds)),
    contact: lines(contacts),
    wedges: contacts.map(({ frame }) => wedge(x(frame), top)).join(''),
    broken: lines(broken),
    lozenges: broken.map(({ frame }) => lozenge(x(frame), top)).join(''),
    words,
  }
}

/** A wedge pointing down to a contact. */
export const wedge = (x: number, y: number) => `M${px(x - 5)} ${px(y - 7)}h10l-5 8z`
/** The shape of a joint that breaks. */
export const lozenge = (x: number, y: number) => `M${px(x)} ${px(y - 6)}l6 6l-6 6l-6 -6z`
