import type { Claim } from '~/utils/contracts/production'
import type { Place } from '~/utils/drawing/labels'
import type { Point, Spot } from '~/utils/drawing/strokes'
import type { JudgedKey } from '~/utils/motion/types'

export type StripKey = Pick<JudgedKey, 'frame' | 'reading' | 'law' | 'breaks'> &
  Partial<Pick<JudgedKey, 'offset' | 'offsetFrames' | 'allowance'>>
export type StripClaim = Pick<Claim, 'law' | 'measure' | 'unit' | 'radius' | 'zeroAt' | 'subject' | 'slop'>

/** How a strip is laid out: everything the two kinds of path decide for themselves. */
export interface StripLayout {
  width: number
  height: number
  base: string
  pivot: Point | null
  posted: Spot[]
  law: (Spot | null)[]
  /** Places to try for a frame's number and for what a breaking drawing says, in pixels. */
  framePlace: (index: number) => Place
  breakPlaces: (index: number, text: string) => Place[]
  body: (index: number) => { posted: string; law: string | null } | null
  sides: string
}

export const TICK = { from: 3, to: 16, broken: 24, cross: 32 } as const
