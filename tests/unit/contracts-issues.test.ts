import { describe, expect, it } from 'vitest'
import { checkRequest, laws, missingJoint, requestFor } from '~/utils/contracts/check'
import { memberChange, signIn } from '~/utils/contracts/people'
import { claim, eventsQuery, newShot } from '~/utils/contracts/production'
import { newFlag } from '~/utils/contracts/take'
import { plainIssues } from '~/utils/contracts/issues'

const list = { law: 'topple', fps: 24, measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1, keys: [1, 2, 3].map((frame) => ({ frame, reading: frame })) }
const issuesOf = (change: object) => {
  const read = checkRequest.safeParse({ ...list, ...change })
  return read.success ? [] : plainIssues(read.error.issues)
}
const { fps: _fps, keys: _keys, ...said } = list
const issuesOfClaim = (change: object) => {
  const read = claim.safeParse({ ...said, ...change })
  return read.success ? [] : plainIssues(read.error.issues)
}

describe('faults by field', () => {
  it('has none for a good list', () => expect(issuesOf({})).toEqual([]))
  it('finds the key of a list', () => {
    expect(issuesOf({ keys: [{ frame: 1, reading: 0 }, { frame: 1.5, reading: Number.NaN }, { frame: 3, reading: 1 }] }).map(({ path }) => path)).toEqual([
      'keys[1].frame', 'keys[1].reading',
    ])
  })
  it('speaks for the body that was meant', () => {
    expect(issuesOf({ subject: { shape: 'block', width: 1, height: -3 } })[0]).toEqual({ path: 'subject.height', message: 'A size is above zero.' })
    expect(issuesOf({ subject: { shape: 'block', width: 1 } })).toEqual([{ path: 'subject.height', message: 'Write a number here.' }])
  })
  it('speaks for the path that was meant', () => {
    expect(issuesOf({ law: 'odd-rule', measure: 'distance', unit: 'px', subject: { slope: 100 } })[0]?.path).toBe('subject.slope')
  })
  it('names a shape that is not known', () => {
    expect(issuesOf({ subject: { shape: 'egg', height: 1 } })).toEqual([{ path: 'subject.shape', message: 'This is not one of the known kinds.' }])
  })
  it('names the choices', () => {
    expect(issuesOf({ law: 'magic' })).toEqual([{ path: 'law', message: `One of: ${laws.join(', ')}.` }])
  })
  it.each(['rest', 'any'])('takes a start %s from every law that can stand still', (start) => {
    for (const law of ['topple', 'pendulum', 'odd-rule']) expect(issuesOf({ law, start })).toEqual([])
  })
  it('refuses a rest that even spacing never has, in a check and in a claim', () => {
    const refused = [{ path: 'start', message: 'Even spacing never stands still at its first key: it can’t start from rest.' }]
    expect(issuesOf({ law: 'steady', start: 'rest' })).toEqual(refused)
    expect(issuesOf({ law: 'steady', start: 'any' })).toEqual([])
    const read = claim.safeParse({ ...said, law: 'steady', start: 'rest' })
    expect(read.success ? [] : plainIssues(read.error.issues)).toEqual(refused)
    expect(claim.parse({ ...said, start: 'rest' }).start).toBe('rest')
  })
  it('names the starts', () => {
    expect(issuesOf({ start: 'asleep' })).toEqual([{ path: 'start', message: 'One of: rest, any.' }])
  })
  it('names the measures', () => {
    const refused = [{ path: 'measure', message: 'One of: angle, distance, arc, point.' }]
    expect(issuesOf({ measure: 'smell' })).toEqual(refused)
    expect(issuesOf({ measure: undefined })).toEqual(refused)
    expect(issuesOfClaim({ measure: 'smell' })).toEqual(refused)
  })
  it.each([['flight', 'angle', 'A flight is read as points.'], ['bounce', 'arc', 'A bounce is read as a distance, or points.'], ['topple', 'distance', 'A topple is read as an angle, or an arc with its radius, or points.']])(
    'refuses a %s that is read as %s', (law, measure, message) => {
      const said = { law, measure, ...(measure === 'arc' ? { radius: 9 } : {}) }
      expect(issuesOf(said)).toEqual([{ path: 'measure', message }])
      expect(issuesOfClaim(said)).toEqual([{ path: 'measure', message }])
    },
  )
  it('knows what belongs to points, and what to readings', () => {
    const ofPoints = 'Only points on the drawing have a y axis, a path and a pivot.'
    expect(issuesOfClaim({ path: 'circle', pivot: { x: 0, y: 0 }, yAxis: 'up' })).toEqual([
      { path: 'yAxis', message: ofPoints }, { path: 'path', message: ofPoints }, { path: 'pivot', message: ofPoints },
    ])
    const ofReadings = 'Points need neither a radius nor a zero: both are found on the drawing.'
    expect(issuesOfClaim({ measure: 'point', radius: 4, zeroAt: 2 })).toEqual([{ path: 'radius', message: ofReadings }, { path: 'zeroAt', message: ofReadings }])
    expect(issuesOfClaim({ measure: 'point', path: 'spiral', pivot: { x: 1 } })).toEqual([
      { path: 'path', message: 'One of: line, circle, parabola.' }, { path: 'pivot.y', message: 'A coordinate is a number.' },
    ])
    expect(issuesOfClaim({ measure: 'point', path: 'circle', pivot: { x: 1, y: 2 }, yAxis: 'up' })).toEqual([])
  })
  it('tells a list of the other kind once, at its first key', () => {
    const points = [1, 2, 3].map((frame) => ({ frame, x: frame, y: frame }))
    expect(issuesOf({ keys: points })).toEqual([{ path: 'keys[0]', message: 'This is judged by readings: every key has a frame and a reading.' }])
    expect(issuesOf({ measure: 'point' })).toEqual([{ path: 'keys[0]', message: 'This is judged by points: every key has a frame, x and y.' }])
    expect(issuesOf({ measure: 'point', keys: points })).toEqual([])
    expect(issuesOf({ measure: 'point', keys: points.with(1, { frame: 2, x: 1, y: Infinity }) })).toEqual([{ path: 'keys[1].y', message: 'A coordinate is a number.' }])
    expect(issuesOf({ keys: undefined })).toEqual([{ path: 'keys', message: 'This is missing.' }])
  })
  it('names unknown fields', () => {
    expect(issuesOf({ weight: 3 })).toEqual([{ path: '', message: 'Unknown field: weight.' }])
  })

  it.each<[string, { safeParse: (value: unknown) => ReturnType<typeof checkRequest.safeParse> | ReturnType<typeof newShot.safeParse> }, unknown, string[]]>([
    ['no shot at all', newShot, 7, ['A group of named fields belongs here.']],
    ['a shot out of bounds', newShot, { clientId: 7, code: 'a_b', title: 7, sequence: 's', firstFrame: -1e9, lastFrame: 1e9, fps: 500, animator: 3 }, [
      'An id is a UUID.', 'Capital letters, digits and hyphens, like CLK-110.', 'A text belongs here.', 'Capital letters and digits, at most 8.',
      'At least -1,000,000.', 'At most 10,000,000.', 'At most 240.', 'An id is a UUID.',
    ]],
    ['a list that is none', checkRequest, { ...list, keys: 5, radius: -1 }, ['More than 0.', 'A list belongs here.']],
  ])('never speaks in the package’s own phrases: %s', (_, schema, value, sentences) => {
    const read = schema.safeParse(value)
    expect(read.success ? [] : plainIssues(read.error.issues).map(({ message }) => message)).toEqual(sentences)
  })
  it('has a sentence for every bound of the other inputs', () => {
    const frames = Array.from({ length: 2_001 }, () => 1)
    const faults = [
      memberChange.safeParse({ role: 'guest', version: 1.5 }),
      memberChange.safeParse({ role: 'guest', version: 0 }),
      signIn.safeParse({ email: 'a@pier.example', password: 'x'.repeat(201) }),
      eventsQuery.safeParse({ after: '1e308' }),
      newFlag.safeParse({ clientId: crypto.randomUUID(), fromFrame: 1, toFrame: 2, reason: 'x', finding: { kind: 'held', frames } }),
    ].flatMap((read) => (read.success ? [] : plainIssues(read.error.issues)))
    expect(faults.map(({ message }) => message)).toEqual([
      'A whole number belongs here.', 'At least 1.', 'At most 200 characters.', 'At most 9,007,199,254,740,991.', 'At most 2,000 in the list.',
    ])
  })
})

describe('faults of spans', () => {
  const keys = [1, 3, 5, 7, 9].map((frame) => ({ frame, reading: frame }))
  const halves = [{ from: 1, to: 5, law: 'topple' }, { from: 5, to: 9, law: 'pendulum' }]
  const faults = (spans: unknown) => issuesOf({ keys, spans })

  it('has none for spans that cover the list, or joints that are to be found', () => {
    expect(faults(halves)).toEqual([])
    expect(faults('find')).toEqual([])
    expect(issuesOfClaim({ spans: halves })).toEqual([])
  })
  it('takes from two to four, and nothing else', () => {
    expect(faults(halves.slice(0, 1))).toContainEqual({ path: 'spans', message: 'One law needs no spans: at least two.' })
    const five = [1, 2, 3, 4, 5].map((from) => ({ from, to: from + 1, law: 'topple' }))
    expect(faults(five)).toEqual([{ path: 'spans', message: 'At most 4 spans.' }])
    expect(faults('guess')).toEqual([{ path: 'spans', message: 'Spans are a list of two to four, or the word “find”.' }])
    expect(issuesOfClaim({ spans: 'find' })).toEqual([{ path: 'spans', message: 'A list belongs here.' }])
  })
  it('wants them end to end', () => {
    expect(issuesOfClaim({ spans: [halves[0], { ...halves[1], from: 6 }] })).toEqual([
      { path: 'spans[1].from', message: 'A span begins where the one before it ends: at frame 5.' },
    ])
    expect(issuesOfClaim({ spans: [{ ...halves[0], to: 1 }, { ...halves[1], from: 1 }] })).toEqual([{ path: 'spans[0].to', message: 'The span ends before it begins.' }])
  })
  it('wants the first law named twice alike', () => {
    expect(issuesOfClaim({ law: 'pendulum', spans: halves })).toEqual([{ path: 'law', message: 'With spans, the law is that of the first one.' }])
  })
  it('wants laws that the one measure can take, and rests that there can be', () => {
    expect(issuesOfClaim({ spans: [halves[0], { ...halves[1], law: 'flight' }] })).toEqual([{ path: 'spans[1].law', message: 'A flight is read as points.' }])
    expect(issuesOfClaim({ spans: [halves[0], { ...halves[1], law: 'steady', start: 'rest' }] })).toEqual([
      { path: 'spans[1].start', message: 'Even spacing never stands still at its first key: it can’t start from rest.' },
    ])
    expect(issuesOfClaim({ spans: [halves[0], { ...halves[1], subject: { shape: 'bob', length: 20_000 } }] })).toEqual([
      { path: 'spans[1].subject.length', message: 'At most 10,000 m.' },
    ])
  })
  it('wants ends on the ends of the list and joints on its drawings', () => {
    expect(faults([{ ...halves[0], from: 2, to: 6 }, { ...halves[1], from: 6, to: 11 }])).toEqual([
      { path: 'spans[0].from', message: 'The first span begins on the first key: at frame 1.' },
      { path: 'spans[1].to', message: 'The last span ends on the last key: at frame 9.' },
      { path: 'spans[0].to', message: 'Spans meet on a drawing: there is no key at frame 6.' },
    ])
  })
  it('a claim fixes the joints, not the length: its ends go with the list', () => {
    const divided = claim.parse({ ...said, spans: halves })
    const longer = [...keys, { frame: 13, reading: 13 }]
    expect(missingJoint(divided, longer)).toBeNull()
    expect(requestFor(divided, 24, longer).spans).toEqual([halves[0], { ...halves[1], to: 13 }])
    expect(missingJoint(divided, keys.filter(({ frame }) => frame !== 5))).toBe(5)
    expect(missingJoint(divided, keys.slice(0, 3))).toBe(5)
    expect(missingJoint(claim.parse(said), keys)).toBeNull()
  })
})
