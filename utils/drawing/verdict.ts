import type { Claim } from '~/utils/contracts/production'
import { claimedSize, frameCount, metres, roundFigure, verdictWords } from '~/utils/drawing/words'
import { LAW_WORDS } from '~/utils/motion'
import { sizeWithInterval } from '~/utils/motion/sizeWords'
import type { CheckResult } from '~/utils/motion/types'

/** The sentence at the head of a take: what the list is, what it reads as, what to do about it. */

type SaidClaim = Pick<Claim, 'law' | 'subject' | 'unit' | 'start'>

/** Words for the number of drawings that break, apart from those that a finding already tells of. */
const brokenCount = (answer: CheckResult) => answer.keys.filter((key) => key.breaks).length

/** "a topple"; of a list under several laws, "a slow in, then even spacing, then a slow in". */
function lawAsMotion(answer: Pick<CheckResult, 'spans'>, claim: SaidClaim): string {
  const named = answer.spans?.map(({ law }) => LAW_WORDS[law])
  return named && named.length > 1 ? named.join(', then ') : LAW_WORDS[claim.law]
}

function wrongScale(answer: CheckResult, claim: SaidClaim): string {
  const { size } = answer
  const claimed = claimedSize(claim.subject)
  if (!size || size.unit !== 'm' || claimed === null) return answer.findings.find(({ kind }) => kind === 'wrong-scale')!.text
  const needs = answer.claim
    ? `: that size needs ${frameCount(answer.claim.frames, 0)}, this takes ${roundFigure(answer.claim.usedFrames, 4)}`
    : ''
  return `The shape is ${lawAsMotion(answer, claim)}, but it reads as ${sizeWithInterval(size)}, not ${metres(claimed, 3)}${needs}.`
}

/** The verdict's word and the rest of its sentence. */
export function verdictInWords(answer: CheckResult, claim: SaidClaim): { word: string; rest: string } {
  if (answer.verdict === 'undecided') return { word: `${verdictWords.undecided}:`, rest: answer.reason ?? 'the list is too short.' }
  const word = `${verdictWords[answer.verdict]}.`
  if (answer.verdict === 'holds') {
    const size = answer.size && answer.size.unit === 'm' ? ` of ${sizeWithInterval(answer.size)}` : ''
    const met = answer.joints?.length ? ', and the joints hold' : ''
    return { word, rest: `Every drawing sits inside its allowance${met}: it reads as ${lawAsMotion(answer, claim)}${size}${claim.start === 'rest' ? ', from rest' : ''}.` }
  }
  if (answer.findings.some(({ kind }) => kind === 'wrong-law')) return { word, rest: answer.findings.find(({ kind }) => kind === 'wrong-law')!.text }
  // Where the motion is under way before the list begins, that comes before its size.
  const startsWrong = answer.findings.some(({ kind }) => kind === 'not-at-rest')
  if (!startsWrong && answer.findings.some(({ kind }) => kind === 'wrong-scale')) return { word, rest: wrongScale(answer, claim) }
  const [first, ...others] = answer.findings
  if (!first) {
    const count = brokenCount(answer)
    return { word, rest: `${count} ${count === 1 ? 'drawing sits' : 'drawings sit'} outside ${count === 1 ? 'its' : 'their'} allowance.` }
  }
  const more = others.length === 0 ? '' : others.length === 1 ? ' One more finding below.' : ` ${others.length} more findings below.`
  return { word, rest: first.text + more }
}
