import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { Allowance, BURST, PER_SECOND } from '~/server/services/live/allowance'
import { PresenceBoard } from '~/server/services/live/presence'
import type { Presence } from '~/utils/contracts/event'

const ada = { id: 'a', name: 'Ada Lund' }
const bo = { id: 'b', name: 'Bo Reis' }
const look = (person: typeof ada, shot = 'PIR-010', production = 'pier') => ({ production, shot, person })

describe('who is looking', () => {
  let told: Presence[]
  let board: PresenceBoard
  beforeEach(() => {
    vi.useFakeTimers()
    told = []
    board = new PresenceBoard((presence) => told.push(presence))
  })
  afterEach(() => vi.useRealTimers())

  it('names each person once per shot, however many windows they have open', () => {
    board.set('1', look(ada))
    board.set('2', look(ada))
    board.set('3', look(ada, 'PIR-020'))
    board.set('4', look(bo))
    expect(board.lookers('pier')).toEqual([
      { person: ada, shot: 'PIR-010' },
      { person: bo, shot: 'PIR-010' },
      { person: ada, shot: 'PIR-020' },
    ])
    board.set('1', null)
    expect(board.lookers('pier')).toContainEqual({ person: ada, shot: 'PIR-010' })
    board.set('2', null)
    expect(board.lookers('pier')).not.toContainEqual({ person: ada, shot: 'PIR-010' })
  })

  it('says nothing of one production in another', () => {
    board.set('1', look(ada, 'PIR-010', 'harbour'))
    expect(board.lookers('pier')).toEqual([])
  })

  it('announces a burst once, with what stands at its end', () => {
    board.set('1', look(ada))
    board.set('2', look(bo))
    board.set('1', null)
    expect(told).toEqual([])
    vi.advanceTimersByTime(100)
    expect(told).toEqual([{ production: 'pier', lookers: [{ person: bo, shot: 'PIR-010' }] }])
  })

  it('stays silent when nothing has changed for anybody', () => {
    board.set('1', look(ada))
    vi.advanceTimersByTime(100)
    board.set('2', look(ada))
    board.set('2', null)
    vi.advanceTimersByTime(100)
    expect(told).toHaveLength(1)
  })

  it('tells both productions when a window goes from one to the other, and tells of an empty list', () => {
    board.set('1', look(ada))
    vi.advanceTimersByTime(100)
    board.set('1', look(ada, 'HAR-010', 'harbour'))
    vi.advanceTimersByTime(100)
    expect(told.slice(1)).toEqual([
      { production: 'pier', lookers: [] },
      { production: 'harbour', lookers: [{ person: ada, shot: 'HAR-010' }] },
    ])
  })

  it('announces nothing after it was closed', () => {
    board.set('1', look(ada))
    board.close()
    vi.advanceTimersByTime(1_000)
    expect(told).toEqual([])
  })
})

describe('how many events a socket may send', () => {
  it('lets a burst through, then refuses, then lets through again as time passes', () => {
    let now = 0
    const allowance = new Allowance(() => now)
    const taken = Array.from({ length: BURST + 5 }, () => allowance.take())
    expect(taken.filter(Boolean)).toHaveLength(BURST)
    now += 1_000
    expect(Array.from({ length: PER_SECOND + 1 }, () => allowance.take())).toEqual([...Array(PER_SECOND).fill(true), false])
  })

  it('saves up no more than one burst', () => {
    let now = 0
    const allowance = new Allowance(() => now)
    now += 3_600_000
    expect(Array.from({ length: BURST * 2 }, () => allowance.take()).filter(Boolean)).toHaveLength(BURST)
  })
})
