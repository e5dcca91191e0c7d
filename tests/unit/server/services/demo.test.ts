import { describe, expect, it } from 'vitest'
import { demoSequences } from '~/server/services/demo/shots'
import { laws, requestFor } from '~/utils/contracts/check'
import { judge } from '~/utils/motion'
import type { FindingKind } from '~/utils/motion/types'

/** The demo's lists say what the judge is to say of them: what was put in is what comes out. */

const faults: Record<string, FindingKind[]> = {
  'BRK-020': ['misplaced'],
  'BRK-055': ['held'],
  'BRK-065': ['broken-joint'],
  'BRK-070': ['not-at-rest'],
  'BRK-110': ['skipped'],
  'CHN-010 take 1': ['misplaced'],
  'CHN-032': ['misplaced'],
  'CHN-040': ['wrong-law'],
  'CHN-060': ['wrong-scale'],
  'CHN-090': ['wrong-scale'],
  'CLK-110': ['wrong-scale', 'misplaced'],
  'CLK-112': ['wrong-release'],
  'CLK-130': ['wrong-law'],
  'CLK-155': ['off-path'],
  'CLK-160': ['misplaced'],
}

const lists = demoSequences.flatMap(({ shots }) =>
  shots.flatMap((shot) =>
    (shot.takes ?? []).map((take, i) => ({ name: (shot.takes?.length ?? 0) > 1 ? `${shot.code} take ${i + 1}` : shot.code, shot, take })),
  ),
)

describe('the demo', () => {
  it('has some thirty shots, every law among them, over three sequences, with codes of their own', () => {
    const codes = demoSequences.flatMap(({ shots }) => shots.map(({ code }) => code))
    expect(codes).toHaveLength(29)
    expect(new Set(codes).size).toBe(29)
    const claimed = demoSequences.flatMap(({ shots }) => shots.flatMap(({ claim }) => [claim?.law, ...(claim?.spans ?? []).map(({ law }) => law)]))
    for (const law of laws) expect(claimed).toContain(law)
  })

  it.each(lists.map((list) => [list.name, list] as const))('%s is judged as it was made', (name, { shot, take }) => {
    const answer = judge(requestFor(shot.claim!, shot.fps ?? 24, take.keys))
    expect(answer.findings.map(({ kind }) => kind).sort()).toEqual([...(faults[name] ?? [])].sort())
    expect(answer.verdict).toBe(faults[name] ? 'breaks' : 'holds')
  })
})
