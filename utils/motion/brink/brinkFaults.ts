/** What is wrong with drawings of a body over a brink. */
import { misplacedFinding, shiftFinding, straightDownFinding, wrongReleaseFinding, wrongScaleFinding } from '../findings'
import { offPathFinding } from '../path/offPath'
import { RADIAN } from '../series'
import type { Scale } from '../size'
import type { CheckResult, Finding, JudgedKey, PointCheck } from '../types'
import type { BrinkLine } from './brinkLine'
import { releaseOfBrink } from './brinkModel'
import type { Letting } from './brinkModel'
import type { BrinkStory, Tipped } from './brinkStories'

const SCALE_FLOOR = 0.03

/** True where the list reads as another size than the claim's. Let go of wrongly, an arc is short and its size less sure than its interval says. */
export function misscaled({ tolerance }: PointCheck, { pace, spread }: Scale, letting: Letting): boolean {
  if (pace === null) return false
  const off = Math.abs(Math.log(pace))
  return off > Math.max(SCALE_FLOOR, Math.log(1 + tolerance)) && off > (letting === 'law' ? 1.6 : 3) * spread
}

/** In no order. `keys`: held against the motion as it was drawn. */
export function brinkFaults(
  request: PointCheck, { series }: Tipped, story: BrinkStory, line: BrinkLine, keys: readonly JudgedKey[], scale: Scale, claim: CheckResult['claim'],
): Finding[] {
  const found: Finding[] = []
  const { model: { letting }, shift } = story
  const off = keys[series.x.findIndex(x => x > line.drawn)]
  if (letting === 'straight' && off) found.push(straightDownFinding(off))
  if (letting === 'own' && off) {
    const angle = (way: 'own' | 'law') => Math.abs(releaseOfBrink(line.numbers, series.edgeRatio, way).angle) / RADIAN
    found.push(wrongReleaseFinding({ angle: angle('own'), leaves: angle('law') }, off))
  }
  const shifted = shift && keys[shift.at]
  if (shift && shifted) found.push(shiftFinding(shifted, shift.by * series.spanFrames, series.n - shift.at > shift.at))
  for (const i of story.bad) {
    const key = keys[i]
    if (!key) continue
    const across = Math.abs(key.offPath ?? 0) > Math.abs(key.offset ?? 0)
    const path = (series.x[i] as number) > line.drawn ? 'parabola' : 'circle'
    found.push(across ? offPathFinding(key, path, request.unit) : misplacedFinding(key, request.unit))
  }
  if (claim && misscaled(request, scale, letting)) {
    const finding = wrongScaleFinding(scale, claim.frames, claim.usedFrames)
    if (finding) found.push(finding)
  }
  return found
}
