import type { Claim } from '~/utils/contracts/production'
import { lawWords } from '~/utils/drawing/words'
import { claimedWords, sizeWords } from '~/utils/motion/sizeWords'
import type { CheckResult, Finding, SizeReading } from '~/utils/motion/types'

/** What the judge said of a list, in one short sentence for a sheet of the wall: no full stop, no bracket. */
export function headline(answer: CheckResult, claim: Pick<Claim, 'law' | 'spans'>): string {
  const { verdict, size, findings } = answer
  if (verdict === 'undecided') return shorten(answer.reason ?? 'This list can’t be told yet')
  if (verdict === 'holds') return size ? `Holds · reads as ${sized(size)}` : 'Holds'
  const [first] = findings
  return first ? told(first, answer, claim) : breakingDrawings(answer)
}

function told(finding: Finding, answer: CheckResult, claim: Pick<Claim, 'law' | 'spans'>): string {
  const { size, readsAs } = answer
  if (finding.kind === 'wrong-scale' && !claim.spans && size && finding.amount > 0)
    return `Reads as ${sized(size)}, not ${claimedWords(size.value / finding.amount, size.unit)}`
  // Under several laws the sentence says which span is meant; the sheet's short form knows one law only.
  if (finding.kind === 'wrong-law' && !claim.spans) {
    const better = readsAs[0]
    // The judge names a winner in its sentence only when it is clearly ahead; then so does the sheet.
    return better && better.law !== claim.law && finding.text.includes('reads as')
      ? `Reads as ${lawWords[better.law]}, not ${lawWords[claim.law]}`
      : shorten(finding.text)
  }
  return shorten(finding.text)
}

function breakingDrawings({ keys }: CheckResult): string {
  const breaking = keys.filter((key) => key.breaks)
  return breaking.length === 1 ? `Frame ${breaking[0]!.frame} is off the line` : `${breaking.length} drawings are off the line`
}

/** The size with the digits of the judge's own sentence; a fall drawn to scale has no size of its own, it reads as a gravity. */
const sized = (size: SizeReading) => `${size.unit === 'm/s²' ? 'gravity ' : ''}${sizeWords(size).value}`

/** The judge's sentence up to where it goes into detail; of one law among several, with the frames it is about. */
function shorten(sentence: string): string {
  const [, where, what] = /^(From frame \d+ to \d+): (.+)$/.exec(sentence) ?? []
  return where && what ? `${where}: ${firstClause(what)}` : firstClause(sentence)
}
const firstClause = (sentence: string) => sentence.split(/\s*\(|[;:]|, (?:and|so) |\.$/)[0]!.trim()
