import { describe, expect, it } from 'vitest'
import type { Claim } from '~/utils/contracts/production'
import { requestFor } from '~/utils/contracts/check'
import { judge } from '~/utils/motion'
import { claimedList } from '~/utils/posting/claimed'

const small = 8
const large = 32
const claim: Claim = { law: 'topple', measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1, subject: { shape: 'rod', height: large } }
const fps = 24
/** A small rod's fall on twos: near the start a lean grows as cosh, and one law only runs slower for a larger body. */
const fallOf = (height: number) => {
  const frames = Array.from({ length: 30 }, (_, i) => 1 + 2 * i)
  const k = Math.sqrt((1.5 * 9.80665) / height)
  return frames.map((frame) => ({ frame, reading: 3 * Math.cosh((k * (frame - 1)) / fps) })).filter(({ reading }) => reading < 15)
}

describe('the claim’s own size over the frames that it needs', () => {
  const posted = fallOf(small)
  const list = claimedList(claim, fps, posted)!

  it('four times the height takes twice the frames, on the same exposure, through the same angles', () => {
    const used = posted.at(-1)!.frame - 1
    expect(Math.abs(list.at(-1)!.frame - 1 - 2 * used)).toBeLessThanOrEqual(4)
    expect(new Set(list.slice(1).map(({ frame }, i) => frame - list[i]!.frame))).toEqual(new Set([2]))
    expect(Math.abs(list.at(-1)!.reading - posted.at(-1)!.reading)).toBeLessThan(1.5)
  })
  it('holds when it is posted', () => {
    const answer = judge(requestFor(claim, fps, list))
    expect(answer.findings).toEqual([])
    expect(answer.verdict).toBe('holds')
  })
  it('stops where a smaller size has arrived', () => {
    const shorter = claimedList({ ...claim, subject: { shape: 'rod', height: small / 4 } }, fps, posted)!
    expect(shorter.at(-1)!.frame).toBeLessThan(posted.at(-1)!.frame)
    expect(shorter.at(-1)!.reading).toBeLessThan(90)
  })
  it('is null without a claimed size', () => {
    expect(claimedList({ ...claim, subject: undefined }, fps, posted)).toBeNull()
  })
  it('is null under several laws, and for points: neither has one pace', () => {
    const [first, middle, last] = [posted[0]!.frame, posted[5]!.frame, posted.at(-1)!.frame]
    const spans = [{ from: first, to: middle, law: 'topple' as const }, { from: middle, to: last, law: 'topple' as const }]
    expect(claimedList({ ...claim, spans }, fps, posted)).toBeNull()
    expect(claimedList({ ...claim, measure: 'point' }, fps, posted)).toBeNull()
  })
})
