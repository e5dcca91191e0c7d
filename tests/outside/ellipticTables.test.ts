/**
 * Jacobi's functions and the first integral against published values and a second implementation.
 * Where digits were written down from memory the test says so; the library (@stdlib, after Moshier's Cephes) is the second opinion.
 */
import ellipj from '@stdlib/math-base-special-ellipj'
import ellipk from '@stdlib/math-base-special-ellipk'
import { describe, expect, it } from 'vitest'
import { carlsonRF, completeF, incompleteF, jacobi, ladder } from '../../utils/motion/elliptic'

const out = new Float64Array(3)

describe('complete integral K', () => {
  it.each([
    // A&S table 17.1 (the ½ row is also in the project's motion sheet); the other digits from memory, checked by the library below.
    [0, 1.57079632679490],
    [0.1, 1.61244134872022],
    [0.5, 1.85407467730137],
    [0.9, 2.57809211334817],
    [0.99, 3.69563736298987],
  ])('K(%d)', (m, value) => {
    // Fourteen decimals were written down; 1e-13 leaves their last digit.
    expect(Math.abs(completeF(1 - m) - value)).toBeLessThan(1e-13)
  })

  it('agrees with the library over the whole range', () => {
    let worst = 0
    for (let m = 0; m < 0.9999; m += 0.0007) worst = Math.max(worst, Math.abs(completeF(1 - m) / ellipk(m) - 1))
    expect(worst).toBeLessThan(1e-14)
  })

  it('goes as L + (1 − m)/4·(L − 1), L = ln(4/√(1 − m)), near one (DLMF 19.12.1, two terms)', () => {
    for (const m1 of [1e-8, 1e-16, 1e-40, 1e-200]) {
      const lead = Math.log(4 / Math.sqrt(m1))
      // What is left is of order m₁², and rounding in a number of up to 232.
      expect(Math.abs(completeF(m1) - lead - m1 / 4 * (lead - 1))).toBeLessThan(1e-15 + 1e-15 * lead * 4)
    }
  })
})

describe('incomplete integral F', () => {
  it.each([
    // A&S table 17.5 is laid out by modular angle α, m = sin²α; F(30°\30°) = 0.52942863 and F(60°\45°) = 1.14242906, from memory.
    [30, 30, 0.52942863],
    [60, 45, 1.14242906],
    [90, 45, 1.85407468],
    // α = 90°: F is the inverse Gudermannian, ln tan(π/4 + φ/2) (DLMF 4.23.41).
    [45, 90, 0.88137359],
  ])('F(%d°\\%d°)', (phi, alpha, value) => {
    const p = phi * Math.PI / 180
    const a = alpha * Math.PI / 180
    expect(Math.abs(incompleteF(Math.sin(p), Math.cos(p), Math.cos(a) ** 2) - value)).toBeLessThan(6e-9)
  })

  it('is the inverse of the amplitude', () => {
    for (const m1 of [1, 0.5, 0.01, 1e-6, 1e-14]) {
      const l = ladder(m1)
      for (const part of [-1.9, -1, -0.5, -0.01, 0.02, 0.3, 0.77, 0.999, 1.4]) {
        const u = part * l.quarter
        jacobi(l, u, out)
        // Close to the turning of a nearly upright swing sn and cn hold u only to the rounding of cn over its slope, √m₁.
        expect(Math.abs(incompleteF(out[0] as number, out[1] as number, m1) - u)).toBeLessThan(1e-12 * (1 + l.quarter))
      }
    }
  })

  it('R_F(x, x, x) = x^-½ and R_F(0, 1, 2) (DLMF 19.20.1; Carlson 1995, the value from memory)', () => {
    expect(carlsonRF(4, 4, 4)).toBeCloseTo(0.5, 15)
    expect(Math.abs(carlsonRF(0, 1, 2) - 1.3110287771461)).toBeLessThan(1e-13)
  })
})

describe('sn, cn, dn', () => {
  it.each([
    // A&S 16.5.2: values at K/2, in closed form.
    [0.5], [0.1], [0.9], [0.999999],
  ])('at half a quarter, m = %d', (m) => {
    const m1 = 1 - m
    const l = ladder(m1)
    jacobi(l, l.quarter / 2, out)
    const root = Math.sqrt(m1)
    expect(Math.abs((out[0] as number) - 1 / Math.sqrt(1 + root))).toBeLessThan(1e-14)
    expect(Math.abs((out[1] as number) - Math.sqrt(root / (1 + root)))).toBeLessThan(1e-14)
    expect(Math.abs((out[2] as number) - Math.sqrt(root))).toBeLessThan(1e-14)
  })

  it('sn² + cn² = 1, dn² + m sn² = 1 (DLMF 22.6.1) and agreement with the library', () => {
    let worstIdentity = 0
    let worstLibrary = 0
    for (const m of [0, 0.05, 0.3, 0.5, 0.8, 0.99, 0.9999]) {
      const l = ladder(1 - m)
      for (let u = -9; u <= 9; u += 0.13) {
        jacobi(l, u, out)
        const [sn = 0, cn = 0, dn = 0] = out
        worstIdentity = Math.max(worstIdentity, Math.abs(sn * sn + cn * cn - 1), Math.abs(dn * dn + m * sn * sn - 1))
        const [libSn = 0, libCn = 0, libDn = 0] = ellipj(u, m)
        worstLibrary = Math.max(worstLibrary, Math.abs(sn - libSn), Math.abs(cn - libCn), Math.abs(dn - libDn))
      }
    }
    expect(worstIdentity).toBeLessThan(1e-14)
    // The library is good to a few units in the fifteenth place per period; nine quarter periods are walked here.
    expect(worstLibrary).toBeLessThan(1e-12)
  })
})
