import { STANDARD_GRAVITY } from '~/utils/motion'

/**
 * Where a shot may play. Earth: standard gravity, 3rd General Conference on Weights and Measures, 1901. Moon 1.62 and Mars 3.71:
 * gravity at the surface, m/s², as the planetary fact sheets of NASA's space science data archive round it.
 */
export const gravities = { earth: STANDARD_GRAVITY, moon: 1.62, mars: 3.71 } as const
export type GravityName = keyof typeof gravities | 'own'
export const gravityNames = ['earth', 'moon', 'mars', 'own'] as const satisfies readonly GravityName[]
export const gravityWords: Record<GravityName, string> = { earth: 'Earth', moon: 'Moon', mars: 'Mars', own: 'Another' }
