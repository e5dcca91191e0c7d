/** The bars for divided lists of points, on fixed sets made by the bench's own generator (tests/bench/lists/makePointSpans.ts). */
import { describe, expect, it } from 'vitest'
import { judge } from '../../../utils/motion'
import type { CheckRequest } from '../../../utils/motion'
import { makePointSpans, POINT_SPAN_ROUND } from '../../bench/lists/makePointSpans'
import { POINT_PLAN, makePointLists } from '../../bench/lists/points'
import { scoreSpans } from '../../bench/spanScore'

describe('made lists of points in two and three spans', () => {
  const lists = makePointSpans(9 * POINT_SPAN_ROUND, 20265)
  const score = scoreSpans(lists)

  it('never flags a joint of a clean list', () => {
    const flagged = score.wrong.filter(({ list, result }) => list.truth.kind === 'clean' && result.findings.some(({ kind }) => kind === 'broken-joint'))
    expect(score.rows.filter(({ family }) => family.endsWith('clean')).reduce((sum, { lists }) => sum + lists, 0)).toBeGreaterThan(100)
    expect(flagged).toEqual([])
  })

  it('finds joints that jump', () => {
    expect(score.right / score.lists).toBeGreaterThanOrEqual(0.97)
  })

  it('asks for the contact to be named', () => {
    const silent = lists.filter(({ truth, spans }) => truth.kind === 'clean' && spans[0]?.contact)
    const told = silent.filter(({ request, spans }) => judge({ ...request, spans: spans.map(({ from, to, law }) => ({ from, to, law })) })
      .findings.some(({ kind }) => kind === 'broken-joint'))
    expect(silent.length).toBeGreaterThan(50)
    // Where a contact falls between two drawings, the span after it may be told as what is wrong.
    expect(told.length / silent.length).toBeGreaterThanOrEqual(0.8)
  })
})

/** Ten exposures of rolling at 12 units a frame, then a fall of ½·1.5·t² with `speed` units a frame sideways: school algebra, on twos. */
const offTable = (speed: number) => Array.from({ length: 21 }, (_, i) => {
  const t = Math.max(0, 2 * i - 20)
  return { frame: 1 + 2 * i, x: Math.round(i <= 10 ? 24 * i : 240 + speed * t), y: Math.round(100 + 0.75 * t * t) }
})

const spans = [{ from: 1, to: 21, law: 'steady' as const }, { from: 21, to: 41, law: 'flight' as const }]
const table = { law: 'steady' as const, fps: 24, measure: 'point' as const, unit: 'px', slop: 1.5, tolerance: 0.1, spans }

describe('rolling off a table', () => {
  it('tells both speeds where they carry over', () => {
    const { verdict, joints } = judge({ ...table, keys: offTable(12) })
    expect(verdict).toBe('holds')
    expect(joints?.[0]).toMatchObject({ frame: 21, holds: true })
    expect(joints?.[0]?.before).toBeCloseTo(12, 0)
    expect(joints?.[0]?.after).toBeCloseTo(12, 0)
    expect(joints?.[0]?.apart).toBeLessThan(1.5)
  })

  it('names the jump where they don’t', () => {
    const { findings, joints } = judge({ ...table, keys: offTable(20) })
    expect(findings.map(({ kind, frames }) => [kind, ...frames])).toEqual([['broken-joint', 21]])
    expect(findings[0]?.text).toMatch(/^At frame 21 the speed jumps from 12\.\d to (19\.9|20\.\d) px per frame: nothing there says contact\.$/)
    expect(findings[0]?.amount).toBeCloseTo(8, 0)
    expect(joints?.[0]?.holds).toBe(false)
  })

  it('tells a corner as a turn', () => {
    const keys = offTable(12).map((key, i) => (i > 10 ? { ...key, x: 480 - key.x } : key))
    expect(judge({ ...table, keys }).findings[0]?.text).toMatch(/^At frame 21 the motion turns off by 1[78]\d° at once: nothing there says contact\.$/)
  })

  it('blames a joint’s own drawing where both lines meet without it', () => {
    const keys = offTable(12).map((key, i) => (i === 10 ? { ...key, y: key.y - 14 } : key))
    const { findings, joints, keys: judged } = judge({ ...table, keys })
    expect(findings).toHaveLength(1)
    expect(['misplaced', 'off-path']).toContain(findings[0]?.kind)
    expect(findings[0]?.frames).toEqual([21])
    expect(joints?.[0]?.holds).toBe(true)
    expect(judged[10]?.breaks).toBe(true)
  })
})

describe('joints looked for between points', () => {
  const straight = /slope-steady-in: clean|fall-contact-rise: clean/

  it('finds them within one key where all lies on one line', () => {
    const lists = makePointSpans(5 * POINT_SPAN_ROUND, 20266).filter(({ family }) => straight.test(family))
    const found = lists.filter(({ request, spans: made }) => {
      const exposure = (request.keys[1]?.frame ?? 0) - (request.keys[0]?.frame ?? 0)
      const told = judge({ ...request, spans: 'find' }).spans ?? []
      return told.length === made.length && told.slice(0, -1).every(({ to, contact }, i) =>
        Math.abs(to - (made[i]?.to ?? Infinity)) <= exposure && contact === (made[i]?.contact ?? false))
    })
    expect(lists).toHaveLength(20)
    expect(found.length / lists.length).toBeGreaterThanOrEqual(0.95)
  })

  it('leaves points of a single law whole', () => {
    const whole = makePointLists(POINT_PLAN.length, 20267)
      .filter(({ family, truth: { kind } }) => ['clean', 'misplaced', 'off-path', 'held', 'skipped'].includes(kind) && !/no-path|straight/.test(family))
    expect(whole.length).toBeGreaterThan(25)
    for (const { family, request } of whole) expect(judge({ ...request, spans: 'find' } as CheckRequest).spans, family).toHaveLength(1)
  })
})
