import { plannedEdge, plannedFlight, plannedList } from '~/utils/motion'
import { angle, bell, coil, degrees, drop, inPoints, onPaper, ones, parapet, pixels, tower, toyTower, twos } from './claims'
import { even, fallen, misplaced, straightDown, strayed, traced, tracedPoints, turned } from './lists'
import type { DemoSequence } from './story'

const parapetBrink = { x: 300, y: 200 }
const parapetFall = plannedEdge({ subject: parapet, lean: 3, drop: 6, fps: 24, exposure: 1, unitsPerMetre: 60, brink: parapetBrink })

export const clockTower: DemoSequence = {
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
      code: 'CLK-112', title: 'Parapet block goes over the brink', range: [1, 80], dueIn: 2, animator: 'nagisa', supervisor: 'supervisor',
      brief: 'It tips on the edge, lets go, and turns in the air. Drawn as the path of its centre.', claim: { ...inPoints('over-edge', parapet), pivot: parapetBrink },
      takes: [{ by: 'nagisa', daysAgo: 0.7, keys: straightDown(tracedPoints(parapetFall.points, pixels(145)), parapetFall.release.frame) }],
      threads: [{ take: 1, says: [['supervisor', 0.5, 'It scrapes down the wall. Where has the swing gone?']] }],
    },
    {
      code: 'CLK-120', title: 'Bell swings out after the last stroke', range: [1, 120], animator: 'suvi', supervisor: 'lotte', brief: 'Nobody pulls any more: every swing a little less.',
      claim: angle('swing-decay', bell),
      takes: [{ by: 'suvi', daysAgo: 5, keys: traced(plannedList({ law: 'swing-decay', subject: bell, amplitude: 41, swings: 2.4, share: 0.12, fps: 24, exposure: 2 }).keys, degrees(151)), ruling: { decision: 'stands', by: 'lotte', note: 'Rings true.', daysAgo: 4.2 } }],
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
      code: 'CLK-155', title: 'A coil of rope is thrown across to the spire', range: [1, 48], dueIn: 5, animator: 'suvi', supervisor: 'lotte',
      brief: 'Thrown up and over, caught at the same height.', claim: inPoints('flight', coil),
      takes: [{ by: 'suvi', daysAgo: 0.6, keys: strayed(tracedPoints(plannedFlight({ subject: coil, throw: { speed: 9, angle: 52 }, drop: 0, fps: 24, exposure: 2, origin: { x: 120, y: 640 } }).keys, pixels(175)), 9, { x: 3, y: -16 }) }],
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
}
