import type { Claim } from '~/utils/contracts/production'
import type { Place } from '~/utils/drawing/labels'
import type { Point, Spot } from '~/utils/drawing/strokes'
import type { CheckResult, JudgedKey } from '~/utils/motion/types'

export type StripKey = Pick<JudgedKey, 'frame' | 'reading' | 'law' | 'breaks'> &
  Partial<Pick<JudgedKey, 'offset' | 'offsetFrames' | 'allowance' | 'point' | 'lawPoint' | 'offPath'>>
export type StripClaim = Pick<Claim, 'law' | 'measure' | 'unit' | 'radius' | 'zeroAt' | 'subject' | 'slop' | 'yAxis'>
/** What the judge found besides the drawings: the path of points, and where spans meet. */
export type StripPaths = Partial<Pick<CheckResult, 'path' | 'spans' | 'joints' | 'findings'>>

/** How a strip is laid out: everything the three kinds of path decide for themselves. */
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
  /** Posted drawings are dots on the path, not ticks beside it. */
  dots?: boolean
  /** Drawings that sit off the path, and where they should be. */
  offPath?: { index: number; from: Point; to: Point }[]
  sides: string
}

export const TICK = { from: 3, to: 16, broken: 24, cross: 32 } as const
