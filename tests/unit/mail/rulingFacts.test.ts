import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { v7 as uuid } from 'uuid'
import { Letter, Waiver } from '~/server/models'
import { write } from '~/server/models/database'
import { oweRulingLetters } from '~/server/services/letters'
import { findingsOfFlag, rulingFacts } from '~/server/services/letters/rulingFacts'
import type { Finding } from '~/utils/motion/types'
import { flag, openHouse, rule, tellStory } from '../../helpers/rulingStory'

let close: () => Promise<void>
beforeAll(async () => {
  close = await openHouse()
})
afterAll(() => close())

const misplaced: Finding = { kind: 'misplaced', frames: [1003], amount: 2.4, text: 'Frame 1003 lands 0.8 frame early.' }
const backward: Finding = { kind: 'backward', frames: [1020, 1022], amount: 1, text: 'Frames 1020 and 1022 run backward.' }
const scale: Finding = { kind: 'wrong-scale', frames: [], amount: 0.2, text: 'Reads as 8.2 m.' }

describe('the findings that a flag speaks of', () => {
  const all = [scale, misplaced, backward]
  it('are the one it names', () => {
    expect(findingsOfFlag({ fromFrame: 1, toFrame: 2, finding: { kind: 'backward', frames: [1020, 1022] } }, all)).toEqual([backward])
    expect(findingsOfFlag({ fromFrame: 1, toFrame: 2, finding: { kind: 'wrong-scale', frames: [] } }, all)).toEqual([scale])
  })
  it('are else those that touch its frames', () => {
    expect(findingsOfFlag({ fromFrame: 1001, toFrame: 1021, finding: null }, all)).toEqual([misplaced, backward])
    expect(findingsOfFlag({ fromFrame: 1004, toFrame: 1019, finding: null }, all)).toEqual([])
  })
})

describe('what a letter tells', () => {
  it('is the open flags with their sentences, and the findings that nobody flagged or waived', async () => {
    const { take, people } = await tellStory({}, [scale, misplaced, backward])
    await flag(take, people.sam!, 1040, 1050, 'Too even.')
    await flag(take, people.sam!, 1003, 1003, 'Move it back.', { kind: 'misplaced', frames: [1003] })
    const lifted = await flag(take, people.sam!, 1001, 1001, 'Never mind.')
    await lifted.update({ liftedAt: '2026-12-01T10:00:00.000Z', liftedBy: people.sam!.id })
    await Waiver.create({
      id: uuid(), clientId: uuid(), takeId: take.id, finding: { kind: 'backward', frames: [1020, 1022] }, reason: 'Meant.', personId: people.sam!.id, createdAt: take.createdAt,
    })
    const { facts } = await rule(take, people.sam!, (ruling) => rulingFacts(ruling, 'https://board.example'), 'goes-back', 'Again.')
    expect(facts.flags).toEqual([
      { fromFrame: 1003, toFrame: 1003, reason: 'Move it back.', by: 'sam', sentences: ['Frame 1003 lands 0.8 frame early.'] },
      { fromFrame: 1040, toFrame: 1050, reason: 'Too even.', by: 'sam', sentences: [] },
    ])
    expect(facts.findings).toEqual([{ frame: null, text: 'Reads as 8.2 m.' }])
    expect(facts).toMatchObject({ take: 1, decision: 'goes-back', note: 'Again.', ruledBy: 'sam', animator: 'ana', more: { flags: 0, findings: 0 } })
  })

  it('lists no findings where the take stands', async () => {
    const { take, people } = await tellStory({}, [scale])
    const { facts } = await rule(take, people.sam!, (ruling) => rulingFacts(ruling, ''), 'stands')
    expect(facts.findings).toEqual([])
  })

  it('stays readable with 300 flags and says how many more there are', async () => {
    const { take, people, production } = await tellStory()
    await write(async () => {
      for (let i = 0; i < 300; i++) await flag(take, people.sam!, 1001 + i, 1001 + i, 'x'.repeat(1000))
    })
    const letter = await rule(take, people.sam!, async (ruling) => {
      await oweRulingLetters(ruling)
      return Letter.findOne({ where: { rulingId: ruling.id }, rejectOnEmpty: true })
    })
    expect(letter.text).toContain('And 240 more flags')
    expect(letter.text).toContain(`https://board.example/p/${production.slug}/shots/CLK-110?take=1&frame=1060\n`)
    // Mail programs cut off longer ones.
    expect(Buffer.byteLength(letter.html)).toBeLessThan(102_000)
  })
})
