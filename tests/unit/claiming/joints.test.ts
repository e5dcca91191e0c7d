import { describe, expect, it } from 'vitest'
import { formOf } from '~/utils/claiming/form'
import { findJoints, postedKeys, suitsTake } from '~/utils/claiming/joints'
import { requestFor } from '~/utils/contracts/check'
import type { Claim } from '~/utils/contracts/production'
import type { Take } from '~/utils/contracts/take'
import { judge } from '~/utils/motion'
import type { Key, PointKey } from '~/utils/motion/types'
import { carriedList, carriedSpans, flightPoints } from '../../helpers/kinds'

const claim: Claim = { law: 'odd-rule', measure: 'distance', unit: 'px', slop: 1, tolerance: 0.1 }
const takeOf = (keys: Key[] | PointKey[], under: Claim): Take => ({
  number: 3, by: { id: 'x', name: 'X' }, at: '', note: '', verdict: 'breaks', withdrawnAt: null, ruling: null, flags: [], waivers: [], judgeVersion: 'x', fps: 24,
  claim: under, answer: judge(requestFor(under, 24, keys)),
})

describe('the joints of a posted list', () => {
  it('are where its speed changes its law', () => {
    const found = findJoints(formOf(claim), takeOf(carriedList, claim))
    expect(found).toMatchObject({ firstFrame: 1001, rows: carriedSpans.map(({ to, law }) => ({ to: String(to), law, contact: false })) })
  })
  it('are none where one law is enough, and it says so', () => {
    const fall = Array.from({ length: 16 }, (_, i) => ({ frame: 1 + 2 * i, reading: 1.5 * i * i }))
    expect(findJoints(formOf(claim), takeOf(fall, claim))).toEqual({ rows: null, why: 'One law is enough for take 3: no joint was found.' })
  })
  it('are found between points, too', () => {
    const drawn: Claim = { ...claim, measure: 'point' }
    const points = carriedList.map(({ frame, reading }) => ({ frame, x: 200 + 0.6 * reading, y: 90 + 0.8 * reading }))
    const found = findJoints(formOf(drawn), takeOf(points, drawn))
    expect(found).toMatchObject({ firstFrame: 1001, rows: carriedSpans.map(({ to, law }) => ({ to: String(to), law, contact: false })) })
  })
  it('wait for a form that can be read', () => {
    expect(findJoints({ ...formOf(claim), slop: '' }, takeOf(carriedList, claim))).toEqual({ rows: null, why: 'Write a number here.' })
  })
})

it('a take’s list is told as it was posted, and offered only to a form of its own kind', () => {
  const flying: Claim = { ...claim, law: 'flight', measure: 'point' }
  expect(postedKeys(takeOf(carriedList, claim))).toEqual(carriedList)
  expect(postedKeys(takeOf(flightPoints, flying))).toEqual(flightPoints)
  expect([suitsTake(formOf(claim), takeOf(carriedList, claim)), suitsTake(formOf(claim), takeOf(flightPoints, flying)), suitsTake(formOf(flying), takeOf(flightPoints, flying)), suitsTake(formOf(claim), null)]).toEqual([true, false, true, false])
})
