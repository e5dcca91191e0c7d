/** What a made list is: a check as it would be sent, and the truth about it. */

export type Law = 'odd-rule' | 'topple' | 'pendulum' | 'steady'
export type MoreLaw = 'slow-in' | 'spin' | 'swing-decay' | 'bounce'

export interface TruthOf {
  kind: 'clean' | 'not-at-rest' | 'misplaced' | 'held' | 'skipped' | 'wrong-law' | 'wrong-scale' | 'backward' | 'undecided'
  frames: number[]
  /** Metres, height of the rod or length of the bob. */
  size?: number
  reads?: string | null
  /** Share of the way from start to flat, or of a full swing, that the list covers; where it applies. */
  covers?: number
}

export interface MadeList {
  family: string
  // Written out here on purpose: the judge's own types are not imported.
  request: {
    law: Law | MoreLaw, fps: number, measure: 'angle' | 'distance' | 'arc', unit: string
    slop: number, tolerance: number, keys: { frame: number, reading: number }[], radius?: number, zeroAt?: number, start?: 'rest'
    subject?: { shape: 'rod', height: number } | { shape: 'bob', length: number } | { unitsPerMetre: number }
  }
  truth: TruthOf
}

export type Kind =
  | 'clean' | 'misplaced' | 'misplaced-two' | 'held' | 'skipped' | 'wrong-scale' | 'backward'
  | 'even' | 'ease' | 'fall-as-topple' | 'topple-as-fall' | 'short' | 'few'
  // Hard ones: pencil over nearly the whole slop; three or four bad drawings among fewer than sixteen.
  | 'rough' | 'misplaced-many'
/** Brief ones have eight to eleven drawings. */
export type Family = Kind | 'misplaced-brief' | 'held-brief' | 'skipped-brief' | 'ease-brief'
