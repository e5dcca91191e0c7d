/** A contact may fall between two drawings. The drawing named as the joint then belongs to one of the two spans only. */
import type { CheckRequest } from '../types'
import { narrowed } from './divide'
import { judgePart } from './judgePart'
import type { JudgedPart } from './judgePart'

/** The parts, those judged again without a contact's drawing that only the other span explains. */
export function settleContacts(request: CheckRequest, judged: readonly JudgedPart[]): JudgedPart[] {
  const parts = [...judged]
  for (let i = 0; i + 1 < parts.length; i++) {
    const before = parts[i] as JudgedPart
    const after = parts[i + 1] as JudgedPart
    if (before.span.contact !== true) continue
    const frame = request.keys[before.last]?.frame ?? 0
    if (isFaulted(after) && !breaksAt(before, frame)) parts[i + 1] = without(request, after, 1, 0)
    else if (isFaulted(before) && !breaksAt(after, frame)) parts[i] = without(request, before, 0, 1)
  }
  return parts
}

const isFaulted = ({ judgement: { result } }: JudgedPart) => result.verdict === 'breaks'

const breaksAt = ({ judgement: { result } }: JudgedPart, frame: number) => result.keys.some(key => key.frame === frame && key.breaks)

/** The part judged again with keys left off either end, if that clears it of a fault; else as it was. */
function without(request: CheckRequest, part: JudgedPart, atStart: number, atEnd: number): JudgedPart {
  const again = judgePart(narrowed(request, part, part.first + atStart, part.last - atEnd))
  const { verdict, findings } = again.judgement.result
  const clears = verdict !== 'undecided' && findings.length < part.judgement.result.findings.length
  return clears ? again : part
}
