import type { ShotPage } from '~/utils/contracts/take'
import { claimInWords, dayInWords, decisionWords } from '~/utils/drawing/words'
import { claimRows } from '~/utils/claiming/rows'

const COUNTS = ['no', 'one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight', 'nine', 'ten', 'eleven', 'twelve']
/** 0 → "no", 4 → "four", 13 → "13". */
export const countInWords = (count: number) => COUNTS[count] ?? String(count)
const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1)

/** "One flag goes along. Four people get a letter." */
export function whatGoesAlong(flags: number, letters: number): string {
  const along = `${capital(countInWords(flags))} ${flags === 1 ? 'flag goes' : flags === 0 ? 'flag goes' : 'flags go'} along.`
  if (letters === 0) return `${along} Nobody gets a letter.`
  return `${along} ${capital(countInWords(letters))} ${letters === 1 ? 'person gets' : 'people get'} a letter.`
}

/** "Frame 61", "Frames 1–20", "Take 3", "Take 3, frame 61" where the take is not the one on screen. */
export function pinInWords(pin: { take: number | null; fromFrame: number | null; toFrame: number | null }, shown: number | null): string {
  const { take, fromFrame, toFrame } = pin
  const frames =
    fromFrame === null ? null : toFrame === null || toFrame === fromFrame ? `frame ${fromFrame}` : `frames ${fromFrame}–${toFrame}`
  if (!frames) return `Take ${take}`
  return capital(take === null || take === shown ? frames : `take ${take}, ${frames}`)
}

/** What became different between two looks at a shot, in sentences: for a ruling that came too late. */
export function whatChanged(before: ShotPage, after: ShotPage): string[] {
  const changes: string[] = []
  const known = new Map(before.takes.map((take) => [take.number, take]))
  for (const take of after.takes) {
    const old = known.get(take.number)
    if (!old) changes.push(`${take.by.name} posted take ${take.number}.`)
    else if (take.withdrawnAt && !old.withdrawnAt) changes.push(`${take.by.name} took take ${take.number} back.`)
    if (take.ruling && !old?.ruling) changes.push(`${take.ruling.by.name} ruled on take ${take.number}: ${decisionWords[take.ruling.decision].toLowerCase()}.`)
    else if (take.ruling?.reopened && !old?.ruling?.reopened) changes.push(`${take.ruling.reopened.by.name} reopened take ${take.number}.`)
  }
  if (JSON.stringify(before.claim) !== JSON.stringify(after.claim)) changes.push(claimChange(before, after))
  if (before.take && before.take.number === after.take?.number) {
    const more = after.take.flags.length - before.take.flags.length
    if (more !== 0) changes.push(more > 0 ? `${capital(countInWords(more))} more ${more === 1 ? 'flag' : 'flags'} on the take.` : 'A flag was lifted.')
  }
  if (before.title !== after.title) changes.push(`The title is now “${after.title}”.`)
  if (before.brief !== after.brief) changes.push('The brief was changed.')
  if (before.dueOn !== after.dueOn) changes.push(after.dueOn ? `It is due ${dayInWords(after.dueOn)}.` : 'It is not due any more.')
  if (before.fps !== after.fps) changes.push(`It runs at ${after.fps} frames per second.`)
  if (before.firstFrame !== after.firstFrame || before.lastFrame !== after.lastFrame)
    changes.push(`The frames are now ${after.firstFrame}–${after.lastFrame}.`)
  if (before.animator?.id !== after.animator?.id) changes.push(after.animator ? `${after.animator.name} animates it now.` : 'Nobody animates it now.')
  if (before.supervisor?.id !== after.supervisor?.id)
    changes.push(after.supervisor ? `${after.supervisor.name} supervises it now.` : 'Nobody supervises it now.')
  return changes
}

function claimChange(before: ShotPage, after: ShotPage): string {
  if (!after.claim) return 'The claim was taken off.'
  const old = new Map(before.claim ? claimRows(before.claim) : [])
  const rows = claimRows(after.claim).filter(([what, value]) => old.get(what) !== value)
  if (!before.claim || rows.length === 0) return `The claim is now ${claimInWords(after.claim)}.`
  return `The claim was changed: ${rows.map(([what, value]) => `${what.toLowerCase()} ${value}`).join(', ')}.`
}
