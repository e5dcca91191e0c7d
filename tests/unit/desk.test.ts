import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { decisions } from '~/utils/contracts/production'
import type { Decision } from '~/utils/contracts/production'
import { deskOf } from '~/utils/desk'
import type { Posting } from '~/utils/desk'

const at = (minute: number) => new Date(Date.UTC(2026, 10, 30, 9, minute)).toISOString()
const made = at(0)

const posted = (number: number, minute: number): Posting => ({ number, at: at(minute), withdrawnAt: null, ruling: null })
const back = (take: Posting, minute: number): Posting => ({ ...take, withdrawnAt: at(minute) })
const ruled = (take: Posting, decision: Decision, minute: number): Posting => ({ ...take, ruling: { decision, at: at(minute), reopenedAt: null } })
const reopened = (take: Posting, minute: number): Posting => ({ ...take, ruling: take.ruling && { ...take.ruling, reopenedAt: at(minute) } })

describe('whose desk', () => {
  it.each<[string, Posting[], string, number]>([
    ['no take yet', [], 'not-started', 0],
    ['a take waits', [posted(1, 5)], 'supervisor', 5],
    ['the only take was taken back', [back(posted(1, 5), 7)], 'not-started', 7],
    ['it went back', [ruled(posted(1, 5), 'goes-back', 9)], 'animator', 9],
    ['it stands', [ruled(posted(1, 5), 'stands', 9)], 'settled', 9],
    ['it stands with notes', [ruled(posted(1, 5), 'stands-with-notes', 9)], 'settled', 9],
    ['reopened', [reopened(ruled(posted(1, 5), 'stands', 9), 12)], 'animator', 12],
    ['a second take after it went back', [ruled(posted(1, 5), 'goes-back', 9), posted(2, 20)], 'supervisor', 20],
    ['that second take was taken back', [ruled(posted(1, 5), 'goes-back', 9), back(posted(2, 20), 25)], 'animator', 25],
    ['a take after reopening', [reopened(ruled(posted(1, 5), 'stands', 9), 12), posted(2, 30)], 'supervisor', 30],
    ['and it was taken back', [reopened(ruled(posted(1, 5), 'stands', 9), 12), back(posted(2, 30), 31)], 'animator', 31],
    ['an older take was taken back while a newer waits', [back(posted(1, 5), 40), posted(2, 20)], 'supervisor', 20],
    ['ruled after a newer one was taken back', [ruled(posted(1, 5), 'stands', 50), back(posted(2, 20), 25)], 'settled', 50],
  ])('%s', (_, takes, desk, minute) => {
    expect(deskOf(made, takes)).toMatchObject({ desk, since: at(minute) })
  })

  it('stamps the last ruling, whatever was posted since', () => {
    const first = ruled(posted(1, 5), 'goes-back', 9)
    expect(deskOf(made, []).stamp).toBeNull()
    expect(deskOf(made, [first, posted(2, 20)]).stamp).toEqual({ take: 1, decision: 'goes-back', at: at(9) })
    expect(deskOf(made, [first, ruled(posted(2, 20), 'stands', 30)]).stamp).toEqual({ take: 2, decision: 'stands', at: at(30) })
  })

  it('takes the stamp off while the last ruling is reopened: an older ruling does not come back', () => {
    expect(deskOf(made, [ruled(posted(1, 5), 'goes-back', 9), reopened(ruled(posted(2, 20), 'stands', 30), 40)]).stamp).toBeNull()
  })

  it('is settled exactly when the newest standing take has a standing ruling that does not send it back', () => {
    const take = fc.record({
      withdrawn: fc.boolean(),
      decision: fc.option(fc.constantFrom(...decisions), { nil: null }),
      reopened: fc.boolean(),
    })
    fc.assert(fc.property(fc.array(take, { maxLength: 6 }), (history) => {
      const takes = history.map(({ withdrawn, decision, reopened: again }, i): Posting => ({
        number: i + 1,
        at: at(i * 10 + 1),
        withdrawnAt: withdrawn ? at(i * 10 + 2) : null,
        ruling: withdrawn || !decision ? null : { decision, at: at(i * 10 + 3), reopenedAt: again ? at(i * 10 + 4) : null },
      }))
      const { desk, newest, since } = deskOf(made, takes)
      const standing = takes.filter((one) => !one.withdrawnAt)
      const last = standing.at(-1)
      expect(newest).toBe(last?.number ?? null)
      expect(desk === 'settled').toBe(Boolean(last?.ruling && last.ruling.decision !== 'goes-back' && !last.ruling.reopenedAt))
      expect(desk === 'supervisor').toBe(Boolean(last && !last.ruling))
      expect(desk === 'not-started').toBe(standing.length === 0)
      expect(since >= made).toBe(true)
    }))
  })
})
