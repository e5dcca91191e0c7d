import { describe, expect, it } from 'vitest'
import { paceOf, waitAfter } from '~/server/services/letters/pace'

const SECOND = 1000
const HOUR = 3600 * SECOND
const pace = paceOf(30)

describe('waits between tries', () => {
  it('are 30 s, 2 min, 10 min, 1 h, 6 h and then a day', () => {
    const middle = [1, 2, 3, 4, 5, 6, 7, 8].map((attempt) => waitAfter(attempt, pace, 0.5))
    expect(middle).toEqual([30 * SECOND, 120 * SECOND, 600 * SECOND, HOUR, 6 * HOUR, 24 * HOUR, 24 * HOUR, 24 * HOUR])
  })
  it('are shifted by a fifth at most, and always grow', () => {
    expect(waitAfter(1, pace, 0)).toBe(24 * SECOND)
    expect(waitAfter(1, pace, 1)).toBe(36 * SECOND)
    for (let attempt = 1; attempt < 6; attempt++) expect(waitAfter(attempt, pace, 1)).toBeLessThan(waitAfter(attempt + 1, pace, 0))
  })
})

describe('the pace', () => {
  it.each([30, 1, 0.25])('of %d s never lets a lease end before its delivery', (seconds) => {
    const { connect, silence, send, lease } = paceOf(seconds)
    expect(connect).toBeLessThan(send)
    expect(silence).toBeLessThan(send)
    expect(send).toBeLessThan(lease)
  })
  it.each([0, -1, Number.NaN, Number.POSITIVE_INFINITY])('of %d is none: half a minute is taken', (seconds) => {
    expect(paceOf(seconds)).toEqual(pace)
  })
})
