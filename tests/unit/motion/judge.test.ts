/** The judge's own sentences and edges, on lists small enough to follow by eye. */
import { describe, expect, it } from 'vitest'
import { judge, judgeInDepth, lawCurve, plannedList } from '../../../utils/motion'
import type { ReadingCheck, Key } from '../../../utils/motion'

/** A rod of 8 m from 5°, on twos, to tenths of a degree: 42 frames to flat. */
function tower(change: (keys: Key[]) => Key[] = keys => keys, more: Partial<ReadingCheck> = {}): ReadingCheck {
  const { keys } = plannedList({ law: 'topple', subject: { shape: 'rod', height: 8 }, lean: 5, fps: 24, exposure: 2, firstFrame: 1001, step: 0.1 })
  return { law: 'topple', fps: 24, measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1, keys: change(keys), ...more }
}

function drop(change: (keys: Key[]) => Key[] = keys => keys, more: Partial<ReadingCheck> = {}): ReadingCheck {
  const { keys } = plannedList({ law: 'odd-rule', subject: { unitsPerMetre: 80 }, travel: 400, fps: 24, exposure: 1, firstFrame: 1, step: 0.5 })
  return { law: 'odd-rule', fps: 24, measure: 'distance', unit: 'px', slop: 1, tolerance: 0.1, keys: change(keys), ...more }
}

const nudge = (index: number, by: number) => (keys: Key[]) => keys.map((key, i) => (i === index ? { ...key, reading: key.reading + by } : key))
/** Drawing `index` repeats the one before, and all later ones follow an exposure later. */
const hold = (index: number) => (keys: Key[]) => keys.map((key, i) => (i >= index ? { ...key, reading: keys[i - 1]?.reading ?? 0 } : key))
const skip = (index: number) => (keys: Key[]) => keys.slice(0, -1).map((key, i) => (i >= index ? { ...key, reading: keys[i + 1]?.reading ?? 0 } : key))

describe('a list that keeps its law', () => {
  it('holds, and reads as its own size', () => {
    const result = judge(tower())
    expect(result.verdict).toBe('holds')
    expect(result.reason).toBeNull()
    expect(result.findings).toEqual([])
    expect(result.readsAs.map(reading => reading.law)).toEqual(expect.arrayContaining(['topple', 'odd-rule', 'pendulum', 'steady']))
    expect(result.readsAs[0]?.law).toBe('topple')
    expect(result.readsAs[0]?.misfit).toBeLessThan(0.3)
    // Tenths of a degree over 21 drawings leave a size to one in a hundred.
    expect(result.size?.value).toBeGreaterThan(7.92)
    expect(result.size?.value).toBeLessThan(8.08)
    expect(result.claim).toBeNull()
    expect(result.ruled.claim).toBeNull()
    expect(result.ruled.fit).toHaveLength(result.keys.length)
  })

  it('agrees with a claim of that size, frames and readings', () => {
    const result = judge(tower(undefined, { subject: { shape: 'rod', height: 8 } }))
    expect(result.verdict).toBe('holds')
    expect(result.claim?.usedFrames).toBe((result.keys.length - 1) * 2)
    expect(Math.abs((result.claim?.frames ?? 0) - (result.claim?.usedFrames ?? 0))).toBeLessThanOrEqual(1)
    result.ruled.claim?.forEach((key, i) => expect(Math.abs(key.reading - (result.keys[i]?.reading ?? NaN))).toBeLessThan(1))
  })

  it('has its last gap open and its allowance from the law\'s gaps', () => {
    const { keys } = judge(drop())
    const last = keys[keys.length - 1]
    expect(last?.gap).toBeNull()
    expect(last?.lawGap).toBeNull()
    const [a, b, c] = keys
    expect(b?.allowance).toBeCloseTo(1 + 0.1 * ((b?.law ?? 0) - (a?.law ?? 0) + (c?.law ?? 0) - (b?.law ?? 0)) / 2, 10)
    expect(last?.allowance).toBeCloseTo(1 + 0.1 * ((last?.law ?? 0) - (keys[keys.length - 2]?.law ?? 0)), 10)
    expect(b?.offset).toBeCloseTo((b?.reading ?? 0) - (b?.law ?? 0), 12)
  })
})

describe('one cause, told once', () => {
  it('a drawing past the line is early, one short of it late', () => {
    const past = judge(tower(nudge(16, 6)))
    expect(past.findings).toHaveLength(1)
    expect(past.findings[0]).toMatchObject({ kind: 'misplaced', frames: [1033] })
    expect(past.findings[0]?.text).toMatch(/^Frame 1033 lands \d(\.\d)? frames? early \(\d\.\d° past the line\)\.$/)
    const short = judge(tower(nudge(16, -1.4)))
    expect(short.findings[0]?.text).toMatch(/^Frame 1033 lands \d(\.\d)? frames? late \(\d\.\d° short of the line\)\.$/)
  })

  it('early and late follow the way of travel', () => {
    const upside = drop(keys => nudge(9, 14)(keys).map(key => ({ ...key, reading: -key.reading })))
    expect(judge(upside).findings[0]?.text).toContain('early')
  })

  it('does not bend the line for one or two bad drawings', () => {
    const clean = judge(tower())
    const bad = judge(tower(keys => nudge(14, -3)(nudge(18, 7)(keys))))
    expect(bad.findings.map(finding => finding.frames[0]).sort()).toEqual([1029, 1037])
    bad.ruled.fit.forEach((key, i) => expect(Math.abs(key.reading - (clean.ruled.fit[i]?.reading ?? NaN))).toBeLessThan(0.15))
  })

  it('a held drawing makes all later ones late, and is one finding', () => {
    const result = judge(tower(hold(17)))
    expect(result.findings).toHaveLength(1)
    expect(result.findings[0]).toMatchObject({ kind: 'held', frames: [1035], amount: expect.closeTo(2, 9) as number })
    expect(result.findings[0]?.text).toBe('The drawing before frame 1035 is held: from there on every drawing is 2 frames late.')
    expect(result.keys.filter(key => key.breaks).every(key => key.frame >= 1035)).toBe(true)
  })

  it('near the start it is the few before it that are off', () => {
    const result = judge(drop(hold(5)))
    expect(result.findings).toHaveLength(1)
    expect(result.findings[0]?.kind).toBe('held')
    expect(result.findings[0]?.frames).toEqual([6])
    expect(result.findings[0]?.text).toContain('every drawing before it is 1 frame early')
    expect(result.keys.filter(key => key.breaks).every(key => key.frame < 6)).toBe(true)
  })

  it('a skipped drawing makes all later ones early', () => {
    const result = judge(drop(skip(12)))
    expect(result.findings.map(({ kind, frames }) => ({ kind, frames }))).toEqual([{ kind: 'skipped', frames: [13] }])
    expect(result.findings[0]?.text).toContain('1 frame early')
  })

  it('a reading against the motion is backward, not misplaced as well', () => {
    const result = judge(drop(keys => keys.map((key, i) => (i === 10 ? { ...key, reading: (keys[9]?.reading ?? 0) - 6 } : key))))
    expect(result.findings.map(({ kind, frames }) => ({ kind, frames }))).toEqual([{ kind: 'backward', frames: [11] }])
    expect(result.findings[0]?.amount).toBeCloseTo(6, 12)
  })

  it('repeated and slightly backward readings inside slop are pencil', () => {
    const result = judge(tower(keys => nudge(1, -0.2)(keys)))
    expect(result.findings).toEqual([])
  })

  it('a wrong size says what it reads as and what the claim needs', () => {
    const result = judge(tower(undefined, { subject: { shape: 'rod', height: 38 } }))
    expect(result.verdict).toBe('breaks')
    expect(result.findings).toHaveLength(1)
    // √(38/8) times the frames of the list.
    const needed = Math.round((result.claim?.usedFrames ?? 0) * Math.sqrt(38 / 8))
    expect(Math.abs((result.claim?.frames ?? 0) - needed)).toBeLessThanOrEqual(1)
    expect(result.findings[0]?.text).toBe(
      `Reads as ${result.size?.value.toFixed(2)} m (${result.size?.low.toFixed(2)}–${result.size?.high.toFixed(2)}); 38 m needs ${result.claim?.frames} frames, not ${result.claim?.usedFrames}.`,
    )
    expect(result.findings[0]?.amount).toBeCloseTo(8 / 38, 2)
  })

  it('a wrong drawing scale is told as gravity', () => {
    const result = judge(drop(undefined, { subject: { unitsPerMetre: 20 } }))
    expect(result.findings.map(finding => finding.kind)).toEqual(['wrong-scale'])
    expect(result.size?.unit).toBe('m/s²')
    expect(result.size?.value).toBeCloseTo(4 * 9.80665, 0)
    expect(judge(drop()).size?.unit).toBe('px/m')
    expect(judge(drop()).size?.value).toBeCloseTo(80, 0)
  })

  it('even spacing under another name is even spacing', () => {
    const keys = Array.from({ length: 12 }, (_, i) => ({ frame: i, reading: 7.5 * i }))
    const result = judge(drop(() => keys))
    expect(result.findings.map(finding => finding.text)).toEqual(['This is not the odd rule; it reads as even spacing.'])
    expect(result.readsAs[0]?.law).toBe('steady')
    expect(result.size).toBeNull()
  })

  it('a list that no law explains is wrong-law, not a dozen misplaced drawings', () => {
    const ease = Array.from({ length: 20 }, (_, i) => ({ frame: i, reading: Math.round(400 * (i / 19) ** 2 * (3 - 2 * i / 19)) }))
    const result = judge(drop(() => ease))
    expect(result.findings.map(finding => finding.kind)).toEqual(['wrong-law'])
    expect(result.findings[0]?.text).toMatch(/^No law here explains this list/)
  })
})

describe('undecided', () => {
  it.each([['steady', 3, 4], ['odd-rule', 4, 5], ['topple', 4, 5]] as const)('%s with %d keys', (law, count, needed) => {
    const result = judge(tower(keys => keys.slice(0, count), { law }))
    expect(result.verdict).toBe('undecided')
    expect(result.reason).toContain(`it takes ${needed}`)
    expect(result.keys).toHaveLength(count)
    expect(result.keys.every(key => key.law === null && !key.breaks)).toBe(true)
  })

  it('when nothing moves', () => {
    const still = Array.from({ length: 12 }, (_, i) => ({ frame: i, reading: i % 2 === 0 ? 4 : 4.2 }))
    expect(judge(tower(() => still))).toMatchObject({ verdict: 'undecided', findings: [], reason: expect.stringContaining('Nothing moves') as string })
  })

  it('when the measure has no such law', () => {
    expect(judge(drop(undefined, { law: 'pendulum' })).verdict).toBe('undecided')
  })
})

describe('measures', () => {
  it('an arc and a zero of its own read the same size as plain degrees', () => {
    const plain = judge(tower())
    const radius = 400
    const arc = judge(tower(keys => keys.map(key => ({ ...key, reading: (key.reading - 5) * Math.PI / 180 * radius })), {
      measure: 'arc', unit: 'px', radius, zeroAt: 5, slop: 0.3 * Math.PI / 180 * radius,
    }))
    expect(arc.verdict).toBe('holds')
    expect((arc.size?.value ?? NaN) / (plain.size?.value ?? NaN)).toBeCloseTo(1, 6)
  })
})

describe('the line for drawing', () => {
  it('runs between the drawings and, at the claim\'s pace, along the ruled list', () => {
    const request = tower(undefined, { subject: { shape: 'rod', height: 38 } })
    const { line, pace, result } = judgeInDepth(request)
    if (!line || pace === null) throw new Error('a fitted list with a claim has both')
    const [half = NaN] = lawCurve(line, request, [1020])
    expect(half).toBeGreaterThan(result.keys[9]?.law ?? NaN)
    expect(half).toBeLessThan(result.keys[10]?.law ?? NaN)
    expect(lawCurve(line, request, request.keys.map(key => key.frame), pace)).toEqual(result.ruled.claim?.map(key => key.reading))
  })
})
