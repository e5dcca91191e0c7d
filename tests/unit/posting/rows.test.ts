import { describe, expect, it } from 'vitest'
import { draftKey, readDraft } from '~/utils/posting/draft'
import { fillFrames, gapText, joinKeys, nextFrame, pointGapText, readRows, roundedKeys, rowsFromKeys, withGap } from '~/utils/posting/rows'

const rows = rowsFromKeys([{ frame: 1, reading: 0 }, { frame: 3, reading: 1 }, { frame: 5, reading: 4 }, { frame: 7, reading: 9 }])

describe('rows to keys', () => {
  it('reads whole rows and passes over empty ones', () => {
    const list = [...rows.slice(0, 2), { id: 9, frame: ' ', reading: '' }, ...rows.slice(2)]
    expect(readRows(list)).toEqual({
      keys: [{ frame: 1, reading: 0 }, { frame: 3, reading: 1 }, { frame: 5, reading: 4 }, { frame: 7, reading: 9 }],
      rowOf: [0, 1, 3, 4],
      issues: [],
    })
  })
  it('tells each fault at its cell and keeps the rest', () => {
    const list = ['1 0', '2.5 1', '3 x', '3 2', '2 3', '4 ', ' 5', '6 1e9', '7 1'].map((text, id) => {
      const [frame = '', reading = ''] = text.split(' ')
      return { id, frame, reading }
    })
    const { keys, issues } = readRows(list)
    expect(keys).toEqual([{ frame: 1, reading: 0 }, { frame: 7, reading: 1 }])
    expect(issues.map(({ row, column }) => `${row} ${column}`)).toEqual([
      '1 frame', '2 reading', '3 frame', '4 frame', '5 reading', '6 frame', '7 reading',
    ])
  })
})

describe('gaps', () => {
  it('lead to the next row', () => {
    expect(rows.map((_, i) => gapText(rows, i))).toEqual(['1', '3', '5', ''])
  })
  it('carry every later drawing with them', () => {
    const moved = withGap(rows, 1, 2.5)
    expect(moved.map(({ reading }) => reading)).toEqual(['0', '1', '3.5', '8.5'])
    expect(gapText(moved, 2)).toBe('5')
  })
  it('set only the next drawing where that has no reading yet', () => {
    const open = rows.map((row, i) => (i === 2 ? { ...row, reading: '' } : row))
    expect(withGap(open, 1, 2).map(({ reading }) => reading)).toEqual(['0', '1', '3', '9'])
  })
  it('leave the list alone where there is nothing to start from', () => {
    expect(withGap([{ id: 1, frame: '1', reading: '' }, ...rows], 0, 2)).toEqual([{ id: 1, frame: '1', reading: '' }, ...rows])
  })
})

describe('filling and joining', () => {
  it('numbers rows every n frames and drops no reading', () => {
    expect(fillFrames(rows, 1001, 2, 2).map(({ frame, reading }) => `${frame}:${reading}`)).toEqual(['1001:0', '1003:1', '1005:4', '1007:9'])
    const longer = fillFrames(rows, 0, 1, 6)
    expect(longer.map(({ frame }) => frame)).toEqual(['0', '1', '2', '3', '4', '5'])
    expect(new Set(longer.map(({ id }) => id)).size).toBe(6)
  })
  it('goes on at the same step', () => {
    expect(nextFrame(rows)).toBe(9)
    expect(nextFrame([])).toBeNull()
  })
  it('joins a pasted list by frame', () => {
    const joined = joinKeys([...rows, { id: 77, frame: '', reading: '3' }], [{ frame: 4, reading: 2 }, { frame: 5, reading: 5 }])
    expect(joined.map(({ frame, reading }) => `${frame}:${reading}`)).toEqual(['1:0', '3:1', '4:2', '5:5', '7:9', ':3'])
  })
})

it('writes the law’s readings no finer than a hundredth of the slop', () => {
  const keys = [{ frame: 1, reading: 1.5228178400712 }]
  expect([0.3, 5, 0.02, 0, 1000].map((slop) => roundedKeys(keys, slop)[0]!.reading)).toEqual([1.523, 1.52, 1.5228, 1.5228, 1.5])
})

describe('a list of points', () => {
  const points = [{ frame: 1, x: 0, y: 10 }, { frame: 3, x: 3, y: 14 }, { frame: 5, x: 6, y: 22.5 }]
  const list = rowsFromKeys(points)
  it('comes back as it was', () => {
    expect(readRows(list, 'point')).toEqual({ keys: points, rowOf: [0, 1, 2], issues: [] })
  })
  it('tells each fault at its cell and keeps the rest', () => {
    const faulty = [...list, { id: 7, frame: '7', reading: '', x: '1' }, { id: 8, frame: '8', reading: '', x: 'a', y: '1e9' }, { id: 9, frame: '', reading: '', x: '', y: '2' }, { id: 10, frame: '', reading: '' }]
    const { keys, issues } = readRows(faulty, 'point')
    expect(keys).toEqual(points)
    expect(issues).toEqual([
      { row: 3, column: 'y', message: 'Frame 7 has no y yet.' },
      { row: 4, column: 'x', message: 'A coordinate is a number.' },
      { row: 4, column: 'y', message: 'A coordinate lies within ±1,000,000.' },
      { row: 5, column: 'frame', message: 'Which frame?' },
      { row: 5, column: 'x', message: 'There is no x yet.' },
    ])
  })
  it('has gaps as the eye measures them', () => {
    // 3, 4, 5: the oldest right angle there is.
    expect(list.map((_, i) => pointGapText(list, i))).toEqual(['5.0', '9.0', ''])
    expect(pointGapText([list[0]!, { id: 2, frame: '2', reading: '', x: '4' }], 0)).toBe('')
  })
  it('is numbered and joined without losing a point', () => {
    expect(fillFrames(list, 101, 2, 1).map(({ frame, x, y }) => [frame, x, y])).toEqual([['101', '0', '10'], ['103', '3', '14'], ['105', '6', '22.5']])
    expect(joinKeys(list, [{ frame: 3, x: 4, y: 15 }, { frame: 4, x: 5, y: 18 }]).map(({ frame, x }) => `${frame}:${x}`)).toEqual(['1:0', '3:4', '4:5', '5:6'])
  })
  it('is rounded as readings are', () => {
    expect(roundedKeys([{ frame: 1, x: 1.23456, y: -9.87654 }], 1)).toEqual([{ frame: 1, x: 1.23, y: -9.88 }])
  })
})

describe('the draft', () => {
  const draft = { v: 1, clientId: '7d3f3a52-7c8a-4a34-9f0e-0d6c1f3f2b11', rows, note: 'n', savedAt: '2026-01-01T00:00:00.000Z' }
  it('comes back as it was kept', () => expect(readDraft(JSON.stringify(draft))).toEqual(draft))
  it('keeps points', () => {
    const points = { ...draft, v: 2, rows: rowsFromKeys([{ frame: 1, x: 2, y: 3 }]) }
    expect(readDraft(JSON.stringify(points))).toEqual(points)
  })
  it.each([null, '', '{', '[]', '{"v":2}', JSON.stringify({ ...draft, v: 3 }), JSON.stringify({ ...draft, clientId: 'x' })])('%j is none', (text) => expect(readDraft(text)).toBeNull())
  it('is one per shot and person', () => {
    expect(draftKey('p', 'A-1', 'x')).not.toBe(draftKey('p', 'A-1', 'y'))
  })
})
