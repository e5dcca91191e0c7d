import { metres, claimedSize } from '~/utils/drawing/words'
import type { CheckResult, Key, Place, PointKey, Subject } from '~/utils/motion/types'

/** What moves on the stage: the posted list, and the ruled lists that it can be watched beside. */

export interface PlayedList {
  /** Per drawing of the list; null where no law could be fitted. */
  readings: (number | null)[]
  /** Of a list of points. */
  points: (Place | null)[] | null
}
export interface RuledList extends PlayedList {
  by: 'fit' | 'claim'
  /** "ruled", "ruled for 38 m". */
  name: string
  /** Which it is, for a choice between the two. */
  choice: string
}

/** The drawings as they were posted. */
export function postedList({ keys }: Pick<CheckResult, 'keys'>): PlayedList {
  const points = keys.some(({ point }) => point) ? keys.map(({ point }) => point ?? null) : null
  return { readings: keys.map(({ reading }) => reading), points }
}

/**
 * The lists of the law: its best line through what was drawn, and that of the claimed size where there is one. The more telling comes
 * first: beside a list that is another size, its own law looks like nothing is wrong.
 */
export function ruledLists(answer: CheckResult, subject: Subject | undefined): RuledList[] {
  const { keys, ruled, ruledPoints, findings } = answer
  const lists: RuledList[] = []
  const drawn = keys.some(({ point }) => point)
  const lawful = keys.some(({ law, lawPoint }) => law !== null || lawPoint)
  if (lawful)
    lists.push({
      by: 'fit', name: 'ruled', choice: 'by the law through the drawings',
      readings: suits(ruled.fit, keys.length)?.map(({ reading }) => reading) ?? keys.map(({ law }) => law),
      points: drawn ? places(suits(ruledPoints?.fit, keys.length)) ?? keys.map(({ lawPoint }) => lawPoint ?? null) : null,
    })
  const claim = suits(ruled.claim, keys.length)
  const claimPoints = suits(ruledPoints?.claim, keys.length)
  if (drawn ? claimPoints : claim) {
    const size = claimedSize(subject)
    lists.push({
      by: 'claim', name: size === null ? 'ruled as claimed' : `ruled for ${metres(size, 3)}`, choice: size === null ? 'as claimed' : `for the claimed ${metres(size, 3)}`,
      readings: claim?.map(({ reading }) => reading) ?? keys.map(() => null),
      points: drawn ? places(claimPoints) : null,
    })
  }
  return findings.some(({ kind }) => kind === 'wrong-scale') ? lists.reverse() : lists
}

const suits = <Each extends Key | PointKey>(list: readonly Each[] | null | undefined, count: number) => (list?.length === count ? list : null)
const places = (list: readonly PointKey[] | null) => list?.map(({ x, y }) => ({ x, y })) ?? null
