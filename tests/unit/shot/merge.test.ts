import { describe, expect, it } from 'vitest'
import type { ShotPage } from '~/utils/contracts/take'
import type { Comment, Thread } from '~/utils/contracts/thread'
import { addComment, covers, flagged, inMarginOrder, mergePage } from '~/utils/shot/merge'
import { pinInWords, whatChanged, whatGoesAlong } from '~/utils/shot/words'

const mira = { id: 'a', name: 'Mira Ilves' }
const oda = { id: 'b', name: 'Oda Dahl' }
const comment = (n: number, thread = 't'): Comment => ({ id: `c${n}`, clientId: `x${n}`, thread, n, body: `${n}`, by: mira, at: `2026-01-01T00:00:0${n % 10}Z` })
const thread = (id: string, more: Partial<Thread> = {}): Thread => ({
  id, clientId: id, take: 2, fromFrame: 61, toFrame: 61, by: mira, at: '2026-01-01T00:00:00Z', settledAt: null, settledBy: null, comments: [], ...more,
})
const page = (more: Partial<ShotPage> = {}): ShotPage => ({
  production: { slug: 'q', title: 'Q' }, sequence: { code: 'CLK', title: 'Clock', position: 0 }, code: 'CLK-110', title: 'Tower', brief: '',
  firstFrame: 1, lastFrame: 85, fps: 24, position: 0, dueOn: null, animator: mira, supervisor: oda, claim: null, version: 1, desk: 'supervisor',
  deskSince: '2026-01-01T00:00:00Z', takes: [], take: null, threads: [], letterCount: 0, eventNumber: 10, ...more,
})

describe('comments', () => {
  it('come in once and in the order of their numbers', () => {
    let threads = [thread('t')]
    for (const n of [3, 1, 3, 2, 1]) threads = addComment(threads, comment(n))
    expect(threads[0]!.comments.map(({ n }) => n)).toEqual([1, 2, 3])
  })
  it('change nothing where they are known or their thread is not', () => {
    const threads = addComment([thread('t')], comment(1))
    expect(addComment(threads, comment(1))).toBe(threads)
    expect(addComment(threads, comment(2, 'elsewhere'))).toBe(threads)
  })
  it('that were heard of while a page was under way stay on it', () => {
    const shown = page({ threads: [thread('t', { comments: [comment(4), comment(12)] })] })
    const fetched = page({ eventNumber: 11, threads: [thread('t', { comments: [comment(4), comment(11)] })] })
    expect(mergePage(shown, fetched).threads[0]!.comments.map(({ n }) => n)).toEqual([4, 11, 12])
  })
})

describe('a fetched page', () => {
  it('that is older than the one on screen changes nothing', () => {
    const shown = page()
    expect(mergePage(shown, page({ eventNumber: 9 }))).toBe(shown)
  })
  it('of another shot counts whatever its number', () => {
    const other = page({ code: 'CLK-120', eventNumber: 1 })
    expect(mergePage(page(), other)).toBe(other)
  })
})

describe('the margin', () => {
  it('has this take’s threads first, by frame', () => {
    const list = [thread('other', { take: 1, fromFrame: 1, toFrame: 1 }), thread('late', { fromFrame: 70, toFrame: 80 }), thread('whole', { fromFrame: null, toFrame: null }), thread('free', { take: null })]
    expect(inMarginOrder(list, 2).map(({ id }) => id)).toEqual(['whole', 'free', 'late', 'other'])
  })
  it('knows what a run covers', () => {
    expect([60, 61, 65, 66].map((frame) => covers({ fromFrame: 61, toFrame: 65 }, frame))).toEqual([false, true, true, false])
    expect(covers({ fromFrame: null, toFrame: null }, 3)).toBe(false)
    const flag = { id: 'f', fromFrame: 60, toFrame: 61, reason: 'r', finding: null, by: oda, at: '' }
    expect(flagged([flag], thread('t'))).toBe(true)
    expect(flagged([flag], thread('t', { fromFrame: 62, toFrame: 70 }))).toBe(false)
  })
})

describe('words', () => {
  it('count what goes along', () => {
    expect(whatGoesAlong(1, 4)).toBe('One flag goes along. Four people get a letter.')
    expect(whatGoesAlong(0, 1)).toBe('No flag goes along. One person gets a letter.')
    expect(whatGoesAlong(13, 0)).toBe('13 flags go along. Nobody gets a letter.')
  })
  it('say where a thread is pinned', () => {
    expect(pinInWords({ take: 2, fromFrame: 61, toFrame: 61 }, 2)).toBe('Frame 61')
    expect(pinInWords({ take: null, fromFrame: 1, toFrame: 20 }, 2)).toBe('Frames 1–20')
    expect(pinInWords({ take: 1, fromFrame: 1, toFrame: 20 }, 2)).toBe('Take 1, frames 1–20')
    expect(pinInWords({ take: 2, fromFrame: null, toFrame: null }, 2)).toBe('Take 2')
  })
  it('tell what changed since the last look', () => {
    const line = { number: 1, by: mira, at: '', note: '', verdict: 'breaks' as const, withdrawnAt: null, ruling: null }
    const ruling = { id: 'r', take: 1, decision: 'goes-back' as const, note: '', by: oda, at: '', reopened: null }
    const claim = { law: 'topple' as const, measure: 'angle' as const, unit: 'deg', slop: 0.3, tolerance: 0.1 }
    const before = page({ takes: [line], claim })
    expect(whatChanged(before, before)).toEqual([])
    expect(
      whatChanged(before, page({ takes: [{ ...line, ruling }, { ...line, number: 2 }], claim: { ...claim, slop: 0.5 }, dueOn: '2026-12-04', animator: null })),
    ).toEqual([
      'Oda Dahl ruled on take 1: goes back.',
      'Mira Ilves posted take 2.',
      'The claim was changed: slop 0.5°.',
      'It is due 4 Dec 2026.',
      'Nobody animates it now.',
    ])
  })
})
