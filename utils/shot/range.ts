import { frameCount } from '~/utils/drawing/words'

/** A list and its shot may disagree on where the shot ends: no fault of the timing, but somebody wants to know. */
export function rangeHint(frames: readonly number[], { firstFrame, lastFrame }: { firstFrame: number; lastFrame: number }): string {
  const [first, last] = [frames[0], frames.at(-1)]
  if (first === undefined || last === undefined) return ''
  const late = last - lastFrame
  const early = firstFrame - first
  const said: string[] = []
  if (early > 0) said.push(`begins ${frameCount(early)} before the shot does, at ${firstFrame}`)
  if (late > 0) said.push(`runs ${frameCount(late)} past the shot’s last, ${lastFrame}`)
  return said.length > 0 ? `The list ${said.join(', and ')}.` : ''
}
