/** How fast the judge answers, by the clock and by processor time, and how much faster than fitting the same lists by general libraries. */
import { judge } from '../../utils/motion'
import type { ReadingCheck } from '../../utils/motion'
import type { MadeList } from './lists/made'
import { sizeByLibrary } from './lmFit'
import { median } from './tally'

function timed(work: () => void): number {
  const from = performance.now()
  work()
  return performance.now() - from
}

/** Milliseconds of processor time, which other work on the machine doesn't stretch. */
function worked(work: () => void): number {
  const before = process.cpuUsage()
  work()
  const { user, system } = process.cpuUsage(before)
  return (user + system) / 1000
}

function longList(faulty: boolean): ReadingCheck {
  // A pendulum over many swings, from the small-swing sum: what counts here is its length.
  const keys = Array.from({ length: 2000 }, (_, i) => {
    const shown = faulty && i >= 900 ? i - 1 : i
    return { frame: i, reading: Math.round(50 * Math.cos(shown / 24 * 1.1)) / 10 }
  })
  return { law: 'pendulum', fps: 24, measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1, keys }
}

export interface Speed {
  /** Lists of about forty keys per second: by the median over lists of each list's own median of five. */
  atMedian: number
  /** The same by the sum of the medians: what a mixture with its hardest lists comes to. */
  overall: number
  /** Per second of processor time, all of it (compiling and tidying up too). */
  byProcessor: number
  /** Milliseconds for one list of 2,000 keys, median of five. */
  longListMs: number
}

/** Lists of 36 to 44 keys, `more` laid over each request; a steady motion has no start. */
export function speedOf(lists: readonly MadeList[], more: Partial<ReadingCheck> = {}): Speed {
  const requests = lists.filter(({ request: { keys } }) => keys.length >= 36 && keys.length <= 44).slice(0, 200)
    .map(({ request }) => ({ ...request, ...(request.law === 'steady' ? {} : more) }) as ReadingCheck)
  for (const request of requests) judge(request)
  const each: number[] = []
  const used = worked(() => {
    for (const request of requests) each.push(median(Array.from({ length: 5 }, () => timed(() => judge(request)))))
  })
  const sum = each.reduce((total, one) => total + one, 0)
  return {
    atMedian: 1000 / median(each), overall: 1000 * each.length / sum, byProcessor: 5000 * each.length / used,
    longListMs: median([true, false, true, false, true].map(faulty => timed(() => judge(longList(faulty))))),
  }
}

export interface Against {
  lists: number
  /** Times as fast as the library, by processor time. */
  ratio: number
  /** Median |size by the judge / size by the library − 1|. */
  apart: number
  /** Lists on which the two sizes are within one in a hundred. */
  agree: number
}

/** Clean topples and swings with a size, both ways. */
export function againstLibrary(lists: readonly MadeList[], most = 24): Against {
  const some = lists.filter(({ request, truth }) => truth.kind === 'clean' && truth.size !== undefined && request.law !== 'odd-rule').slice(0, most)
  for (const { request } of some) judge(request)
  const own: number[] = []
  const library: number[] = []
  const ownTime = worked(() => some.forEach(({ request }) => own.push(judge(request).size?.value ?? NaN)))
  const libraryTime = worked(() => some.forEach(list => library.push(sizeByLibrary(list))))
  const apart = own.map((size, i) => {
    const off = Math.abs(size / (library[i] as number) - 1)
    return Number.isFinite(off) ? off : 1
  })
  return { lists: some.length, ratio: libraryTime / ownTime, agree: apart.filter(off => off < 0.01).length, apart: median(apart) }
}
