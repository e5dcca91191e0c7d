import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { v4 } from 'uuid'
import { Production, Take } from '~/server/models'
import type { Shot } from '~/server/models'
import { row, rows, run, write } from '~/server/models/database'
import { news } from '~/server/services/news'
import { reopen, rule } from '~/server/services/rulings'
import { postTake, takeBack } from '~/server/services/takes'
import { Failure } from '~/server/utils/fail'
import type { newRuling } from '~/utils/contracts/take'
import type { z } from 'zod'
import { addShot, addTake, brokenFall, fall, seedHouse } from '../../../helpers/seed'
import type { House } from '../../../helpers/seed'
import { openEmptyStore, rowCounts } from '../../../helpers/store'

let close: () => Promise<void>
let house: House
let shot: Shot
let heard: number[]
const listen = ({ n }: { n: number }) => heard.push(n)

beforeEach(async () => {
  close = await openEmptyStore()
  house = await seedHouse()
  shot = await addShot(house)
  await addTake(shot, house.people.animator)
  heard = []
  news.on('event', listen)
})
afterEach(async () => {
  news.off('event', listen)
  await close()
})

type Wishes = Partial<z.infer<typeof newRuling>>
/** Everything read afresh inside the transaction, as a route does it. */
const ruleOn = (wishes: Wishes = {}, number = 1, who: 'supervisor' | 'otherSupervisor' = 'supervisor') =>
  write(async () => rule(
    {
      production: await Production.findByPk(house.production.id, { rejectOnEmpty: true }),
      shot: await shot.reload(),
      take: await Take.findOne({ where: { shotId: shot.id, number }, rejectOnEmpty: true }),
      person: house.people[who],
    },
    { clientId: v4(), decision: 'goes-back', note: '', version: shot.version, ...wishes },
  ))
const post = (keys = fall()) =>
  write(async () => postTake(
    { production: house.production, shot: await shot.reload(), person: house.people.animator },
    { clientId: v4(), keys, note: '' },
  ))
const refusal = async (attempt: Promise<unknown>) => {
  const problem = await attempt.then(() => null, (one: unknown) => one)
  expect(problem).toBeInstanceOf(Failure)
  return (problem as Failure).toWire()
}

describe('a ruling is one transaction', () => {
  it('stores the ruling, its event, its letters and the shot’s new version', async () => {
    const { made, answer } = await ruleOn({ decision: 'stands-with-notes', note: 'Mind the settle.' })
    expect(made).toBe(true)
    expect(answer).toMatchObject({ take: 1, decision: 'stands-with-notes', note: 'Mind the settle.', by: { id: house.people.supervisor.id }, reopened: null })
    expect(await rows('SELECT kind, n, take_number AS take FROM events')).toEqual([{ kind: 'ruling', n: 1, take: 1 }])
    // The take's animator and the coordinator; never who ruled.
    const letters = await rows<{ personId: string }>('SELECT person_id AS personId FROM letters ORDER BY person_id')
    expect(letters.map(({ personId }) => personId)).toEqual([house.people.animator.id, house.people.coordinator.id].sort())
    expect((await shot.reload()).version).toBe(2)
    expect(heard).toEqual([1])
  })

  it.each(['letters', 'events'])('leaves no row behind when the %s can’t be written, and works once they can', async (table) => {
    await run(`CREATE TRIGGER full BEFORE INSERT ON ${table} BEGIN SELECT RAISE(ABORT, 'the disk is full'); END`)
    const before = { counts: await rowCounts(), shot: (await shot.reload()).toJSON(), n: await row('SELECT event_number FROM productions WHERE id = :id', { id: house.production.id }) }
    const clientId = v4()
    await expect(ruleOn({ clientId })).rejects.toMatchObject({ parent: { message: 'SQLITE_CONSTRAINT: the disk is full' } })
    expect({ counts: await rowCounts(), shot: (await shot.reload()).toJSON(), n: await row('SELECT event_number FROM productions WHERE id = :id', { id: house.production.id }) }).toEqual(before)
    expect(heard).toEqual([])

    await run('DROP TRIGGER full')
    expect((await ruleOn({ clientId })).made).toBe(true)
    expect((await rowCounts()).rulings).toBe(1)
    expect(heard).toEqual([1])
  })

  it('is made once, however often it is sent', async () => {
    const clientId = v4()
    const version = shot.version
    const answers = await Promise.all(Array.from({ length: 5 }, () => ruleOn({ clientId, version })))
    expect(answers.map(({ made }) => made).sort()).toEqual([false, false, false, false, true])
    expect(new Set(answers.map(({ answer }) => JSON.stringify(answer))).size).toBe(1)
    expect(await rowCounts()).toMatchObject({ rulings: 1, events: 1, letters: 2 })
  })

  it('of two supervisors who rule at once, one rules and the other is told', async () => {
    const { version } = shot
    const results = await Promise.allSettled([ruleOn({ version, decision: 'stands' }), ruleOn({ version }, 1, 'otherSupervisor')])
    const failed = results.filter((result) => result.status === 'rejected')
    expect(failed).toHaveLength(1)
    expect((failed[0]!.reason as Failure).toWire()).toMatchObject({
      statusCode: 409, message: 'Take 1 has been ruled on already.', data: { current: { version: version + 1 } },
    })
    expect((await rowCounts()).rulings).toBe(1)
  })
})

describe('a ruling is refused', () => {
  it('when the ruler looked at an older version, with what stands now', async () => {
    await shot.update({ version: 5, title: 'Changed meanwhile' })
    expect(await refusal(ruleOn({ version: 4 }))).toMatchObject({
      statusCode: 409, data: { current: { version: 5, title: 'Changed meanwhile', desk: 'supervisor' } },
    })
  })

  it('on a take that is not the newest, or was taken back', async () => {
    const second = await post()
    expect((await refusal(ruleOn())).message).toBe('Take 2 is newer: rule on that one.')
    await write(async () => takeBack({
      production: house.production, shot: await shot.reload(), take: await Take.findOne({ where: { number: second.answer.number }, rejectOnEmpty: true }), person: house.people.animator,
    }))
    expect((await refusal(ruleOn({}, 2))).message).toBe('Take 2 was taken back.')
    expect((await ruleOn()).answer.take).toBe(1)
  })

  it('when its id already stands for the ruling on another take', async () => {
    const clientId = v4()
    await ruleOn({ clientId })
    await post()
    expect((await refusal(ruleOn({ clientId }, 2))).statusCode).toBe(409)
  })
})

describe('a settled shot', () => {
  const again = (version = shot.version) =>
    write(async () => reopen({ production: house.production, shot: await shot.reload(), person: house.people.supervisor }, { reason: 'The edit changed.', version }))

  it('takes no further take until it is reopened; the ruling stays on record', async () => {
    await ruleOn({ decision: 'stands' })
    expect((await refusal(post())).message).toBe('This shot is settled: a supervisor reopens it before another take is posted.')
    expect(await again((await shot.reload()).version)).toMatchObject({ desk: 'animator', version: 3 })
    expect(await rows('SELECT decision, reopened_reason AS reason FROM rulings')).toEqual([{ decision: 'stands', reason: 'The edit changed.' }])
    expect((await post()).answer).toMatchObject({ number: 2, verdict: 'holds' })
  })

  it('is reopened only while settled, and by the version that is current', async () => {
    expect((await refusal(again())).message).toBe('This shot is not settled: there is nothing to reopen.')
    await ruleOn({ decision: 'stands' })
    expect(await refusal(again(1))).toMatchObject({ statusCode: 409, data: { current: { version: 2 } } })
  })
})

describe('50 takes posted at once', () => {
  it('are numbered without a gap and each has its event', async () => {
    const results = await Promise.all(Array.from({ length: 50 }, () => post(brokenFall())))
    expect(results.map(({ answer }) => answer.number).sort((a, b) => a - b)).toEqual(Array.from({ length: 50 }, (_, i) => i + 2))
    const events = await rows<{ n: number; take: number }>('SELECT n, take_number AS take FROM events ORDER BY n')
    expect(events).toEqual(Array.from({ length: 50 }, (_, i) => ({ n: i + 1, take: i + 2 })))
    expect(heard).toEqual(Array.from({ length: 50 }, (_, i) => i + 1))
    expect((await shot.reload()).version).toBe(51)
  })
})
