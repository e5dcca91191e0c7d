/** Periods of a pendulum: the table of the project's motion sheet (30-digit arithmetic), the seconds pendulum, and small swings. */
import { describe, expect, it } from 'vitest'
import { STANDARD_GRAVITY, swingPeriod } from '../../utils/motion'

const bob = { shape: 'bob', length: 1 } as const
const small = 2 * Math.PI * Math.sqrt(1 / STANDARD_GRAVITY)

describe('period over 2π√(L/g)', () => {
  it.each([
    [5, 1.00047617249], [10, 1.00190718814], [20, 1.00766902579], [30, 1.01740879760], [45, 1.03997334320], [60, 1.07318200715],
    [90, 1.18034059902], [120, 1.37288050062], [150, 1.76220372950], [170, 2.43936271967], [179, 3.90106516039],
  ])('at %d°', (amplitude, ratio) => {
    expect(Math.abs(swingPeriod(bob, amplitude) / small - ratio)).toBeLessThan(6e-12)
  })

  it('tends to one for small swings, as 1 + A²/16 (DLMF 19.5.1, second term)', () => {
    const amplitude = 0.5
    const radians = amplitude * Math.PI / 180
    // The next term is 11A⁴/3072, 2e-11 here.
    expect(Math.abs(swingPeriod(bob, amplitude) / small - 1 - radians * radians / 16)).toBeLessThan(3e-11)
  })

  it('a swing of two seconds hangs on 0.99362 m (textbook value at standard gravity)', () => {
    expect(swingPeriod({ shape: 'bob', length: 0.99362 }, 1e-3)).toBeCloseTo(2, 5)
  })
})
