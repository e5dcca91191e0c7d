import { plannedList } from '~/utils/motion'
import { angle, chain, crates, degrees, drop, drum, mast, onPaper, ones, pixels, slip, twos } from './claims'
import { fallen, held, misplaced, pushedAndBraked, skipped, traced, turned } from './lists'
import type { DemoSequence } from './story'

export const breakwater: DemoSequence = {
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
      code: 'BRK-065', title: 'Trolley is pushed off, runs, and brakes at the buffers', range: [1, 60], dueIn: 2, animator: 'pell', supervisor: 'supervisor',
      brief: 'One push, a run on the rails, then the brake. **One movement**: nobody should see where it changes hands.',
      claim: {
        ...onPaper('odd-rule'), start: 'rest',
        spans: [{ from: 1, to: 17, law: 'odd-rule', start: 'rest' }, { from: 17, to: 31, law: 'steady' }, { from: 31, to: 51, law: 'slow-in' }],
      },
      takes: [{ by: 'pell', daysAgo: 0.6, note: 'The run was timed apart from the push.', keys: pushedAndBraked(1, { out: 16, push: 14, run: 14, speed: 21, stop: 20 }, pixels(35)) }],
      threads: [{ take: 1, frames: [17, 17], says: [['supervisor', 0.4, 'It jumps forward there, as if somebody had pushed it again.']] }],
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
      code: 'BRK-090', title: 'Tug glides to its berth', range: [1, 96], animator: 'pell', supervisor: 'lotte',
      brief: 'Engine off: the water stops it, a little before the last drawing.', claim: onPaper('slow-in'),
      takes: [{ by: 'pell', daysAgo: 9, keys: traced([...plannedList({ law: 'slow-in', travel: 470, seconds: 3.5, fps: 24, exposure: 4 }).keys, { frame: 89, reading: 470 }, { frame: 93, reading: 470 }], pixels(51)), ruling: { decision: 'stands', by: 'lotte', note: 'Just right.', daysAgo: 8 } }],
    },
    {
      code: 'BRK-110', title: 'Mast of the wreck comes down', range: [1, 96], dueIn: -1, animator: 'suvi', supervisor: 'lotte',
      brief: 'Rotten at the foot: it goes over on its heel like a rod.', claim: angle('topple', mast),
      takes: [{ by: 'suvi', daysAgo: 2, keys: skipped(turned(twos(60), mast, 1.5, 0, true, degrees(61)), 24) }],
    },
    { code: 'BRK-130', title: 'The first crane lifts a foot out of the water', range: [1, 120], dueIn: 12, brief: 'Weight first. Claim to follow once the foot is designed.' },
  ],
}
