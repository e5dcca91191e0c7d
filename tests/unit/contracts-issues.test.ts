import { describe, expect, it } from 'vitest'
import { checkRequest, laws } from '~/utils/contracts/check'
import { memberChange, signIn } from '~/utils/contracts/people'
import { claim, eventsQuery, newShot } from '~/utils/contracts/production'
import { newFlag } from '~/utils/contracts/take'
import { plainIssues } from '~/utils/contracts/issues'

const list = { law: 'topple', fps: 24, measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1, keys: [1, 2, 3].map((frame) => ({ frame, reading: frame })) }
const issuesOf = (change: object) => {
  const read = checkRequest.safeParse({ ...list, ...change })
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
    const { fps: _fps, keys: _keys, ...said } = list
    const read = claim.safeParse({ ...said, law: 'steady', start: 'rest' })
    expect(read.success ? [] : plainIssues(read.error.issues)).toEqual(refused)
    expect(claim.parse({ ...said, start: 'rest' }).start).toBe('rest')
  })
  it('names the starts', () => {
    expect(issuesOf({ start: 'asleep' })).toEqual([{ path: 'start', message: 'One of: rest, any.' }])
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
