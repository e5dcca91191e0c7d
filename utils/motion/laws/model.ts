/** What every law offers to the fit: a line over time, its speed, and how it bends when its free numbers move. */
import type { Series } from '../series'
import type { ReadingLaw } from '../types'

/** A law's line at some times. Arrays are as long as the times asked for. */
export interface Trace {
  /** Readings. */
  value: Float64Array
  /** Readings per span (d value / d x). */
  rate: Float64Array
  /** One column per free number: d value / d number. Empty unless asked for. */
  columns: Float64Array[]
}

export interface LawModel {
  readonly law: ReadingLaw
  /** Free numbers. */
  readonly size: number
  /** True where the line is a weighted sum of fixed columns, so that one step of least squares is the answer. */
  readonly linear: boolean
  /**
   * True where the line has corners: smoothing over lone bad drawings would round them off, and a few drawings from the start of a long
   * list may hold none of them.
   */
  readonly kinked?: boolean
  /** Traces the line for times x (0 to 1 is the list's span; outside it the law is carried on). */
  trace(series: Series, numbers: Float64Array, x: Float64Array, withColumns: boolean): Trace
  /** The same line, everything `by` spans later. */
  later?(numbers: Float64Array, by: number): Float64Array
  /** For numbers found on the end of a list alone: the same line told from the list's first key on. */
  fromStart?(numbers: Float64Array): Float64Array
  /** Told where the numbers are not the law's own: those that the law without any restriction counts the same line by. Linear in them for linear laws. */
  full?(numbers: Float64Array): Float64Array
  /** Keeps a search inside the range where the law means something, in place; not for linear laws. */
  confine?(series: Series, numbers: Float64Array): void
  /** Places to begin a search from, best guess first. `y` is the list with its lone bad drawings smoothed over. */
  begin(series: Series, y: Float64Array): Float64Array[]
}
