import type { Point } from '~/utils/drawing/strokes'
import { px } from '~/utils/drawing/strokes'

/** A whole circle as a path: for balls, bobs, heads and pivots. Pixels. */
export const circlePath = ({ x, y }: Point, r: number) =>
  `M${px(x - r)} ${px(y)}a${px(r)} ${px(r)} 0 1 0 ${px(2 * r)} 0a${px(r)} ${px(r)} 0 1 0 ${px(-2 * r)} 0Z`
