import { describe, expect, it } from 'vitest'
import { formOf, lawGroups, readForm, withDivision, withLaw, withSpans } from '~/utils/claiming/form'
import { lawPicture } from '~/utils/claiming/pictures'
import { claimRows } from '~/utils/claiming/rows'
import { rowsOfSpans, withoutRow, withRow } from '~/utils/claiming/spans'
import { laws } from '~/utils/contracts/check'
import { claimInWords } from '~/utils/drawing/words'
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
const cart: Claim = {
  law: 'odd-rule', measure: 'distance', unit: 'px', slop: 1, tolerance: 0.1, subject: { unitsPerMetre: 80 },
  spans: [{ from: 1001, to: 1009, law: 'odd-rule', start: 'rest' }, { from: 1009, to: 1021, law: 'steady' }, { from: 1021, to: 1031, law: 'slow-in' }],
}
const crate: Claim = {
  law: 'topple', measure: 'point', unit: 'px', yAxis: 'up', pivot: { x: 120, y: -4.5 }, slop: 1, tolerance: 0.1, subject: { shape: 'block', width: 1, height: 2, gravity: 1.62 },
  spans: [{ from: 1, to: 20, law: 'topple', contact: true }, { from: 20, to: 40, law: 'flight', subject: { unitsPerMetre: 90, gravity: 1.62 } }],
}
const push: Claim = {
  law: 'steady', measure: 'distance', unit: 'px', slop: 1, tolerance: 0.1, subject: { slope: 12, roll: 'ball' },
  spans: [{ from: 1, to: 9, law: 'steady' }, { from: 9, to: 19, law: 'odd-rule' }],
}
const disc: Claim = { law: 'odd-rule', measure: 'point', unit: 'px', path: 'circle', pivot: { x: 0, y: 0 }, slop: 1, tolerance: 0.1 }
const throwing: Claim = { law: 'flight', measure: 'point', unit: 'px', slop: 1, tolerance: 0.1, subject: { unitsPerMetre: 60 } }
const walk: Claim = { law: 'steady', measure: 'distance', unit: 'px', slop: 1, tolerance: 0.1 }

describe('a claim through its form', () => {
  it.each([['tower', tower], ['barrel', barrel], ['bell', bell], ['pole', pole], ['slip', slip], ['walk', walk], ['cart', cart], ['crate', crate], ['push', push], ['disc', disc], ['throwing', throwing]])('%s comes back as it was', (_, claim) => {
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

describe('several laws', () => {
  const law = (form: ReturnType<typeof formOf>, i: number, change: object) => withSpans(form, form.spans.map((row, at) => (at === i ? { ...row, ...change } : row)))
  it('a joint that is moved moves for both of its laws', () => {
    const read = readForm(law(formOf(cart), 0, { to: '1011' })).claim!
    expect(read.spans!.map(({ from, to }) => [from, to])).toEqual([[1001, 1011], [1011, 1021], [1021, 1031]])
  })
  it('the claim’s law is the first one’s, and its start is said there', () => {
    const read = readForm(law(formOf(cart), 0, { law: 'steady' })).claim!
    expect(read.law).toBe('steady')
    expect(read.spans![0]).toEqual({ from: 1001, to: 1009, law: 'steady' })
    expect(read).not.toHaveProperty('start')
  })
  it('readings become what all of the laws can take', () => {
    expect(law(formOf(cart), 1, { law: 'topple' }).measure).toBe('angle')
    expect(law(formOf(cart), 1, { law: 'flight' }).measure).toBe('point')
    expect(law(law(formOf(cart), 0, { law: 'bounce' }), 1, { law: 'topple' }).measure).toBe('point')
    expect(law(formOf(cart), 2, { law: 'bounce' }).measure).toBe('distance')
  })
  it('complains at the row', () => {
    const { claim, complaints } = readForm({ ...law(formOf(cart), 1, { to: 'soon' }), firstFrame: '' })
    expect(claim).toBeNull()
    expect(complaints).toMatchObject({ 'spans[0].from': 'Write a number here.', 'spans[1].to': 'This is not a number.' })
    expect(readForm(law(formOf(cart), 0, { to: '1000' })).complaints).toEqual({ 'spans[0].to': 'The span ends before it begins.' })
  })
  it('a fault of a span’s own body is told at the one body field', () => {
    const form = formOf(crate)
    expect(readForm({ ...form, unitsPerMetre: '-1' }).complaints).toEqual({ 'subject.unitsPerMetre': 'A scale is above zero.' })
    expect(readForm({ ...form, ownGravity: '' }).complaints).toEqual({ 'subject.gravity': 'Write a number here.' })
  })
  it('begins as the one law in halves, and goes back to the first', () => {
    const two = withDivision(formOf(slip), true, 1001, 1031)
    expect(readForm(two).claim!.spans).toEqual([{ from: 1001, to: 1016, law: 'odd-rule', start: 'rest' }, { from: 1016, to: 1031, law: 'steady' }])
    const one = withDivision(two, false, 1001, 1031)
    expect(readForm(one).claim).toEqual(slip)
    expect(withDivision(one, true, 1, 2).spans).toEqual(two.spans)
  })
  it('gives and takes rows without a hole', () => {
    const rows = rowsOfSpans(cart.spans!)
    const four = withRow('1001', rows)
    expect(four.map(({ to }) => to)).toEqual(['1009', '1021', '1026', '1031'])
    expect(withRow('1001', four)).toEqual(four)
    expect(withoutRow(rows, 1).map(({ to, law: name }) => [to, name])).toEqual([['1021', 'odd-rule'], ['1031', 'slow-in']])
    expect(withoutRow(rows, 0).map(({ to }) => to)).toEqual(['1021', '1031'])
    expect(withoutRow(rows, 2).map(({ to }) => to)).toEqual(['1009', '1031'])
    expect(withoutRow(rows.slice(0, 2), 0)).toHaveLength(2)
  })
})

describe('points', () => {
  it('a pivot has both its numbers, or neither', () => {
    expect(readForm({ ...formOf(disc), pivotY: '' }).complaints).toEqual({ 'pivot.y': 'Write a number here.' })
    expect(readForm({ ...formOf(disc), pivotX: '', pivotY: '' }).claim).not.toHaveProperty('pivot')
  })
  it('says nothing that the law has no use for', () => {
    const flying = readForm(withLaw({ ...formOf(disc), yAxis: 'up' }, 'flight')).claim
    expect(flying).toEqual({ law: 'flight', measure: 'point', unit: 'px', yAxis: 'up', slop: 1, tolerance: 0.1 })
    expect(readForm(withLaw(formOf(disc), 'spin')).claim).toMatchObject({ pivot: { x: 0, y: 0 } })
    expect(readForm({ ...formOf(disc), path: 'line' }).claim).not.toHaveProperty('pivot')
    expect(readForm({ ...formOf(bell), measure: 'point' }).claim).not.toHaveProperty('zeroAt')
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

describe('several laws and points in words', () => {
  it('laws one after the other, with their joints', () => {
    expect(claimInWords(cart)).toBe('slow out · steady · slow in, joints at 1009 and 1021 · 80 px/m')
    expect(claimInWords(crate)).toBe('topple · flight, contact at 20 · block 1 × 2 m')
    expect(claimRows(cart)[0]).toEqual(['Laws', 'slow out · steady · slow in, joints at 1009 and 1021'])
    expect(claimRows(crate).slice(1, 4)).toEqual([['Readings', 'points, in px'], ['Points run', 'about 120, −4.5, y upwards'], ['Body', 'block 1 × 2 m; 90 px/m']])
  })
  it('points, along what and about what', () => {
    expect(claimRows(disc)).toContainEqual(['Points run', 'along a circle about 0, 0'])
    expect(claimRows(throwing).map(([what]) => what)).not.toContain('Points run')
  })
})

it('shows every law once, in a group', () => {
  expect(lawGroups.flatMap((group) => group.laws).sort()).toEqual([...laws].sort())
})

describe('the small pictures', () => {
  /** Where each tick crosses the path: the middle of its two ends. */
  const places = (law: (typeof laws)[number]) =>
    [...lawPicture(law).ticks.matchAll(/M(\S+) (\S+)L(\S+) (\S+?)(?=M|$)/g)].map(([, a, b, c, d]) => ({ x: (Number(a) + Number(c)) / 2, y: (Number(b) + Number(d)) / 2 }))
  const gaps = (law: (typeof laws)[number]) => {
    const at = places(law)
    return at.slice(1).map(({ x, y }, i) => Math.hypot(x - at[i]!.x, y - at[i]!.y))
  }
  it.each(laws)('%s has figures only, inside of its box', (law) => {
    expect(lawPicture(law).path).not.toContain('NaN')
    expect(places(law).length).toBeGreaterThanOrEqual(8)
    for (const { x, y } of places(law)) expect([x >= 0 && x <= 120, y >= -1 && y <= 49]).toEqual([true, true])
  })
  // Galileo's odd numbers: spaces of equal times from rest go as 1 : 3 : 5 : 7.
  it('the odd rule goes 1 : 3 : 5 …, a slow in the other way round', () => {
    const odd = gaps('odd-rule')
    for (const [i, gap] of odd.entries()) expect(gap / odd[0]!).toBeCloseTo(2 * i + 1, 1)
    for (const [i, gap] of gaps('slow-in').entries()) expect(gap).toBeCloseTo(odd.at(-1 - i)!, 1)
  })
  it('steady and spin keep their gap', () => {
    for (const law of ['steady', 'spin'] as const) for (const gap of gaps(law)) expect(gap).toBeCloseTo(gaps(law)[0]!, 1)
  })
  it('a pendulum is fastest in the middle, a topple at its end', () => {
    const swing = gaps('pendulum')
    expect(swing.indexOf(Math.max(...swing))).toBe(3)
    expect(gaps('topple')).toEqual([...gaps('topple')].sort((a, b) => a - b))
  })
})
