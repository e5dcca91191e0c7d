import { lozenge, wedge } from '~/utils/drawing/joints'
import { placeLabels } from '~/utils/drawing/labels'
import type { Placed } from '~/utils/drawing/labels'
import type { StripKey, StripLayout, StripPaths } from '~/utils/drawing/stripLayout'
import type { Spot } from '~/utils/drawing/strokes'
import { px } from '~/utils/drawing/strokes'
import { lawWords } from '~/utils/drawing/words'

/** Where spans meet on the path of action: a hairline across it, with the laws of either side beside it. */

export interface StripJoints {
  plain: string
  contact: string
  wedges: string
  broken: string
  lozenges: string
  /** "slow in ¦ steady": item is the key's position. */
  words: Placed<number>[]
}

export const noJoints: StripJoints = { plain: '', contact: '', wedges: '', broken: '', lozenges: '', words: [] }

/** How far the hairline goes on the law's side and on the posted one. */
const REACH = { law: 42, posted: 24 }

export function stripJoints(keys: readonly StripKey[], layout: StripLayout, { spans = [], joints = [] }: StripPaths): StripJoints {
  const met = joints.flatMap((joint) => {
    const index = keys.findIndex(({ frame }) => frame === joint.frame)
    const spot = index < 0 ? undefined : (layout.law[index] ?? layout.posted[index])
    return spot ? [{ ...joint, index, spot }] : []
  })
  if (met.length === 0) return noJoints
  const [contacts, broken] = [met.filter(({ contact, holds }) => contact && holds), met.filter(({ holds }) => !holds)]
  const hair = ({ spot }: { spot: Spot }) =>
    `M${px(spot.x - spot.nx * REACH.law)} ${px(spot.y - spot.ny * REACH.law)}L${px(spot.x + spot.nx * REACH.posted)} ${px(spot.y + spot.ny * REACH.posted)}`
  const end = ({ x, y, nx, ny }: Spot) => [x + nx * (REACH.posted + 6), y + ny * (REACH.posted + 6)] as const
  return {
    plain: met.filter(({ contact, holds }) => !contact && holds).map(hair).join(''),
    contact: contacts.map(hair).join(''),
    wedges: contacts.map(({ spot }) => wedge(...end(spot))).join(''),
    broken: broken.map(hair).join(''),
    lozenges: broken.map(({ spot }) => lozenge(...end(spot))).join(''),
    words: placeLabels(
      met.map(({ index, spot, frame }) => {
        const [before, after] = [spans.find(({ to }) => to === frame), spans.find(({ from }) => from === frame)]
        const text = [before, after].map((span) => (span ? lawWords[span.law] : '')).join(' ¦ ')
        return { item: index, text, places: wordPlaces(spot) }
      }),
      { x: 1, y: 1, width: layout.width - 2, height: layout.height - 2 },
    ),
  }
}

/** At the law's end of the hairline; where there is no room, at the posted end. */
function wordPlaces({ x, y, nx, ny }: Spot) {
  return [-REACH.law - 10, -REACH.law - 24, REACH.posted + 18, REACH.posted + 34].flatMap((out) => {
    const at = { x: x + nx * out, y: y + ny * out + 4 }
    return (['middle', 'start', 'end'] as const).map((anchor) => ({ ...at, anchor }))
  })
}
