import type { Claim } from '~/utils/contracts/production'
import type { BodySubject, Law } from '~/utils/motion/types'
import type { Exposure } from './lists'

/** What the demo's shots claim, and the things that move in them. */

export const angle = (law: Law, subject?: BodySubject): Claim => ({ law, measure: 'angle', unit: 'deg', slop: 0.3, tolerance: 0.1, ...(subject ? { subject } : {}) })
export const onPaper = (law: Law, subject?: Claim['subject']): Claim => ({ law, measure: 'distance', unit: 'px', slop: 1, tolerance: 0.08, ...(subject ? { subject } : {}) })
export const inPoints = (law: Law, subject?: Claim['subject']): Claim => ({ law, measure: 'point', unit: 'px', slop: 1, tolerance: 0.08, ...(subject ? { subject } : {}) })
export const twos = (count: number, first = 1): Exposure => ({ fps: 24, first, step: 2, count })
export const ones = (count: number, first = 1): Exposure => ({ fps: 24, first, step: 1, count })
export const degrees = (seed: number) => ({ seed, grid: 0.1, slip: 0.08 })
export const pixels = (seed: number) => ({ seed, grid: 0.5, slip: 0.3 })

export const tower: BodySubject = { shape: 'block', width: 6, height: 38 }
export const toyTower: BodySubject = { shape: 'block', width: 1.3, height: 8.2 }
export const crates: BodySubject = { shape: 'block', width: 1.1, height: 2.4 }
export const mast: BodySubject = { shape: 'rod', height: 14 }
export const drum: BodySubject = { shape: 'cylinder', radius: 0.4, height: 1.2 }
export const lamp: BodySubject = { shape: 'pole', height: 5.2, mass: 60, headMass: 25, headHeight: 5 }
export const bell: BodySubject = { shape: 'bob', length: 3.1 }
export const chain: BodySubject = { shape: 'bob', length: 1.4 }
export const hook: BodySubject = { shape: 'bob', length: 9 }
export const boom: BodySubject = { shape: 'hung-rod', length: 4.5 }
export const drop = { unitsPerMetre: 80, slope: 90 } as const
export const slip = { unitsPerMetre: 60, slope: 12, roll: 'cylinder' } as const
export const parapet: BodySubject = { shape: 'block', width: 0.6, height: 1.8 }
export const float = { unitsPerMetre: 120, slope: 90 } as const
export const coil = { unitsPerMetre: 55 } as const
export const quayStep = { unitsPerMetre: 140, slope: 90 } as const
