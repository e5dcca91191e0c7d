import type { Claim, Decision } from '~/utils/contracts/production'
import type { FindingKind } from '~/utils/contracts/take'
import type { BodySubject, Key } from '~/utils/motion/types'
import { even, fallen, held, misplaced, skipped, turned } from './lists'
import type { Exposure } from './lists'

/** The demo's shots, in story order. Frames in threads and flags are frames of the newest take. */

export interface DemoRuling {
  decision: Decision
  by: string
  note: string
  daysAgo: number
}
export interface DemoTake {
  keys: Key[]
  by: string
  daysAgo: number
  note?: string
  takenBack?: boolean
  /** Flags every finding of these kinds. */
  flags?: { kind: FindingKind; reason: string }[]
  waives?: { kind: FindingKind; reason: string }[]
  ruling?: DemoRuling
}
export interface DemoThread {
  take?: number
  frames?: [number, number]
  settled?: boolean
  says: [who: string, daysAgo: number, body: string][]
}
export interface DemoShot {
  code: string
  title: string
  brief: string
  fps?: number
  range: [number, number]
  dueIn?: number
  animator?: string
  supervisor?: string
  claim?: Claim
  takes?: DemoTake[]
  threads?: DemoThread[]
}
export interface DemoSequence {
  code: string
  title: string
  shots: DemoShot[]
}

const angle = (law: 'topple' | 'pendulum', subject: BodySubject): Claim => ({ law, measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1, subject })
const onPaper = (law: 'odd-rule' | 'steady', subject: Claim['subject']): Claim => ({ law, measure: 'distance', unit: 'px', slop: 1, tolerance: 0.08, subject })
const twos = (count: number, first = 1): Exposure => ({ fps: 24, first, step: 2, count })
const ones = (count: number, first = 1): Exposure => ({ fps: 24, first, step: 1, count })
const degrees = (seed: number) => ({ seed, grid: 0.1, slip: 0.08 })
const pixels = (seed: number) => ({ seed, grid: 0.5, slip: 0.3 })

const tower: BodySubject = { shape: 'block', width: 6, height: 38 }
const toyTower: BodySubject = { shape: 'block', width: 1.3, height: 8.2 }
const crates: BodySubject = { shape: 'block', width: 1.1, height: 2.4 }
const mast: BodySubject = { shape: 'rod', height: 14 }
const drum: BodySubject = { shape: 'cylinder', radius: 0.4, height: 1.2 }
const lamp: BodySubject = { shape: 'pole', height: 5.2, mass: 60, headMass: 25, headHeight: 5 }
const bell: BodySubject = { shape: 'bob', length: 3.1 }
const chain: BodySubject = { shape: 'bob', length: 1.4 }
const hook: BodySubject = { shape: 'bob', length: 9 }
const boom: BodySubject = { shape: 'hung-rod', length: 4.5 }
const drop = { unitsPerMetre: 80, slope: 90 } as const
const slip = { unitsPerMetre: 60, slope: 12, roll: 'cylinder' } as const
const quayStep = { unitsPerMetre: 140, slope: 90 } as const

export const demoSequences: DemoSequence[] = [
  {
    code: 'BRK',
    title: 'Breakwater',
    shots: [
      {
        code: 'BRK-020', title: 'Bollard drops off the quay wall', range: [1, 24], dueIn: 2, animator: 'animator', supervisor: 'supervisor',
        brief: 'Cast iron, **no bounce**. The water takes it at the last drawing.',
        claim: onPaper('odd-rule', drop),
        takes: [{ by: 'animator', daysAgo: 1.2, note: 'On ones from the lip.', keys: misplaced(fallen(ones(14), drop, 0, 0, pixels(11)), 7, 7) }],
        threads: [{ take: 1, frames: [8, 8], says: [['supervisor', 0.9, 'Frame 8 jumps. Is the rope still on it there?'], ['animator', 0.6, 'No rope. I traced the wrong thumbnail.']] }],
      },
      {
        code: 'BRK-040', title: 'Crate stack goes over the cart’s edge', range: [1, 60], animator: 'pell', supervisor: 'lotte',
        brief: 'Three crates strapped as one. They go as a block.', claim: angle('topple', crates),
        takes: [{ by: 'pell', daysAgo: 6, keys: turned(ones(60), crates, 2, 0, true, degrees(21)), ruling: { decision: 'stands', by: 'lotte', note: '', daysAgo: 5 } }],
      },
      {
        code: 'BRK-055', title: 'Fender drum tips off the pallet', range: [101, 150], dueIn: 4, animator: 'suvi', supervisor: 'supervisor',
        brief: '', claim: angle('topple', drum),
        takes: [{ by: 'suvi', daysAgo: 0.7, keys: held(turned(ones(50, 101), drum, 3, 0, true, degrees(22)), 15) }],
        threads: [{ take: 1, says: [['coordinator', 0.5, 'Cleared for today’s rulings?']] }],
      },
      {
        code: 'BRK-070', title: 'Barrel rolls down the slip', range: [1, 40], dueIn: 6, animator: 'nagisa', supervisor: 'supervisor',
        brief: 'Full barrel: it rolls as a solid, and wakes up on screen.', claim: { ...onPaper('odd-rule', slip), start: 'rest' },
        takes: [
          {
            by: 'nagisa', daysAgo: 4, keys: fallen(twos(16), slip, 0, 90, pixels(31)),
            ruling: { decision: 'goes-back', by: 'supervisor', note: 'The gaps are a barrel’s, but it is already moving at the first key. It has to wake up *on* screen.', daysAgo: 3 },
          },
        ],
        threads: [{ take: 1, says: [['nagisa', 2.6, 'Starting it from rest adds six drawings. Is there room?'], ['coordinator', 2.2, 'There is until 40.']] }],
      },
      {
        code: 'BRK-085', title: 'Chain swings after the brake', range: [1, 60], dueIn: 3, animator: 'animator', supervisor: 'supervisor',
        brief: 'One swing and a bit.', claim: angle('pendulum', chain),
        takes: [{ by: 'animator', daysAgo: 0.4, keys: turned(twos(28), chain, -32, 0, false, degrees(41)) }],
        threads: [{ take: 1, frames: [29, 33], says: [['supervisor', 0.2, 'Lovely slow out at the top.']] }],
      },
      {
        code: 'BRK-090', title: 'Tug slides past the harbour light', range: [1, 96], animator: 'pell', supervisor: 'lotte',
        brief: 'Dead slow, engine off.', claim: onPaper('steady', { unitsPerMetre: 22 }),
        takes: [{ by: 'pell', daysAgo: 9, keys: even({ fps: 24, first: 1, step: 4, count: 24 }, 40, 19.5, pixels(51)), ruling: { decision: 'stands', by: 'lotte', note: 'Just right.', daysAgo: 8 } }],
      },
      {
        code: 'BRK-110', title: 'Mast of the wreck comes down', range: [1, 96], dueIn: -1, animator: 'suvi', supervisor: 'lotte',
        brief: 'Rotten at the foot: it goes over on its heel like a rod.', claim: angle('topple', mast),
        takes: [{ by: 'suvi', daysAgo: 2, keys: skipped(turned(twos(60), mast, 1.5, 0, true, degrees(61)), 24) }],
      },
      { code: 'BRK-130', title: 'The first crane lifts a foot out of the water', range: [1, 120], dueIn: 12, brief: 'Weight first. Claim to follow once the foot is designed.' },
    ],
  },
  {
    code: 'CHN',
    title: 'Chandlery',
    shots: [
      {
        code: 'CHN-010', title: 'Street lamp goes over', range: [1, 72], animator: 'animator', supervisor: 'supervisor', brief: 'Head first, glass stays in.',
        claim: angle('topple', lamp),
        takes: [
          { by: 'animator', daysAgo: 8, keys: misplaced(turned(twos(40), lamp, 2, 0, true, degrees(71)), 15, 4.2), flags: [{ kind: 'misplaced', reason: 'Pops. Put it back on the line.' }], ruling: { decision: 'goes-back', by: 'supervisor', note: 'One drawing to redo.', daysAgo: 7 } },
          { by: 'animator', daysAgo: 6, note: 'Frame 31 redone.', keys: turned(twos(40), lamp, 2, 0, true, degrees(72)), ruling: { decision: 'stands', by: 'supervisor', note: '', daysAgo: 5.5 } },
        ],
      },
      {
        code: 'CHN-025', title: 'Net needle slips from the bench', range: [1, 20], animator: 'nagisa', supervisor: 'lotte', brief: '', fps: 24,
        claim: onPaper('odd-rule', quayStep),
        takes: [{ by: 'nagisa', daysAgo: 11, keys: fallen(ones(11), quayStep, 12, 0, pixels(81)), ruling: { decision: 'stands-with-notes', by: 'lotte', note: 'Stands. Soften the contact with one held drawing *after* the last key.', daysAgo: 10 } }],
      },
      {
        code: 'CHN-040', title: 'Rope coil dropped three floors', range: [1, 60], dueIn: 5, animator: 'pell', supervisor: 'supervisor', brief: 'Seen from across the street.',
        claim: onPaper('odd-rule', { unitsPerMetre: 44, slope: 90 }),
        takes: [{ by: 'pell', daysAgo: 1.5, note: 'Kept the gaps even for the count, see thread.', keys: even(ones(20), 0, 24, pixels(91)) }],
        threads: [
          { take: 1, says: [['pell', 1.4, 'The even gaps are meant as a count, not as a fall. Wrong list posted?'], ['supervisor', 1.1, 'Then it is the wrong list. Take it back or let me send it back.']] },
          { frames: [1, 6], settled: true, says: [['coordinator', 3, 'Does it start in frame?'], ['supervisor', 2.8, 'Yes, from the sill.']] },
        ],
      },
      {
        code: 'CHN-055', title: 'Sign swings over the chandler’s door', range: [1, 80], animator: 'suvi', supervisor: 'lotte', brief: 'Iron sign on two hooks: hung by its end.',
        claim: angle('pendulum', boom),
        takes: [{ by: 'suvi', daysAgo: 7, keys: turned(twos(34), boom, 18, 0, false, degrees(101)), ruling: { decision: 'stands', by: 'lotte', note: '', daysAgo: 6.4 } }],
      },
      {
        code: 'CHN-060', title: 'Lantern drawn to the toy’s time', range: [1, 80], dueIn: 1, animator: 'animator', supervisor: 'supervisor', brief: 'It hangs on nine metres of line from the crane’s hook.',
        claim: angle('pendulum', hook),
        takes: [{ by: 'animator', daysAgo: 0.8, keys: turned(twos(36), { shape: 'bob', length: 2.4 }, 22, 0, false, degrees(111)) }],
      },
      {
        code: 'CHN-075', title: 'Cat’s tail marks time', range: [1, 48], animator: 'nagisa', supervisor: 'lotte', brief: 'A steady turn; nothing heavy about it.',
        claim: { law: 'steady', measure: 'angle', unit: 'deg', slop: 0.5, tolerance: 0.1 },
        takes: [{ by: 'nagisa', daysAgo: 12, keys: even(twos(18), -20, 3.4, degrees(121)), ruling: { decision: 'stands', by: 'lotte', note: '', daysAgo: 11 } }],
      },
      {
        code: 'CHN-090', title: 'Paint tin slides down the roof', range: [1001, 1050], dueIn: 9, animator: 'suvi', supervisor: 'supervisor', brief: '32° slates, wet.',
        claim: onPaper('odd-rule', { unitsPerMetre: 70, slope: 32, roll: 'slide' }),
        takes: [{ by: 'suvi', daysAgo: 3, takenBack: true, note: 'Wrong scale, sorry.', keys: fallen(twos(12, 1001), { unitsPerMetre: 35, slope: 32 }, 0, 0, pixels(131)) }],
      },
      { code: 'CHN-120', title: 'The shutters fall one after the other, from left to right, in the second crane’s wake', range: [1, 110], dueIn: 14, animator: 'pell', brief: '', claim: angle('topple', { shape: 'rod', height: 2.1 }) },
    ],
  },
  {
    code: 'CLK',
    title: 'Clock Tower',
    shots: [
      {
        code: 'CLK-110', title: 'The tower leans and goes over', range: [1, 200], dueIn: 1, animator: 'animator', supervisor: 'supervisor',
        brief: 'Thirty-eight metres of brick. It leans 1.5° past its balance before anybody believes it. **It must read as big**: nobody is in a hurry.',
        claim: angle('topple', tower),
        takes: [{ by: 'animator', daysAgo: 0.3, note: 'On twos. First pass for weight.', keys: misplaced(turned(twos(60), toyTower, 1.5, 0, true, degrees(141)), 30, 3.2) }],
        threads: [
          { take: 1, frames: [61, 61], says: [['supervisor', 0.2, 'Is the jump at 61 the bell breaking loose, or a slip?'], ['animator', 0.15, 'Slip. The in-between was traced from the old chart.']] },
          { take: 1, frames: [1, 20], says: [['coordinator', 0.1, 'If this grows, the cut needs about four seconds more. Asking the edit today.']] },
        ],
      },
      {
        code: 'CLK-120', title: 'Bell swings after the last stroke', range: [1, 120], animator: 'suvi', supervisor: 'lotte', brief: '',
        claim: angle('pendulum', bell),
        takes: [{ by: 'suvi', daysAgo: 5, keys: turned(twos(44), bell, 41, 0, false, degrees(151)), ruling: { decision: 'stands', by: 'lotte', note: 'Rings true.', daysAgo: 4.2 } }],
      },
      {
        code: 'CLK-130', title: 'Weathercock falls past the window', range: [1, 30], dueIn: 2, animator: 'pell', supervisor: 'supervisor', brief: '',
        claim: onPaper('odd-rule', drop),
        takes: [
          { by: 'pell', daysAgo: 4, keys: even(ones(16), 0, 26, pixels(161)), flags: [{ kind: 'wrong-law', reason: 'It glides. Nothing falls like this.' }], ruling: { decision: 'goes-back', by: 'supervisor', note: 'Even spacing reads as steady. Use the ruled list as a start.', daysAgo: 3.5 } },
        ],
        threads: [{ take: 1, says: [['pell', 3.2, 'Understood, next take tomorrow.']] }],
      },
      {
        code: 'CLK-140', title: 'Giant steadies itself on the spire', range: [1, 90], dueIn: 10, brief: 'What moves is still being argued about.',
      },
      {
        code: 'CLK-150', title: 'Clock hand lets go', range: [1, 40], dueIn: 3, animator: 'nagisa', supervisor: 'lotte', brief: 'The minute hand, hung by its end, from just past level.',
        claim: angle('pendulum', { shape: 'hung-rod', length: 2.6 }),
        takes: [{ by: 'nagisa', daysAgo: 0.9, keys: turned(ones(38), { shape: 'hung-rod', length: 2.6 }, 100, 0, false, degrees(171)) }],
      },
      {
        code: 'CLK-160', title: 'Roof tile flips off the eaves', range: [1, 30], dueIn: 7, animator: 'animator', supervisor: 'lotte', brief: 'Pushed by the gust, not let go.',
        claim: angle('topple', { shape: 'rod', height: 0.45 }),
        takes: [
          { by: 'animator', daysAgo: 5, keys: misplaced(turned(ones(20), { shape: 'rod', height: 0.45 }, 6, 60, true, degrees(181)), 6, -5), waives: [{ kind: 'misplaced', reason: 'The gust catches it there. Meant.' }], ruling: { decision: 'stands-with-notes', by: 'lotte', note: 'Keep the catch at frame 7, it reads.', daysAgo: 4.4 } },
        ],
      },
      {
        code: 'CLK-170', title: 'Dust column rises', range: [1, 60], animator: 'suvi', supervisor: 'supervisor', brief: 'Very even, very slow.',
        claim: onPaper('steady', { unitsPerMetre: 30 }),
        takes: [{ by: 'suvi', daysAgo: 10, keys: even({ fps: 24, first: 1, step: 3, count: 20 }, 0, 8, pixels(191)), ruling: { decision: 'stands', by: 'supervisor', note: '', daysAgo: 9 } }],
      },
      {
        code: 'CLK-180', title: 'Last stone drops into the harbour', range: [1, 48], dueIn: 8, animator: 'nagisa', supervisor: 'supervisor', brief: 'From the cornice to the water: thirty metres.',
        claim: onPaper('odd-rule', { unitsPerMetre: 18, slope: 90 }),
        takes: [{ by: 'nagisa', daysAgo: 2.4, keys: fallen(twos(24), { unitsPerMetre: 18, slope: 90 }, 4, 0, pixels(201)), ruling: { decision: 'stands', by: 'supervisor', note: '', daysAgo: 2 } }],
      },
    ],
  },
]
