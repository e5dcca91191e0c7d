import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { readBench, sameBench, writeBench } from '~/utils/bench/address'
import { gravityNames } from '~/utils/bench/gravities'
import { benchLaws, exposures, freshSetup, ranges, withBenchLaw } from '~/utils/bench/setup'
import { rolls } from '~/utils/contracts/check'
import { shapesFor, turns } from '~/utils/claiming/form'

describe('the address of a bench', () => {
  it('is plain words and numbers', () => {
    const setup = { ...freshSetup(), body: 'block' as const, width: 6, height: 38, lean: 1.5, gravity: 'moon' as const, on: 1, beside: [1, 4] }
    expect(writeBench(setup)).toEqual({ law: 'topple', body: 'block', width: '6', height: '38', lean: '1.5', gravity: 'moon', on: '1', beside: '1,4' })
  })

  it('opens fresh where it says nothing', () => {
    expect(readBench({})).toEqual(freshSetup())
    expect(readBench(writeBench(freshSetup()))).toEqual(freshSetup())
  })

  it.each([
    [{ law: 'gallop' }], [{ law: 'topple', body: 'bob' }], [{ height: '-3' }], [{ height: '0' }], [{ height: '1e9' }], [{ lean: '90' }],
    [{ fps: 'NaN' }], [{ fps: '241' }], [{ on: '5' }], [{ on: '2.0' }], [{ gravity: 'Jupiter' }], [{ beside: 'a,b' }], [{ have: 'many' }],
    [{ height: null }], [{ height: ['x', '3'] }], [{ roll: 'ball' }], [{ g: '4' }],
  ])('falls back where it can’t be read: %j', (query) => {
    expect(readBench(query)).toEqual(freshSetup())
  })

  it('keeps what can be read beside what can’t', () => {
    expect(readBench({ height: '3', lean: 'steep', beside: '1,x,4,1,16,64' })).toMatchObject({ height: 3, lean: ranges.lean.usual, beside: [1, 4, 16] })
  })

  it('comes back as it was sent', () => {
    const number = (field: keyof typeof ranges) =>
      fc.double({ min: ranges[field].low, max: ranges[field].high, noNaN: true }).map((value) => Math.max(ranges[field].low, Number(value.toPrecision(6))))
    const setups = fc
      .record({
        law: fc.constantFrom(...benchLaws), shape: fc.nat(), roll: fc.constantFrom(...rolls), gravity: fc.constantFrom(...gravityNames), on: fc.constantFrom(...exposures),
        height: number('height'), width: number('width'), lean: number('lean'), amplitude: number('amplitude'), way: number('way'), slope: number('slope'),
        speed: number('speed'), scale: number('scale'), ownGravity: number('ownGravity'), fps: number('fps'),
        have: fc.option(fc.integer({ min: 1, max: 5000 })), beside: fc.uniqueArray(fc.integer({ min: 1, max: 1000 }), { maxLength: 3 }),
      })
      .map(({ law, shape, ...rest }) => {
        const shapes = shapesFor[law]
        return { ...withBenchLaw(freshSetup(), law), ...(turns(law) ? { body: shapes[shape % shapes.length]! } : {}), ...rest }
      })
    fc.assert(
      fc.property(setups, (setup) => {
        const there = readBench(writeBench(setup))
        expect(sameBench(there, setup)).toBe(true)
        expect(readBench(writeBench(there))).toEqual(there)
      }),
    )
  })
})
