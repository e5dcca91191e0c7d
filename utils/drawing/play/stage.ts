import type { Claim } from '~/utils/contracts/production'
import type { Reads } from '~/utils/drawing/reads'
import type { PlayedList } from '~/utils/drawing/play/lists'
import { pathActor } from '~/utils/drawing/play/onPath'
import { straightActor } from '~/utils/drawing/play/straight'
import { turningActor } from '~/utils/drawing/play/turning'
import type { Point } from '~/utils/drawing/strokes'
import type { CheckResult } from '~/utils/motion/types'

/** The stage of Play: posted beside ruled, to one scale, side by side or one under the other, whichever is larger. */

/** Lengths that a motion takes up around its anchor, in its own units. */
export interface Reach {
  left: number
  right: number
  up: number
  down: number
}
export interface Drawn {
  /** The path of action, ground and pivot: hairlines. */
  path: string
  /** The body of list `which` at a drawing; empty where that list has none. */
  pose: (which: number, index: number) => string
}
/** Something that can move: how much room it takes, and how it is drawn once anchor and scale (pixels per unit) stand. */
export interface Actor {
  reach: Reach
  draw: (anchor: Point, scale: number) => Drawn
}
export interface PlayStage {
  height: number
  panels: { x: number; y: number; width: number; height: number; path: string; labelY: number; pose: (index: number) => string }[]
}

export type PlayedAnswer = Pick<CheckResult, 'keys' | 'figures' | 'path' | 'spans'>
export type PlayedClaim = Pick<Claim, 'law' | 'measure' | 'unit' | 'radius' | 'zeroAt' | 'subject' | 'slop' | 'yAxis' | 'spans'>

const MARGIN = 14
const GAP = 16
const LABEL = 26

/** Draws the stage for a width in pixels: a panel per list. */
export function drawPlay(answer: PlayedAnswer, claim: PlayedClaim, reads: Reads, lists: readonly PlayedList[], width: number): PlayStage {
  const actor = actorFor(answer, claim, reads, lists)
  const { left, right, up, down } = actor.reach
  const [wide, high] = [Math.max(left + right, 1e-9), Math.max(up + down, 1e-9)]
  const tall = width < 480 ? 210 : 280
  const fit = (columns: number, rows: number) => {
    const room = { x: (width - GAP * (columns - 1)) / columns - 2 * MARGIN, y: tall / rows - 2 * MARGIN }
    return { columns, scale: Math.min(room.x / wide, room.y / high) }
  }
  const across = fit(lists.length, 1)
  const under = fit(1, lists.length)
  const { columns, scale } = across.scale >= under.scale ? across : under
  const panelWidth = (width - GAP * (columns - 1)) / columns
  const panelHeight = Math.ceil(high * scale) + 2 * MARGIN
  const anchor = { x: panelWidth / 2 + ((left - right) / 2) * scale, y: MARGIN + up * scale }
  const drawn = actor.draw(anchor, scale)
  const panels = lists.map((_, which) => ({
    x: columns === 1 ? 0 : which * (panelWidth + GAP),
    y: columns === 1 ? which * (panelHeight + LABEL) : 0,
    width: panelWidth,
    height: panelHeight,
    path: drawn.path,
    labelY: panelHeight + 12,
    pose: (index: number) => drawn.pose(which, index),
  }))
  return { height: (columns === 1 ? lists.length : 1) * (panelHeight + LABEL), panels }
}

function actorFor(answer: PlayedAnswer, claim: PlayedClaim, reads: Reads, lists: readonly PlayedList[]): Actor {
  if (lists.some(({ points }) => points)) return pathActor(answer, claim, lists)
  return reads.measure === 'distance' ? straightActor(answer, claim, lists) : turningActor(answer, claim, lists)
}
