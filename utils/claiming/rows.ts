import type { Claim } from '~/utils/contracts/production'
import { bodyInWords, lawWords, measureWords, pointsInWords, roundFigure, spansInWords, unitSign } from '~/utils/drawing/words'

/** A claim line by line, for showing two of them side by side: `[what, value]`. */
export function claimRows(claim: Claim): [string, string][] {
  const unit = unitSign(claim.unit)
  const withSign = (value: number) => (unit === '°' ? `${roundFigure(value, 4)}°` : `${roundFigure(value, 4)} ${unit}`)
  const rows: [string, string][] = [
    claim.spans ? ['Laws', spansInWords(claim.spans)] : ['Law', lawWords[claim.law]],
    ['Readings', `${measureWords[claim.measure]}, in ${unit === '°' ? 'degrees' : unit}`],
  ]
  const onDrawing = pointsInWords(claim)
  if (onDrawing) rows.push(['Points run', onDrawing])
  if (claim.radius !== undefined) rows.push(['Radius of the arc', withSign(claim.radius)])
  if (claim.zeroAt) rows.push(['Reading 0 stands for', `${roundFigure(claim.zeroAt, 4)}°`])
  // The words of spans name a slow out as one; of the other laws it is said here.
  const resting = claim.spans?.filter(({ law, start }) => start === 'rest' && law !== 'odd-rule').map(({ law, from }) => `${lawWords[law]} from ${from}`)
  if (resting?.length) rows.push(['From rest', resting.join(', ')])
  else if (claim.start === 'rest') rows.push(['Start', 'from rest'])
  const bodies = [claim.subject, ...(claim.spans ?? []).map((span) => span.subject)].map((one) => bodyInWords(one, claim.unit)).filter(Boolean)
  rows.push(['Body', bodies.join('; ') || 'left open'])
  if (claim.subject?.gravity !== undefined) rows.push(['Gravity', `${roundFigure(claim.subject.gravity, 4)} m/s²`])
  rows.push(['Slop', withSign(claim.slop)], ['Tolerance', `${roundFigure(claim.tolerance * 100, 3)} % of the gap`])
  return rows
}
