import type { LetterKind, LetterState } from './contracts/letter'

/** What the mail room calls things. */
export const letterStateWords: Record<LetterState, string> = {
  waiting: 'Waiting',
  sending: 'On its way',
  sent: 'Sent',
  parked: 'Parked',
  dropped: 'Dropped',
}
export const letterKindWords: Record<LetterKind, string> = { ruling: 'Ruling', invitation: 'Invitation', reset: 'New password' }

/** "not tried yet", "1 try", "3 tries". */
export function triesInWords(attempts: number): string {
  if (attempts === 0) return 'not tried yet'
  return attempts === 1 ? '1 try' : `${attempts} tries`
}

/** What sending again asks, by the state the letter is in. Nothing is asked of one that waits: it is owed anyway. */
export function sendAgainWords(state: LetterState): { button: string; question: string | null } {
  if (state === 'waiting') return { button: 'Try now', question: null }
  if (state === 'sent') return { button: 'Send again', question: 'It was sent before. Whoever still has it may be shown it only once.' }
  if (state === 'dropped') return { button: 'Send again', question: 'It was dropped for the reason shown. If that still holds, it is dropped again.' }
  return { button: 'Send again', question: 'It starts over, with all its tries.' }
}
