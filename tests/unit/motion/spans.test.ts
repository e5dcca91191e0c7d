/** Lists divided into spans: how parts are put together, what is said of joints, and what is told once. Readings are school algebra, worked beside each. */
import { describe, expect, it } from 'vitest'
import { findSpans, judge, judgeInDepth, lawCurve } from '../../../utils/motion'
import type { Key, ReadingCheck, Span } from '../../../utils/motion'

/** From rest 4 px per frame more every two frames' gap up to frame 1021 (r = 2i² at the i-th drawing), then even gaps of `gap`. */
function outThenEven(gap: number, up = 0): Key[] {
  const out = Array.from({ length: 11 }, (_, i) => ({ frame: 1001 + 2 * i, reading: 2 * i * i }))
  const even = Array.from({ length: 8 }, (_, i) => ({ frame: 1023 + 2 * i, reading: 200 + up + gap * (i + 1) }))
  return [...out, ...even]
}

const SPANS: Span[] = [{ from: 1001, to: 1021, law: 'odd-rule' }, { from: 1021, to: 1037, law: 'steady' }]

function request(keys: Key[], spans: ReadingCheck['spans'] = SPANS): ReadingCheck {
  return { law: 'odd-rule', fps: 24, measure: 'distance', unit: 'px', slop: 1, tolerance: 0.1, keys, spans }
}

describe('a divided list', () => {
  // The slope of 2i² at i = 10 is 40 a drawing, 20 px per frame: gaps of 40 carry it over.
  it('holds where position and speed carry over', () => {
    const result = judge(request(outThenEven(40)))
    expect(result.verdict).toBe('holds')
    expect(result.findings).toEqual([])
    expect(result.size).toBeNull()
    expect(result.readsAs).toEqual([])
    expect(result.spans?.map(({ from, to, law, verdict }) => [from, to, law, verdict]))
      .toEqual([[1001, 1021, 'odd-rule', 'holds'], [1021, 1037, 'steady', 'holds']])
    expect(result.joints).toHaveLength(1)
    const [joint] = result.joints ?? []
    expect(joint).toMatchObject({ frame: 1021, contact: false, holds: true })
    expect(joint?.before).toBeCloseTo(20, 6)
    expect(joint?.after).toBeCloseTo(20, 6)
    expect(joint?.apart).toBeCloseTo(0, 6)
  })

  it('tells every key once, gaps running on over the joint', () => {
    const keys = outThenEven(40)
    const result = judge(request(keys))
    expect(result.keys.map(({ frame }) => frame)).toEqual(keys.map(({ frame }) => frame))
    const joint = result.keys.find(({ frame }) => frame === 1021)
    expect(joint?.gap).toBe(40)
    expect(joint?.lawGap).toBeCloseTo(40, 6)
    expect(result.ruled.fit.map(({ frame }) => frame)).toEqual(keys.map(({ frame }) => frame))
  })

  it('finds a speed that jumps, with the speeds on both sides', () => {
    const result = judge(request(outThenEven(60)))
    expect(result.verdict).toBe('breaks')
    expect(result.findings).toHaveLength(1)
    const [finding] = result.findings
    expect(finding).toMatchObject({ kind: 'broken-joint', frames: [1021] })
    expect(finding?.amount).toBeCloseTo(10, 6)
    expect(finding?.text).toBe('At frame 1021 the speed jumps from 20.0 to 30.0 px per frame: nothing there says contact.')
    expect(result.spans?.every(({ verdict }) => verdict === 'holds')).toBe(true)
  })

  it('lets the speed jump at a contact, not the position', () => {
    const spans = SPANS.map((span, i) => (i === 0 ? { ...span, contact: true } : span))
    expect(judge(request(outThenEven(60), spans)).verdict).toBe('holds')
    // Lines that cross within an exposure meet: a turn from 40 forward to 20 back may hide 60 px; 150 it can't.
    const apart = judge(request(outThenEven(-20, 150), spans))
    expect(apart.findings.map(({ kind, frames }) => [kind, frames])).toEqual([['broken-joint', [1021]]])
    expect(apart.findings[0]?.text).toMatch(/don’t meet: their lines lie 150 px apart/)
  })

  it('takes a contact between two drawings', () => {
    // Hit half an exposure after the tenth drawing, at 2·10.5² = 220.5, back up by 16 a drawing.
    const out = outThenEven(0).slice(0, 11)
    const back = Array.from({ length: 8 }, (_, i) => ({ frame: 1023 + 2 * i, reading: 220.5 - 16 * (i + 0.5) }))
    const spans: Span[] = [{ from: 1001, to: 1021, law: 'odd-rule', contact: true }, { from: 1021, to: 1037, law: 'steady' }]
    const result = judge(request([...out, ...back], spans))
    expect(result.findings).toEqual([])
    expect(result.verdict).toBe('holds')
    expect(result.keys).toHaveLength(19)
    expect(result.keys.find(({ frame }) => frame === 1021)).toMatchObject({ gap: 12.5, breaks: false })
  })

  it('finds spans whose positions don’t meet', () => {
    const result = judge(request(outThenEven(40, 25)))
    expect(result.findings.map(({ kind, frames }) => [kind, frames])).toEqual([['broken-joint', [1021]]])
    expect(result.findings[0]?.text).toBe('At frame 1021 the spans don’t meet: their lines lie 25.0 px apart.')
    expect(result.joints?.[0]?.apart).toBeCloseTo(25, 6)
  })

  it('tells a misplaced drawing at the joint once, and not as a broken joint', () => {
    const keys = outThenEven(40).map(key => (key.frame === 1021 ? { ...key, reading: 225 } : key))
    const result = judge(request(keys))
    expect(result.findings.map(({ kind, frames }) => [kind, frames])).toEqual([['misplaced', [1021]]])
    expect(result.findings[0]?.amount).toBeCloseTo(25, 3)
    expect(result.joints?.[0]?.holds).toBe(true)
    expect(result.keys.filter(({ breaks }) => breaks).map(({ frame }) => frame)).toEqual([1021])
  })

  it('finds a misplaced drawing inside a span, and a held one without blaming the joint', () => {
    const moved = outThenEven(40).map(key => (key.frame === 1011 ? { ...key, reading: 68 } : key))
    expect(judge(request(moved)).findings.map(({ kind, frames }) => [kind, frames])).toEqual([['misplaced', [1011]]])
    const held = outThenEven(40).map(key => (key.frame >= 1013 ? { ...key, frame: key.frame + 2 } : key))
    held.splice(6, 0, { frame: 1013, reading: 50 })
    const spans: Span[] = [{ from: 1001, to: 1023, law: 'odd-rule' }, { from: 1023, to: 1039, law: 'steady' }]
    const result = judge(request(held, spans))
    expect(result.findings.map(({ kind, frames }) => [kind, frames])).toEqual([['held', [1013]]])
    expect(result.joints?.[0]?.holds).toBe(true)
  })

  it('puts the span’s frames to what is wrong with all of it', () => {
    const even = outThenEven(40).map(key => (key.frame < 1021 ? { ...key, reading: 10 * (key.frame - 1001) } : key))
    const result = judge(request(even))
    expect(result.findings.map(({ kind, frames }) => [kind, frames])).toEqual([['wrong-law', [1001, 1021]]])
    expect(result.findings[0]?.text).toBe('From frame 1001 to 1021: this is not the odd rule; it reads as even spacing.')
  })

  it('says which span is too short, and holds nothing else against it', () => {
    const spans: Span[] = [{ from: 1001, to: 1005, law: 'odd-rule' }, { from: 1005, to: 1021, law: 'odd-rule' }, { from: 1021, to: 1037, law: 'steady' }]
    const result = judge(request(outThenEven(40), spans))
    expect(result.verdict).toBe('undecided')
    expect(result.reason).toMatch(/^From frame 1001 to 1005: 3 keys are too few for the odd rule/)
    expect(result.spans?.map(({ verdict }) => verdict)).toEqual(['undecided', 'holds', 'holds'])
    expect(result.joints?.[0]).toMatchObject({ before: null, apart: null, holds: true })
  })

  it('takes the nearest key for a joint that is none, and the list’s ends for the outer ones', () => {
    const spans: Span[] = [{ from: 900, to: 1020, law: 'odd-rule' }, { from: 1020, to: 2000, law: 'steady' }]
    const result = judge(request(outThenEven(40), spans))
    // 1020 lies midway between two drawings: the earlier one.
    expect(result.spans?.map(({ from, to }) => [from, to])).toEqual([[1001, 1019], [1019, 1037]])
    expect(result.keys).toHaveLength(19)
  })

  it('takes a rest for even spacing of no gap', () => {
    const spans: Span[] = [{ from: 1001, to: 1021, law: 'odd-rule', contact: true }, { from: 1021, to: 1037, law: 'steady' }]
    const result = judge(request(outThenEven(0), spans))
    expect(result.verdict).toBe('holds')
    expect(result.joints?.[0]?.after).toBe(0)
  })

  it('reads a size for every span that has one, the claim’s subject going where it is of use', () => {
    // 960 px at 80 px a metre: a = 784.532 px/s², from rest.
    const a = 80 * 9.80665
    const keys = Array.from({ length: 13 }, (_, i) => ({ frame: i, reading: Math.round(10 * a * (i / 24) ** 2 / 2) / 10 }))
    const after = Array.from({ length: 8 }, (_, i) => ({ frame: 13 + i, reading: keys[12]!.reading + Math.round(10 * a * 0.5 / 24 * (i + 1)) / 10 }))
    const spans: Span[] = [{ from: 0, to: 12, law: 'odd-rule', start: 'rest' }, { from: 12, to: 20, law: 'steady' }]
    const result = judge({ ...request([...keys, ...after], spans), subject: { unitsPerMetre: 80 } })
    expect(result.verdict).toBe('holds')
    expect(result.spans?.[0]?.size?.unit).toBe('m/s²')
    expect(result.spans?.[0]?.size?.value).toBeCloseTo(9.80665, 1)
    expect(result.spans?.[1]?.size).toBeNull()
  })

  it('hands out every span’s line for drawing', () => {
    const { line, parts } = judgeInDepth(request(outThenEven(40)))
    expect(line).toBeNull()
    expect(parts).toHaveLength(2)
    const [first] = parts ?? []
    const drawn = first?.judgement.line && lawCurve(first.judgement.line, first.request as ReadingCheck, [1006])
    // Halfway between the third and the fourth drawing: 2 · 2.5².
    expect(drawn?.[0]).toBeCloseTo(12.5, 6)
  })
})

describe('joints looked for', () => {
  it('finds where the law changes and judges the list by that', () => {
    const found = request(outThenEven(40), 'find')
    const spans: Span[] = [{ from: 1001, to: 1021, law: 'odd-rule' }, { from: 1021, to: 1037, law: 'steady' }]
    expect(findSpans(found)).toEqual(spans)
    expect(judge(found)).toEqual(judge(request(outThenEven(40), spans)))
  })

  it('says contact where the speed jumps', () => {
    const spans = findSpans(request(outThenEven(-30), 'find'))
    expect(spans).toEqual([{ from: 1001, to: 1021, law: 'odd-rule', contact: true }, { from: 1021, to: 1037, law: 'steady' }])
  })

  it('leaves a single law whole, and judges it as ever', () => {
    const keys = outThenEven(40).slice(0, 11)
    const found = judge(request(keys, 'find'))
    const { spans, joints, ...rest } = found
    expect(spans?.map(({ from, to, law, verdict }) => [from, to, law, verdict])).toEqual([[1001, 1021, 'odd-rule', 'holds']])
    expect(joints).toEqual([])
    const { spans: _none, ...plain } = request(keys)
    expect(rest).toEqual(judge(plain))
    expect(findSpans(request(keys, 'find'))).toEqual([{ from: 1001, to: 1021, law: 'odd-rule' }])
  })

  it('keeps a lone misplaced drawing inside its span', () => {
    const keys = outThenEven(40).map(key => (key.frame === 1011 ? { ...key, reading: 68 } : key))
    const result = judge(request(keys, 'find'))
    expect(result.spans?.map(({ from, to }) => [from, to])).toEqual([[1001, 1021], [1021, 1037]])
    expect(result.findings.map(({ kind, frames }) => [kind, frames])).toEqual([['misplaced', [1011]]])
  })
})
