import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { passesOf, runsOf } from '~/utils/drawing/passes'

describe('passesOf', () => {
  it('gives the way back a pass of its own, from the drawing after the turn', () => {
    expect(passesOf([0, 10, 18, 20, 18, 10, 0], 1)).toEqual([0, 0, 0, 0, 1, 1, 1])
  })
  it('takes a wobble within the slack for no turn', () => {
    expect(passesOf([0, 10, 20, 19.5, 30], 1)).toEqual([0, 0, 0, 0, 0])
  })
  it('starts anew after a whole turn', () => {
    expect(passesOf([0, 120, 240, 360, 480, 600, 720], 2, 350)).toEqual([0, 0, 0, 1, 1, 1, 2])
  })
  it('counts upwards by ones, one number per reading', () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: -1e6, max: 1e6, noNaN: true }), { maxLength: 80 }), (readings) => {
        const passes = passesOf(readings, 5)
        expect(passes).toHaveLength(readings.length)
        passes.forEach((pass, i) => expect(pass - (passes[i - 1] ?? 0)).toBeOneOf([0, 1]))
      }),
    )
  })
})

describe('runsOf', () => {
  it('joins neighbours', () => {
    expect(runsOf([0, 1, 1, 0, 1], (one) => one === 1)).toEqual([
      [1, 2],
      [4, 4],
    ])
  })
})
