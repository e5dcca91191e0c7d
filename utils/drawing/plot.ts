/** The ruler of frames that the curve and the gaps share, so that they stand exactly under each other. */

export const PLOT = { left: 46, right: 14 } as const

export interface FrameScale {
  at: (frame: number) => number
  /** The frame (not whole) at a pixel. */
  invert: (x: number) => number
}

/** Frames of a list over `width` pixels; a single drawing stands in the middle. */
export function frameScale(frames: readonly number[], width: number): FrameScale {
  const first = frames[0] ?? 0
  const last = frames.at(-1) ?? first
  const room = Math.max(1, width - PLOT.left - PLOT.right)
  if (last === first) return { at: () => PLOT.left + room / 2, invert: () => first }
  return {
    at: (frame) => PLOT.left + ((frame - first) / (last - first)) * room,
    invert: (x) => first + ((x - PLOT.left) / room) * (last - first),
  }
}
