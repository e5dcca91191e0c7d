/** Holds the judge's answers against the truth the lists of bodies over the edge were made with. */
import type { CheckResult } from '../../utils/motion'
import type { EdgeList } from './lists/edge'
import { isAtKey, median, percent, scoreTable, share, tally } from './tally'
import type { Score } from './tally'

/** `covered`: clean lists that show the leaving. */
export interface EdgeScore extends Omit<Score<EdgeList>, 'coverage'> {
  /** Share of those whose 95 % intervals hold the true size, leaving angle and leaving frame. */
  sizes: number
  angles: number
  frames: number
  /** Median of how far a wrong release is told from its true angle, degrees. */
  medianAngleError: number
}

/** Right kind and right frames; held and skipped one key off, a wrong release told the right way by an amount within a third. */
export function isRight(list: EdgeList, result: CheckResult): boolean {
  const { truth } = list
  if (truth.kind === 'clean') return result.verdict === 'holds' && result.findings.length === 0
  if (result.findings.length === 0 || result.findings.some(finding => finding.kind !== truth.kind)) return false
  const told = result.findings.flatMap(finding => finding.frames).sort((a, b) => a - b)
  if (truth.kind === 'misplaced' || truth.kind === 'off-path') return told.join() === truth.frames.join()
  if (truth.kind === 'held' || truth.kind === 'skipped') return isAtKey(list, told)
  if (truth.kind === 'wrong-release') {
    const [finding] = result.findings
    if (result.findings.length !== 1 || !finding) return false
    const straight = finding.text.includes('straight down')
    if (truth.straight) return straight
    return !straight && Math.abs(finding.amount - (truth.late ?? 0)) <= Math.abs(truth.late ?? 0) / 3
  }
  return result.size !== null && Math.abs(result.size.value / truth.size - 1) < 0.2
}

export function scoreEdge(lists: readonly EdgeList[]): EdgeScore {
  const errors: number[] = []
  const off: number[] = []
  const count = { covered: 0, sizes: 0, angles: 0, frames: 0 }
  const score = tally(lists, isRight, ({ truth }, result) => {
    const within = (kind: string, value: number | undefined) => {
      const figure = result.figures?.find(one => one.kind === kind)
      return value !== undefined && figure !== undefined && figure.low <= value && value <= figure.high ? 1 : 0
    }
    if (truth.kind === 'clean' && truth.release !== undefined && result.size) {
      count.covered++
      if (result.size.low <= truth.size && truth.size <= result.size.high) count.sizes++
      count.angles += within('release-angle', truth.releaseAngle)
      count.frames += within('release', truth.release)
      // Without a body the judge takes a rod.
      errors.push(Math.abs(result.size.value / truth.size - 1))
    }
    const [finding] = result.findings
    if (finding?.kind === 'wrong-release' && typeof truth.late === 'number') off.push(Math.abs(finding.amount - truth.late))
  })
  const { covered, sizes, angles, frames } = count
  return {
    ...score, covered, sizes: share(sizes, covered), angles: share(angles, covered), frames: share(frames, covered),
    medianSizeError: median(errors), medianAngleError: median(off),
  }
}

export function edgeTable(score: EdgeScore): string {
  return [
    scoreTable('over the edge', score),
    `inside the 95 % interval, of ${String(score.covered).padEnd(6)}size ${percent(score.sizes)}, leaving angle ${percent(score.angles)}, its frame ${percent(score.frames)}`,
    `median size error                  ${percent(score.medianSizeError)}; of a wrong leaving angle ${score.medianAngleError.toFixed(2)}°`,
  ].join('\n')
}
