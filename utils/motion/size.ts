/** What size a list's timing reads as, and how far that is from the claim. */
import { equalLength, gravityOf, isBody, namedSize, pathAcceleration, pathShare, sizeForLength } from './bodies'
import type { Fit } from './fit'
import { fullNumbers } from './laws/fromRest'
import { accelerationOf } from './laws/oddRule'
import type { Series } from './series'
import { solve3 } from './solve'
import { student95 } from './student'
import type { BodySubject, Law, PathSubject, ReadingCheck, SizeReading, Subject } from './types'

export interface Scale {
  size: SizeReading | null
  /**
   * Claimed pace over the list's own pace: the list run this many times as fast is the claimed size. Null without a claimed size.
   * Pace goes as k for turning, as √a for falling: sizes scale as time squared.
   */
  pace: number | null
  /** 95 % half-width of ln(pace). */
  spread: number
  /**
   * 95 % half-width of the claim's acceleration over the list's own, in units of the list's own. Where a list hardly curves, its
   * acceleration is known to within a little while the logarithm of it is not: only this tells whether the claim can be meant.
   */
  reach: number
  /** The claimed value in the size's own unit. */
  claimed: number | null
}

/** Laws whose pace is the root of gravity over a length. */
const TURNING: readonly Law[] = ['topple', 'over-edge', 'pendulum', 'swing-decay']

const NOTHING: Scale = { size: null, pace: null, spread: Infinity, reach: Infinity, claimed: null }
/** A size known to no better than this factor either way is printed as this factor, so that an interval is always finite. */
const WIDEST = 1e6

/**
 * 95 % half-width of what moves with the free numbers as `along` says (one slope per number): residual spread over the keys kept, times
 * the root of alongᵀ·(normal matrix)⁻¹·along, times Student's t. Infinity where the list doesn't settle its numbers.
 */
export function uncertainty(fit: Fit, along: ArrayLike<number>, kept: number, least: number): number {
  const free = kept - fit.model.size
  const moved = solve3(fit.normal, along, fit.model.size)
  if (free < 1 || !moved) return Infinity
  const sigma = Math.sqrt(Math.max(fit.cost / free, least * least))
  const spread = moved.reduce((sum, value, p) => sum + value * (along[p] as number), 0)
  return sigma * Math.sqrt(Math.max(0, spread)) * student95(free)
}

/** The same for one free number. */
function halfWidth(fit: Fit, index: number, kept: number, least: number): number {
  const along = new Float64Array(fit.model.size)
  along[index] = 1
  return uncertainty(fit, along, kept, least)
}

/** `kept`: drawings that the fit counts; `least`: spread left by rounding. */
export function scaleOf(request: ReadingCheck, series: Series, fit: Fit, kept: number, least: number): Scale {
  if (TURNING.includes(request.law)) return bodyScale(request.law, request.subject, series, fit, kept, least)
  if ((request.law === 'odd-rule' && request.measure !== 'angle') || request.law === 'bounce') return pathScale(request, series, fit, kept, least)
  return NOTHING
}

/** A turning body's size by k² = g/L, ln κ being the fit's first number. */
export function bodyScale(law: Law, subject: Subject | undefined, series: Series, fit: Fit, kept: number, least: number): Scale {
  const claimed = subject && isBody(subject) ? subject : null
  // With no body named, a topple is read as a rod on its foot and a swing as a bob on a cord: the plainest of either.
  const body: BodySubject = claimed ?? (law === 'pendulum' || law === 'swing-decay' ? { shape: 'bob', length: 1 } : { shape: 'rod', height: 1 })
  const gravity = gravityOf(subject)
  const k = Math.exp(fit.numbers[0] as number) / series.span
  const value = sizeForLength(body, gravity / (k * k))
  const spread = halfWidth(fit, 0, kept, least)
  const factor = Math.min(WIDEST, Math.exp(2 * spread))
  return {
    size: { value, low: value / factor, high: value * factor, unit: 'm' },
    pace: claimed ? Math.sqrt(gravity / equalLength(claimed)) / k : null,
    spread,
    // The acceleration goes as k².
    reach: 2 * spread,
    claimed: claimed ? namedSize(claimed) : null,
  }
}

function pathScale(request: ReadingCheck, series: Series, fit: Fit, kept: number, least: number): Scale {
  const path: PathSubject = request.subject && !isBody(request.subject) ? request.subject : { gravity: gravityOf(request.subject) }
  const bounces = request.law === 'bounce'
  const pull = (numbers: Float64Array) => {
    const full = fullNumbers(fit.model, numbers)
    return Math.abs(bounces ? (full[2] ?? 0) / (series.span * series.span) : accelerationOf(full, series.span))
  }
  const a = pull(fit.numbers)
  // The acceleration is the last free number of a fall and the third of a bounce, whether it starts from rest or not.
  const index = bounces ? 2 : fit.model.size - 1
  const off = new Float64Array(fit.model.size)
  off[index] = halfWidth(fit, index, kept, least)
  const half = Math.min(a * WIDEST, pull(off))
  const perMetre = path.unitsPerMetre
  const unit = perMetre === undefined ? pathAcceleration(path) : perMetre * pathShare(path)
  if (!(unit > 0) || !(a > 0)) return NOTHING
  return {
    size: {
      value: a / unit, low: Math.max(0, a - half) / unit, high: (a + half) / unit,
      unit: perMetre === undefined ? `${request.unit}/m` : 'm/s²',
    },
    pace: perMetre === undefined ? null : Math.sqrt(perMetre * pathAcceleration(path) / a),
    spread: half < a ? -0.5 * Math.log(1 - half / a) : Infinity,
    reach: half / a,
    claimed: perMetre === undefined ? null : gravityOf(path),
  }
}
