import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { readBench, sameBench, writeBench } from '~/utils/bench/address'
import { gravityNames } from '~/utils/bench/gravities'
import { benchLaws, hasBody } from '~/utils/bench/laws'
import { exposures, freshSetup, isWhole, ranges, slowings, withBenchLaw } from '~/utils/bench/setup'
import type { NumberField } from '~/utils/bench/setup'
import { rolls } from '~/utils/contracts/check'
import { shapesFor } from '~/utils/claiming/form'

describe('the address of a bench', () => {
  it('is plain words and numbers', () => {
    const setup = { ...freshSetup(), body: 'block' as const, width: 6, height: 38, lean: 1.5, gravity: 'moon' as const, on: 1, beside: [1, 4] }
    expect(writeBench(setup)).toEqual({ law: 'topple', body: 'block', width: '6', height: '38', lean: '1.5', gravity: 'moon', on: '1', beside: '1,4' })
  })

  it('has no exponents, however small a number is', () => {
    const setup = { ...freshSetup(), law: 'flight' as const, throwAngle: -5.1e-13, landing: 2.5e-7, throwSpeed: 100 }
    expect(writeBench(setup)).toEqual({ law: 'flight', speed: '100', angle: '-0.000000000001', landing: '0.00000025' })
    expect(sameBench(readBench(writeBench(setup)), setup)).toBe(true)
    expect(writeBench({ ...setup, throwAngle: -1e-13 }).angle).toBe('0')
  })

  it('opens fresh where it says nothing', () => {
    expect(readBench({})).toEqual(freshSetup())
    expect(readBench(writeBench(freshSetup()))).toEqual(freshSetup())
  })

  // As they were sent while the bench knew four laws.
  it.each([
    [{ law: 'pendulum', body: 'bob', length: '1', amplitude: '40', beside: '4,16', have: '60' }, { law: 'pendulum', body: 'bob', length: 1, amplitude: 40, swings: 1, beside: [4, 16], have: 60 }],
    [{ law: 'odd-rule', way: '4', slope: '20', roll: 'ball', gravity: 'moon', on: '1' }, { law: 'odd-rule', way: 4, slope: 20, roll: 'ball', gravity: 'moon', on: 1, scale: 100 }],
    [{ law: 'steady', way: '3', speed: '2.5', scale: '40' }, { law: 'steady', way: 3, speed: 2.5, scale: 40 }],
    [{ law: 'topple', body: 'block', width: '6', height: '38', lean: '1.5', gravity: 'own', g: '4' }, { law: 'topple', body: 'block', width: 6, height: 38, lean: 1.5, gravity: 'own', ownGravity: 4 }],
  ])('an old address opens what it opened: %j', (query, setup) => {
    expect(readBench(query)).toMatchObject(setup)
    expect(writeBench(readBench(query))).toEqual(query)
  })

  it.each([
    [{ law: 'slow-in', way: '3', seconds: '1.5' }, { by: 'seconds', stopAfter: 1.5 }],
    [{ law: 'slow-in', way: '3', speed: '4' }, { by: 'speed', startSpeed: 4 }],
    [{ law: 'flight', speed: '9', angle: '-12.5', landing: '3' }, { throwSpeed: 9, throwAngle: -12.5, landing: 3 }],
    [{ law: 'over-edge', body: 'block', width: '1', height: '3', lean: '2', brink: '12' }, { body: 'block', brink: 12, lean: 2 }],
    [{ law: 'bounce', way: '2', back: '60', bounces: '4' }, { back: 60, bounces: 4 }],
    [{ law: 'swing-decay', body: 'bob', length: '1', amplitude: '20', lost: '8' }, { lost: 8, swings: 1 }],
    [{ law: 'spin', rate: '0.5', turns: '3' }, { rate: 0.5, turns: 3 }],
  ])('says a newer law in plain words: %j', (query, setup) => {
    expect(readBench(query)).toMatchObject(setup)
    expect(writeBench(readBench(query))).toEqual(query)
  })

  it.each([
    [{ law: 'gallop' }], [{ law: 'topple', body: 'bob' }], [{ height: '-3' }], [{ height: '0' }], [{ height: '1e9' }], [{ lean: '90' }],
    [{ fps: 'NaN' }], [{ fps: '241' }], [{ on: '5' }], [{ on: '2.0' }], [{ gravity: 'Jupiter' }], [{ beside: 'a,b' }], [{ have: 'many' }],
    [{ height: null }], [{ height: ['x', '3'] }], [{ roll: 'ball' }], [{ g: '4' }], [{ speed: '3' }], [{ seconds: '2' }], [{ law: 'topple', bounces: '2' }],
  ])('falls back where it can’t be read: %j', (query) => {
    expect(readBench(query)).toEqual(freshSetup())
  })

  it('keeps what can be read beside what can’t', () => {
    expect(readBench({ height: '3', lean: 'steep', beside: '1,x,4,1,16,64' })).toMatchObject({ height: 3, lean: ranges.lean.usual, beside: [1, 4, 16] })
  })

  it('comes back as it was sent', () => {
    const number = (field: NumberField) => {
      const { low, high } = ranges[field]
      if (isWhole(field)) return fc.integer({ min: low, max: high })
      return fc.double({ min: low, max: high, noNaN: true }).map((value) => Math.min(high, Math.max(low, Number(value.toPrecision(6)))))
    }
    const numbers = fc.record(Object.fromEntries((Object.keys(ranges) as NumberField[]).map((field) => [field, number(field)])) as Record<NumberField, fc.Arbitrary<number>>)
    const setups = fc
      .record({
        law: fc.constantFrom(...benchLaws), shape: fc.nat(), roll: fc.constantFrom(...rolls), gravity: fc.constantFrom(...gravityNames), on: fc.constantFrom(...exposures),
        by: fc.constantFrom(...slowings), numbers, have: fc.option(fc.integer({ min: 1, max: 5000 })), beside: fc.uniqueArray(fc.integer({ min: 1, max: 1000 }), { maxLength: 3 }),
      })
      .map(({ numbers: all, ...rest }) => ({ ...all, ...rest }))
      .map(({ law, shape, ...rest }) => {
        const shapes = shapesFor[law]
        return { ...withBenchLaw(freshSetup(), law), ...(hasBody(law) ? { body: shapes[shape % shapes.length]! } : {}), ...rest }
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
