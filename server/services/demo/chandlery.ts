import { plannedList } from '~/utils/motion'
import { angle, boom, degrees, float, hook, lamp, onPaper, ones, pixels, quayStep, twos } from './claims'
import { even, fallen, misplaced, traced, turned } from './lists'
import type { DemoSequence } from './story'

export const chandlery: DemoSequence = {
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
      code: 'CHN-032', title: 'Glass float drops off the shelf and bounces', range: [1, 72], dueIn: 4, animator: 'nagisa', supervisor: 'supervisor',
      brief: 'Thick glass on boards. It gives back two thirds of its speed, **and does not break**.', claim: onPaper('bounce', float),
      takes: [{ by: 'nagisa', daysAgo: 0.5, keys: misplaced(traced(plannedList({ law: 'bounce', drop: 190, restitution: 0.66, bounces: 4, subject: float, fps: 24, exposure: 1 }).keys, pixels(85)), 20, -14) }],
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
    {
      code: 'CHN-100', title: 'Winch drum runs out', range: [1, 48], animator: 'suvi', supervisor: 'supervisor', brief: 'The pawl is off and the friction holds it even. One mark on the rim to follow.',
      claim: angle('spin'),
      takes: [{ by: 'suvi', daysAgo: 1.8, keys: traced(plannedList({ law: 'spin', turns: 3, turnsPerSecond: 1.6, fps: 24, exposure: 2 }).keys, degrees(135)).map(({ frame, reading }) => ({ frame, reading: Number((reading % 360).toFixed(1)) })) }],
    },
    { code: 'CHN-120', title: 'The shutters fall one after the other, from left to right, in the second crane’s wake', range: [1, 110], dueIn: 14, animator: 'pell', brief: '', claim: angle('topple', { shape: 'rod', height: 2.1 }) },
  ],
}
