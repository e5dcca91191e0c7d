import { CHECK_LIMITS, requestFor } from '~/utils/contracts/check'
import type { Claim } from '~/utils/contracts/production'
import { judgeInDepth, lawCurve } from '~/utils/motion'
import type { Key, ReadingCheck } from '~/utils/motion/types'

/**
 * The same motion at the claim's own size, over as many frames as that size needs and at the list's own exposure: on the
 * posted frames alone a large body would hardly have moved, and a small one would be long past its end.
 * @param fps frames per second of the shot
 * @returns readings in the claim's unit; null where the claim names no size, where the list is points or under several laws (there is no
 * one pace then), or where it would get longer than a list may be
 */
export function claimedList(claim: Claim, fps: number, keys: readonly Key[]): Key[] | null {
  if (claim.measure === 'point' || claim.spans) return null
  const request = requestFor(claim, fps, keys) as ReadingCheck
  const { line, pace, result } = judgeInDepth(request)
  const first = keys[0]?.frame
  if (!line || pace === null || !result.claim || first === undefined) return null
  const step = usualStep(keys)
  const count = Math.round(result.claim.frames / step) + 1
  if (count < CHECK_LIMITS.minKeys || count > CHECK_LIMITS.maxKeys) return null
  const frames = Array.from({ length: count }, (_, i) => first + i * step)
  const readings = lawCurve(line, request, frames, pace)
  return frames.map((frame, i) => ({ frame, reading: readings[i]! }))
}

/** The middle one of the list's steps from frame to frame: one for a list on ones, two on twos. */
function usualStep(keys: readonly Key[]): number {
  const steps = keys.slice(1).map(({ frame }, i) => frame - keys[i]!.frame).sort((a, b) => a - b)
  return steps[Math.floor(steps.length / 2)] ?? 1
}
