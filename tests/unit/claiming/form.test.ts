import { describe, expect, it } from 'vitest'
import { formOf, readForm, withLaw } from '~/utils/claiming/form'
import { claimRows } from '~/utils/claiming/rows'
import type { Claim } from '~/utils/contracts/production'

const tower: Claim = { law: 'topple', measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1, subject: { shape: 'block', width: 6, height: 38 } }
const barrel: Claim = {
  law: 'odd-rule', measure: 'distance', unit: 'px', slop: 1, tolerance: 0.075,
  subject: { unitsPerMetre: 80, slope: 12, roll: 'cylinder', gravity: 1.62 },
}
const bell: Claim = { law: 'pendulum', measure: 'arc', unit: 'mm', radius: 420, zeroAt: -12, slop: 0.5, tolerance: 0.1, subject: { shape: 'bob', length: 1.4 } }
const pole: Claim = {
  law: 'topple', measure: 'angle', unit: 'deg', slop: 0, tolerance: 0,
  subject: { shape: 'pole', height: 3, mass: 4, headMass: 6, headHeight: 2.8 },
}
const slip: Claim = { law: 'odd-rule', measure: 'distance', unit: 'px', start: 'rest', slop: 1, tolerance: 0.1 }
const walk: Claim = { law: 'steady', measure: 'distance', unit: 'px', slop: 1, tolerance: 0.1 }

describe('a claim through its form', () => {
  it.each([['tower', tower], ['barrel', barrel], ['bell', bell], ['pole', pole], ['slip', slip], ['walk', walk]])('%s comes back as it was', (_, claim) => {
    expect(readForm(formOf(claim))).toEqual({ claim, complaints: {} })
  })
  it('reads decimal commas', () => {
    expect(readForm({ ...formOf(tower), slop: '0,25', tolerance: '12,5' }).claim).toMatchObject({ slop: 0.25, tolerance: 0.125 })
  })
  it('complains by field, and answers no claim', () => {
    const form = formOf(tower)
    const read = readForm({ ...form, slop: '', tolerance: '140', sizes: { ...form.sizes, height: 'tall', width: '-2' } })
    expect(read.claim).toBeNull()
    expect(Object.keys(read.complaints).sort()).toEqual(['slop', 'subject.height', 'subject.width', 'tolerance'])
    expect(read.complaints['subject.width']).toBe('A size is above zero.')
    expect(read.complaints['subject.height']).toBe('This is not a number.')
  })
  it('asks for the radius of an arc', () => {
    expect(readForm({ ...formOf(bell), radius: '' }).complaints.radius).toBe('Write a number here.')
  })
})

describe('changing the law', () => {
  it('drops what the new law can’t take', () => {
    const swing = withLaw(formOf(barrel), 'pendulum')
    expect([swing.measure, swing.body]).toEqual(['angle', 'none'])
    const fall = withLaw(formOf(tower), 'pendulum')
    expect(fall.body).toBe('none')
  })
  it('never says a body of a law that has none', () => {
    expect(readForm(withLaw(formOf(tower), 'steady')).claim).toEqual({ law: 'steady', measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1 })
  })
  it('never says a start from rest of even spacing, and says it again on coming back', () => {
    const even = withLaw(formOf(slip), 'steady')
    expect(readForm(even).claim).not.toHaveProperty('start')
    expect(readForm(withLaw(even, 'odd-rule')).claim?.start).toBe('rest')
  })
  it('leaves the sizes where they are, for coming back', () => {
    expect(withLaw(withLaw(formOf(tower), 'steady'), 'topple').sizes.height).toBe('38')
  })
})

it('says a claim line by line', () => {
  expect(claimRows(bell)).toEqual([
    ['Law', 'pendulum'], ['Readings', 'along the arc, in mm'], ['Radius of the arc', '420 mm'], ['Reading 0 stands for', '\u221212°'],
    ['Body', 'bob on 1.4 m'], ['Slop', '0.5 mm'], ['Tolerance', '10 % of the gap'],
  ])
})

it('says a start from rest, and nothing of any other', () => {
  const starts = (claim: Claim) => claimRows(claim).filter(([what]) => what === 'Start')
  expect(starts(slip)).toEqual([['Start', 'from rest']])
  expect(starts({ ...slip, start: 'any' })).toEqual([])
})
