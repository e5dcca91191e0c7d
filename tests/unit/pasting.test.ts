import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { readNumber, readPaste } from '~/utils/pasting'

describe('numbers as people write them', () => {
  it.each([
    ['12', 12], ['1,5', 1.5], ['.5', 0.5], ['\u22123.25', -3.25], ['24.5°', 24.5], ['80 px', 80], ['1e3', 1000], ['"7"', 7],
  ])('%s is %d', (text, value) => expect(readNumber(text)).toBe(value))
  it.each(['', 'l2', '1.234,5', '1,2,3', 'NaN', 'Infinity', '1e999', '--2', '<b>'])('%j is none', (text) => expect(readNumber(text)).toBeNull())
})

describe('two columns from a sheet', () => {
  const keys = [{ frame: 1001, reading: 1.5 }, { frame: 1003, reading: 1.75 }, { frame: 1005, reading: 2.25 }]

  it.each([
    ['tabs', '1001\t1.5\n1003\t1.75\n1005\t2.25\n'],
    ['tabs and decimal commas', '1001\t1,5\r\n1003\t1,75\r\n1005\t2,25'],
    ['semicolons', '1001;1,5\n1003 ; 1,75\n1005;2.25'],
    ['commas', '1001,1.5\n1003, 1.75\n1005,2.25'],
    ['spaces', '1001  1.5\n1003 1.75\n1005 2.25'],
    ['spaces and decimal commas', '1001 1,5\n1003 1,75\n1005 2,25'],
    ['commas for both', '1001,1,5\n1003,1,75\n1005,2,25'],
    ['the other order', '1.5\t1001\n1.75\t1003\n2.25\t1005'],
    ['a header', 'Frame\tReading °\n1001\t1.5\n1003\t1.75\n1005\t2.25'],
    ['a header in the other order', 'angle;frame\n1,5;1001\n1,75;1003\n2,25;1005'],
    ['blank lines and a byte order mark', '\uFEFF1001\t1.5\n\n1003\t1.75\n  \n1005\t2.25\n\n'],
  ])('reads %s', (_, text) => {
    const pasted = readPaste(text)
    expect(pasted.problems).toEqual([])
    expect(pasted.keys).toEqual(keys)
  })

  it('takes gaps to the next drawing by the header, and adds them up from the start', () => {
    const pasted = readPaste('frame,gap\n1,1\n3,3\n5,5\n7,', { startReading: 10 })
    expect(pasted.keys.map(({ reading }) => reading)).toEqual([10, 11, 14, 19])
    expect(pasted.columns).toEqual(['frame', 'gap'])
    expect(pasted.gapSide).toBe('to the next')
    expect(pasted.problems).toEqual([])
  })
  it('adds the drawing that a last gap leads to, and says so', () => {
    const pasted = readPaste('1\t0.1\n3\t0.2\n5\t0.3', { holds: 'gap' })
    expect(pasted.keys).toEqual([{ frame: 1, reading: 0 }, { frame: 3, reading: 0.1 }, { frame: 5, reading: 0.3 }, { frame: 7, reading: 0.6 }])
    expect(pasted.notes.join(' ')).toContain('frame 7 was added')
  })
  it('sees from the empty first gap that gaps come from the drawing before', () => {
    const pasted = readPaste('frame\tspacing\n1\t\n3\t1\n5\t3')
    expect(pasted.gapSide).toBe('from the one before')
    expect(pasted.keys.map(({ reading }) => reading)).toEqual([0, 1, 4])
  })
  it('takes frame and reading out of a wider sheet by its header', () => {
    const pasted = readPaste('frame\tposted °\tlaw °\tgap °\n1\t1.5\t1.4\t0.2\n3\t1.7\t1.6\t')
    expect(pasted.columns).toEqual(['frame', 'reading', 'left out', 'left out'])
    expect(pasted.keys).toEqual([{ frame: 1, reading: 1.5 }, { frame: 3, reading: 1.7 }])
    expect(pasted.notes).toContain('2 columns were left out.')
  })
  it('lets the person say which column is which', () => {
    expect(readPaste('1 2\n2 4\n3 6').keys[1]).toEqual({ frame: 2, reading: 4 })
    expect(readPaste('1 2\n2 4\n3 6', { frameColumn: 1 }).keys[1]).toEqual({ frame: 4, reading: 2 })
  })
})

describe('what can’t be read', () => {
  it('is told by line, and the rest is kept', () => {
    const pasted = readPaste('frame\treading\n1\t0\n2\tl.5\n\nx\t3\n3\t\n4\t7\n4\t8\n3\t9\n2.5\t1')
    expect(pasted.keys).toEqual([{ frame: 1, reading: 0 }, { frame: 4, reading: 7 }])
    expect(pasted.problems).toEqual([
      { line: 3, message: '“l.5” is not a number.' },
      { line: 5, message: '“x” is not a frame.' },
      { line: 6, message: 'No reading for frame 3.' },
      { line: 8, message: 'Frame 4 stands twice.' },
      { line: 9, message: 'Frame 3 comes after frame 4: frames go upwards.' },
      { line: 10, message: '“2.5” is not a frame.' },
    ])
  })
  it('asks for two columns when there is one', () => {
    expect(readPaste('1\n2\n3').problems[0]?.message).toMatch(/^Only one column/)
  })
  it('says nothing about nothing', () => {
    expect(readPaste(' \n\n')).toMatchObject({ keys: [], problems: [] })
  })
  it('never throws, never answers a reading that is no number, never unordered frames', () => {
    fc.assert(
      fc.property(fc.string({ unit: fc.constantFrom(...'0123456789.,;\t\n -eEx°"') }), (text) => {
        const { keys } = readPaste(text)
        expect(keys.every(({ frame, reading }) => Number.isInteger(frame) && Number.isFinite(reading))).toBe(true)
        expect(keys.every(({ frame }, i) => i === 0 || frame > keys[i - 1]!.frame)).toBe(true)
      }),
      { numRuns: 500 },
    )
  })
  it('gives back any list that was written out with tabs', () => {
    const list = fc.uniqueArray(fc.integer({ min: 0, max: 5000 }), { minLength: 3, maxLength: 40 }).chain((frames) =>
      fc.tuple(fc.constant(frames.sort((a, b) => a - b)), fc.array(fc.integer({ min: -9999, max: 9999 }), { minLength: frames.length, maxLength: frames.length })),
    )
    fc.assert(
      fc.property(list, ([frames, tenths]) => {
        const keys = frames.map((frame, i) => ({ frame, reading: tenths[i]! / 10 }))
        const text = ['frame\treading', ...keys.map(({ frame, reading }) => `${frame}\t${reading}`)].join('\n')
        expect(readPaste(text).keys).toEqual(keys)
      }),
    )
  })
})
