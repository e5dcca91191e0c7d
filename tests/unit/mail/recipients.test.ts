import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { Letter, Membership, Ruling } from '~/server/models'
import { write } from '~/server/models/database'
import { oweRulingLetters, rulingReaders } from '~/server/services/letters'
import { openHouse, postTake, rule, talk, tellStory } from '../../helpers/rulingStory'

let close: () => Promise<void>
beforeAll(async () => {
  close = await openHouse()
})
afterAll(() => close())

const names = (readers: { name: string }[]) => readers.map(({ name }) => name)

describe('who a ruling is told to', () => {
  it('is the animator, who posted, the supervisor, the coordinators and the voices in the threads, once each', async () => {
    const { shot, people, production } = await tellStory({
      poster: { role: 'supervisor' },
      cora: { role: 'coordinator' },
      cyd: { role: 'coordinator' },
      voice: { role: 'guest' },
      starter: { role: 'animator' },
      silent: { role: 'animator' },
    })
    const take = await postTake(shot, people.poster!, 2)
    await talk(shot, take, [people.starter!, people.voice!, people.ana!, people.cora!])
    await talk(shot, take, [people.voice!, people.sam!])
    expect(production.title).toBe('Quayside Giants')
    const readers = await rulingReaders(take, people.silent!.id)
    expect(names(readers)).toEqual(['ana', 'cora', 'cyd', 'poster', 'sam', 'starter', 'voice'])
    expect(Object.keys(readers[0]!)).toEqual(['id', 'name'])
  })

  it('is never who ruled', async () => {
    const { take, people } = await tellStory({ cora: { role: 'coordinator' } })
    expect(names(await rulingReaders(take, people.sam!.id))).toEqual(['ana', 'cora'])
  })

  it('counts threads on frames of the shot, and not those of another take', async () => {
    const { shot, take, people } = await tellStory({ onFrames: { role: 'guest' }, onOther: { role: 'guest' } })
    const other = await postTake(shot, people.ana!, 2)
    await talk(shot, null, [people.onFrames!])
    await talk(shot, other, [people.onOther!])
    expect(names(await rulingReaders(take, people.sam!.id))).toEqual(['ana', 'onFrames'])
    expect(names(await rulingReaders(other, people.sam!.id))).toEqual(['ana', 'onFrames', 'onOther'])
  })

  it('is nobody disabled and nobody who is no member any more', async () => {
    const { take, shot, people, production } = await tellStory({
      gone: { role: 'coordinator' },
      shut: { role: 'coordinator', disabled: true },
      outsider: {},
    })
    await talk(shot, take, [people.gone!, people.outsider!])
    await Membership.destroy({ where: { productionId: production.id, personId: people.gone!.id } })
    await Membership.destroy({ where: { productionId: production.id, personId: people.ana!.id } })
    expect(await rulingReaders(take, people.sam!.id)).toEqual([])
  })

  it('respects what each wants: all, own takes, none', async () => {
    const { take, shot, people } = await tellStory({
      ownOnly: { role: 'coordinator', wish: 'own-takes' },
      never: { role: 'coordinator', wish: 'none' },
      all: { role: 'coordinator', wish: 'all' },
    })
    await talk(shot, take, [people.ownOnly!])
    await people.ana!.update({ mailWish: 'own-takes' })
    expect(names(await rulingReaders(take, people.sam!.id))).toEqual(['all', 'ana'])
    const ownTake = await postTake(shot, people.ownOnly!, 2)
    expect(names(await rulingReaders(ownTake, people.sam!.id))).toEqual(['all', 'ana', 'ownOnly'])
    await people.ana!.update({ mailWish: 'none' })
    expect(names(await rulingReaders(take, people.sam!.id))).toEqual(['all'])
  })

  it('works on a shot that nobody animates or supervises', async () => {
    const { shot, take, people } = await tellStory({ cora: { role: 'coordinator' } })
    await shot.update({ animatorId: null, supervisorId: null })
    expect(names(await rulingReaders(take, people.cora!.id))).toEqual(['ana'])
  })
})

describe('letters owed for a ruling', () => {
  it('are rows of the same transaction: a ruling that fails leaves none behind', async () => {
    const { take, people } = await tellStory({ cora: { role: 'coordinator' } })
    const before = await Letter.count()
    const failed = rule(take, people.sam!, async (ruling) => {
      expect(await oweRulingLetters(ruling)).toBe(2)
      expect(await Letter.count()).toBe(before + 2)
      throw new Error('the ruling fails')
    })
    await expect(failed).rejects.toThrow('the ruling fails')
    expect(await Letter.count()).toBe(before)
    expect(await Ruling.count({ where: { takeId: take.id } })).toBe(0)
  })

  it('are one for each person, however often they are owed', async () => {
    const { take, people } = await tellStory({ cora: { role: 'coordinator' } })
    const ruling = await rule(take, people.sam!, async (made) => {
      await oweRulingLetters(made)
      return made
    })
    await expect(write(() => oweRulingLetters(ruling))).rejects.toThrow()
    const letters = await Letter.findAll({ where: { rulingId: ruling.id }, order: ['toName'] })
    expect(letters.map(({ toName, toAddress, state, attempts }) => ({ toName, toAddress, state, attempts }))).toEqual([
      { toName: 'ana', toAddress: people.ana!.email, state: 'waiting', attempts: 0 },
      { toName: 'cora', toAddress: people.cora!.email, state: 'waiting', attempts: 0 },
    ])
    expect(new Set(letters.map(({ messageId }) => messageId)).size).toBe(2)
  })

  it('cannot be owed outside of a transaction', async () => {
    const { take, people } = await tellStory()
    const ruling = await rule(take, people.sam!, async (made) => made)
    await expect(oweRulingLetters(ruling)).rejects.toThrow('inside the transaction')
  })
})
