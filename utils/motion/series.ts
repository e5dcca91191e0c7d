/** A posted list in the judge's own measures: time runs from 0 at the first key to 1 at the last, readings stay in drawing units. */
import { brinkRatio } from './bodies'
import type { ReadingCheck } from './types'

export const RADIAN = Math.PI / 180

export interface Series {
  readonly n: number
  /** Key times over the list's span, 0 to 1. */
  readonly x: Float64Array
  /** Posted readings. */
  readonly y: Float64Array
  /** Frames from first to last. */
  readonly spanFrames: number
  /** Seconds from first to last. */
  readonly span: number
  /** Reading units per radian; 0 where the measure is no angle. */
  readonly perRadian: number
  /** The angle, radians, that reading 0 stands for. */
  readonly zero: number
  /** q = 2d/L of the body claimed, for a brink to be left at. */
  readonly edgeRatio: number
}

/** Takes a request apart. Keys need at least two entries; radius must be given for an arc. */
export function seriesOf(request: ReadingCheck): Series {
  const { keys } = request
  const first = keys[0]?.frame ?? 0
  const spanFrames = (keys[keys.length - 1]?.frame ?? first) - first
  const perRadian = request.measure === 'angle'
    ? 1 / RADIAN
    : request.measure === 'arc' ? (request.radius ?? 0) : 0
  return {
    n: keys.length,
    x: Float64Array.from(keys, key => (spanFrames > 0 ? (key.frame - first) / spanFrames : 0)),
    y: Float64Array.from(keys, key => key.reading),
    spanFrames,
    span: spanFrames / request.fps,
    perRadian,
    zero: (request.zeroAt ?? 0) * RADIAN,
    edgeRatio: brinkRatio(request.subject),
  }
}

/**
 * The spread that rounding alone gives the readings: step/√12 for the coarsest decimal or half-decimal step that all of them sit on
 * (a uniform error of one step). Never 0, so that a list typed without any error still has a spread to compare with.
 */
export function roundingSpread(y: Float64Array): number {
  return roundingStep(y) / Math.sqrt(12)
}

/** The step itself, reading units. */
export function roundingStep(y: Float64Array): number {
  let largest = 0
  for (const value of y) largest = Math.max(largest, Math.abs(value))
  const least = Math.max(1e-9, largest * 1e-12)
  for (const step of [1, 0.5, 0.1, 0.05, 0.01, 0.005, 0.001, 0.0001, 0.00001]) {
    if (y.every(value => Math.abs(value / step - Math.round(value / step)) < 1e-6)) return Math.max(step, least)
  }
  return least
}
