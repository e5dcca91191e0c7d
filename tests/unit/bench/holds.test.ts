import { describe, expect, it } from 'vitest'
import { benchLaws } from '~/utils/bench/laws'
import type { BenchLaw } from '~/utils/bench/laws'
import { claimIn, listIn, pointListIn } from '~/utils/bench/planning'
import { freshSetup, withBenchLaw } from '~/utils/bench/setup'
import type { BenchSetup } from '~/utils/bench/setup'
import { requestFor } from '~/utils/contracts/check'
import { judge } from '~/utils/motion'

/** Whatever the bench plans, the judge lets stand: the two have no sums in common but the laws' own. */

const bench = (law: BenchLaw, part: Partial<BenchSetup> = {}): BenchSetup => ({ ...withBenchLaw({ ...freshSetup(), on: 1 }, law), ...part })
const verdictOn = (setup: BenchSetup) => {
  const list = setup.law === 'flight' ? pointListIn(setup)! : listIn(setup)
  return judge(requestFor(claimIn(setup), setup.fps, list))
}

describe('what is planned holds', () => {
  it.each(benchLaws)('%s, as the bench opens it', (law) => {
    const answer = verdictOn(bench(law))
    expect([answer.verdict, answer.findings.map(({ kind }) => kind)]).toEqual(['holds', []])
  })

  it.each([
    ['slow-in', { way: 3, by: 'speed', startSpeed: 6 }],
    ['bounce', { way: 3, back: 50, bounces: 4 }],
    ['flight', { throwSpeed: 9, throwAngle: -20, landing: 12 }],
    ['over-edge', { body: 'block', width: 0.6, height: 2, lean: 2, brink: 6 }],
    ['swing-decay', { length: 1, amplitude: 25, swings: 3, lost: 15 }],
    ['spin', { rate: 0.4, turns: 1.5 }],
  ] as const)('%s %j', (law, part) => {
    const answer = verdictOn(bench(law, part))
    expect([answer.verdict, answer.findings.map(({ kind }) => kind)]).toEqual(['holds', []])
  })
})
