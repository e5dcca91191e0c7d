import { describe, expect, it } from 'vitest'
import { readPointPaste } from '~/utils/pastingPoints'

const points = [{ frame: 1, x: 10, y: 20.5 }, { frame: 3, x: 12, y: 24 }, { frame: 5, x: 16, y: -31 }]

describe('a pasted table of points', () => {
  it.each([
    ['tabs', '1\t10\t20.5\n3\t12\t24\n5\t16\t-31'],
    ['commas', '1,10,20.5\n3,12,24\n5,16,-31'],
    ['semicolons and decimal commas', '1;10;20,5\n3;12;24\n5;16;−31'],
    ['spaces', '1 10 20.5\n3  12 24\n5 16 -31'],
    ['a header', 'Frame\tx\ty\n1\t10\t20.5\n3\t12\t24\n5\t16\t-31'],
    ['a header in another order', 'y, px; pos x; frame\n20.5;10;1\n24;12;3\n-31;16;5'],
    ['more columns than are wanted', 'frame\tnote\tx\ty\n1\t9\t10\t20.5\n3\t9\t12\t24\n5\t9\t16\t-31'],
  ])('%s', (_, text) => {
    const { keys, problems } = readPointPaste(text)
    expect(problems).toEqual([])
    expect(keys).toEqual(points)
  })
  it('does not take three whole numbers between commas for a decimal', () => {
    expect(readPointPaste('1,10,20\n2,11,21\n3,12,22').keys[1]).toEqual({ frame: 2, x: 11, y: 21 })
  })
  it('puts columns where a person says they are', () => {
    expect(readPointPaste('1\t10\t20', { x: 2, y: 1 }).keys).toEqual([{ frame: 1, x: 20, y: 10 }])
  })
  it('tells a line that can’t be read by its number, and keeps the rest', () => {
    const { keys, problems } = readPointPaste('frame\tx\ty\n1\t10\t20\n2\t\t21\n3\t12\tup\n1\t3\t4\n4\t13\t23')
    expect(keys.map(({ frame }) => frame)).toEqual([1, 4])
    expect(problems).toEqual([
      { line: 3, message: 'No x for frame 2.' }, { line: 4, message: '“up” is not a number.' }, { line: 5, message: 'Frame 1 stands twice.' },
    ])
  })
  it('wants three columns', () => {
    expect(readPointPaste('1\t10\n2\t11')).toMatchObject({ keys: [], problems: [{ line: 1, message: 'Three columns are needed: paste frame, x and y side by side.' }] })
    expect(readPointPaste('')).toMatchObject({ keys: [], problems: [] })
  })
})
