import { describe, expect, it } from 'vitest'
import { strayInWords } from '~/utils/drawing/strays'
import { rangeHint } from '~/utils/shot/range'
import type { JudgedKey } from '~/utils/motion/types'

const key = (frame: number, reading: number, law: number, more: Partial<JudgedKey> = {}): JudgedKey => ({
  frame, reading, law, offset: reading - law, offsetFrames: null, gap: 2, lawGap: 2, allowance: 0.5, breaks: Math.abs(reading - law) > 0.5, ...more,
})

describe('a broken drawing in one sentence', () => {
  it('says where it is, where it should sit, how far past, and how early', () => {
    const keys = [key(1011, 37, 37), key(1013, 42, 39.4, { offsetFrames: 1.08 }), key(1015, 41.8, 41.8)]
    expect(strayInWords(keys, 1, 'deg')).toBe('Frame 1013: posted 42.0°, should sit at 39.4°, 2.6° past, 1.1 frames early')
    expect(strayInWords(keys, 0, 'deg')).toBe('')
    expect(strayInWords(keys, 7, 'deg')).toBe('')
  })
  it('knows which way is past where the readings fall', () => {
    const falling = [key(1, 50, 50, { lawGap: -2 }), key(2, 45, 48, { lawGap: -2, offsetFrames: 1.5 }), key(3, 49, 46, { lawGap: -2, offsetFrames: -1.5 })]
    expect(strayInWords(falling, 1, 'deg')).toContain('3.0° past, 1.5 frames early')
    expect(strayInWords(falling, 2, 'deg')).toContain('3.0° short, 1.5 frames late')
  })
  it('says no way where the law stands still', () => {
    expect(strayInWords([key(1, 5, 3, { lawGap: 0 })], 0, 'px')).toMatch(/, 2\.0.px off$/)
  })
  it('tells a drawing off its path as that, in the unit of the drawing', () => {
    const off = key(9, 20, 20, { breaks: true, point: { x: 1, y: 2 }, lawPoint: { x: 1, y: 14 }, offPath: -12 })
    expect(strayInWords([off], 0, 'deg', 1, 'px')).toMatch(/^Frame 9: 12\.0.px off the path$/)
  })
  it('tells a flight that strays sideways only as that', () => {
    const wide = key(9, 20, 20, { breaks: true, point: { x: 1, y: 2 }, offPath: 0, sideways: { reading: 44, law: 40, offset: 4, breaks: true } })
    expect(strayInWords([wide], 0, 'px')).toMatch(/^Frame 9: sideways 44\.0.px, should be 40\.0.px$/)
  })
})

describe('a list beyond its shot', () => {
  const shot = { firstFrame: 1001, lastFrame: 1048 }
  it('is told by how much, at either end', () => {
    expect(rangeHint([1001, 1048], shot)).toBe('')
    expect(rangeHint([], shot)).toBe('')
    expect(rangeHint([1001, 1049], shot)).toBe('The list runs 1 frame past the shot’s last, 1048.')
    expect(rangeHint([997, 1060], shot)).toBe('The list begins 4 frames before the shot does, at 1001, and runs 12 frames past the shot’s last, 1048.')
  })
})
