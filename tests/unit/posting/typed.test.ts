import { describe, expect, it } from 'vitest'
import { checkRequest } from '~/utils/contracts/check'
import type { Claim } from '~/utils/contracts/production'
import { typedRequest } from '~/utils/posting/typed'

const claim: Claim = {
  law: 'odd-rule', measure: 'distance', unit: 'px', slop: 1, tolerance: 0.1,
  spans: [{ from: 1, to: 9, law: 'odd-rule', start: 'rest' }, { from: 9, to: 21, law: 'steady' }, { from: 21, to: 31, law: 'slow-in' }],
}
const keys = (...frames: number[]) => frames.map((frame) => ({ frame, reading: frame }))

describe('what the judge is asked while a list under several laws grows', () => {
  it('the first law alone, until the list passes its joint', () => {
    const request = typedRequest(claim, 24, keys(1, 3, 5))
    expect(request).toMatchObject({ law: 'odd-rule', start: 'rest' })
    expect(request).not.toHaveProperty('spans')
    expect(typedRequest(claim, 24, keys(1, 5, 9))).not.toHaveProperty('spans')
  })
  it('then as many as it has come to, over what is there', () => {
    expect(typedRequest(claim, 24, keys(1, 5, 9, 13, 15))?.spans).toEqual([claim.spans![0], { from: 9, to: 15, law: 'steady' }])
    expect(typedRequest(claim, 24, keys(1, 5, 9, 13, 21, 25, 35))?.spans).toEqual([claim.spans![0], claim.spans![1], { from: 21, to: 35, law: 'slow-in' }])
  })
  it('the later laws alone where the list begins behind a joint', () => {
    expect(typedRequest(claim, 24, keys(11, 15, 21, 25, 29))).toMatchObject({ law: 'steady', spans: [{ from: 11, to: 21, law: 'steady' }, { from: 21, to: 29, law: 'slow-in' }] })
    expect(typedRequest(claim, 24, keys(11, 15, 19))).toMatchObject({ law: 'steady' })
  })
  it('nothing while a joint has no drawing, or the list is of the other kind', () => {
    expect(typedRequest(claim, 24, keys(1, 5, 8, 13))).toBeNull()
    expect(typedRequest({ ...claim, measure: 'point' }, 24, keys(1, 5, 9))).toBeNull()
  })
  it('is always a question that the contract lets through', () => {
    for (let last = 3; last <= 41; last += 2) {
      const list = keys(...Array.from({ length: (last + 1) / 2 }, (_, i) => 1 + 2 * i))
      if (list.length >= 3) expect(checkRequest.safeParse(typedRequest(claim, 24, list)).success).toBe(true)
    }
  })
})
