import type { Claim } from '~/utils/contracts/production'
import { bodyInWords, lawWords, measureWords, roundFigure, unitSign } from '~/utils/drawing/words'

/** A claim line by line, for showing two of them side by side: `[what, value]`. */
export function claimRows(claim: Claim): [string, string][] {
  const unit = unitSign(claim.unit)
  const withSign = (value: number) => (unit === '°' ? `${roundFigure(value, 4)}°` : `${roundFigure(value, 4)} ${unit}`)
  const rows: [string, string][] = [
    ['Law', lawWords[claim.law]],
    ['Readings', `${measureWords[claim.measure]}, in ${unit === '°' ? 'degrees' : unit}`],
  ]
  if (claim.radius !== undefined) rows.push(['Radius of the arc', withSign(claim.radius)])
  if (claim.zeroAt) rows.push(['Reading 0 stands for', `${roundFigure(claim.zeroAt, 4)}°`])
  if (claim.start === 'rest') rows.push(['Start', 'from rest'])
  rows.push(['Body', bodyInWords(claim.subject, claim.unit) || 'left open'])
  if (claim.subject?.gravity !== undefined) rows.push(['Gravity', `${roundFigure(claim.subject.gravity, 4)} m/s²`])
  rows.push(['Slop', withSign(claim.slop)], ['Tolerance', `${roundFigure(claim.tolerance * 100, 3)} % of the gap`])
  return rows
}
