import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { describeBody, equalLength, namedSize, pathAcceleration, sizeForLength, uprightLean } from '../../../utils/motion'
import type { BodySubject } from '../../../utils/motion'

const bodies: [string, BodySubject, number][] = [
  ['rod', { shape: 'rod', height: 3 }, 2],
  ['block', { shape: 'block', width: 3, height: 4 }, 10 / 3],
  ['pole without a head', { shape: 'pole', height: 3, mass: 2, headMass: 0, headHeight: 3 }, 2],
  ['pole that is all head', { shape: 'pole', height: 3, mass: 0, headMass: 5, headHeight: 2.5 }, 2.5],
  ['bob', { shape: 'bob', length: 1.2 }, 1.2],
  ['hung rod', { shape: 'hung-rod', length: 1.5 }, 1],
  ['custom', { shape: 'custom', equalLength: 0.8 }, 0.8],
]

describe('equal-pendulum length', () => {
  it.each(bodies)('%s', (_name, body, length) => expect(equalLength(body)).toBeCloseTo(length, 14))

  it('of a thin block and a thin cylinder is the rod\'s', () => {
    expect(equalLength({ shape: 'block', width: 1e-9, height: 3 })).toBeCloseTo(2, 12)
    expect(equalLength({ shape: 'cylinder', radius: 1e-9, height: 3 })).toBeCloseTo(2, 12)
  })

  it('of a flat disc on its rim is 5r/4 (I = 5mr²/4 about a tangent in its plane, textbook)', () => {
    expect(equalLength({ shape: 'cylinder', radius: 2, height: 1e-9 })).toBeCloseTo(2.5, 12)
  })

  it('grows with the body, and back again', () => {
    const length = fc.double({ min: 0.01, max: 100, noNaN: true })
    fc.assert(fc.property(length, length, length, fc.double({ min: 0.1, max: 20, noNaN: true }), (a, b, c, factor) => {
      const small: BodySubject[] = [
        { shape: 'rod', height: a }, { shape: 'block', width: a, height: b }, { shape: 'cylinder', radius: a, height: b },
        { shape: 'pole', height: a, mass: b, headMass: c, headHeight: a / 2 },
      ]
      const large: BodySubject[] = [
        { shape: 'rod', height: a * factor }, { shape: 'block', width: a * factor, height: b * factor },
        { shape: 'cylinder', radius: a * factor, height: b * factor },
        { shape: 'pole', height: a * factor, mass: b, headMass: c, headHeight: a * factor / 2 },
      ]
      small.forEach((body, i) => {
        const grown = large[i] as BodySubject
        expect(equalLength(grown) / equalLength(body)).toBeCloseTo(factor, 8)
        expect(sizeForLength(body, equalLength(grown)) / namedSize(grown)).toBeCloseTo(1, 10)
      })
    }), { numRuns: 60, seed: 3 })
  })
})

describe('ramps', () => {
  it.each([
    ['slide', 1], ['ball', 5 / 7], ['cylinder', 2 / 3], ['shell', 3 / 5], ['hoop', 1 / 2],
  ] as const)('%s keeps its share of gravity', (roll, share) => {
    expect(pathAcceleration({ roll, slope: 30, gravity: 10 })).toBeCloseTo(5 * share, 12)
  })

  it('falls freely when nothing is said', () => expect(pathAcceleration({})).toBeCloseTo(9.80665, 12))
})

describe('words', () => {
  it('name the body, its size and any other gravity', () => {
    expect(describeBody({ shape: 'rod', height: 38 })).toBe('a rod 38 m tall')
    expect(describeBody({ shape: 'bob', length: 1.25, gravity: 1.62 })).toBe('a bob on 1.25 m of cord, gravity 1.62 m/s²')
    expect(describeBody({ unitsPerMetre: 80 })).toBe('a free fall at 80 units per metre')
    expect(describeBody({ slope: 30, roll: 'ball' })).toBe('something that rolls as a solid ball on a slope of 30°')
  })

  it('tell how far a standing block is from balance', () => {
    expect(uprightLean({ shape: 'block', width: 1, height: 1 })).toBeCloseTo(45, 12)
    expect(uprightLean({ shape: 'rod', height: 1 })).toBe(0)
  })
})
