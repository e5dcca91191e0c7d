import { z } from 'zod'
import { serverId } from './common'
import type { Time } from './common'

/** waiting: will be tried; sending: a worker holds it; sent; parked: refused for good or out of tries; dropped: no longer wanted. */
export const letterStates = ['waiting', 'sending', 'sent', 'parked', 'dropped'] as const
export type LetterState = (typeof letterStates)[number]
export const letterKinds = ['ruling', 'invitation', 'reset'] as const
export type LetterKind = (typeof letterKinds)[number]

export const letterParams = z.strictObject({ letter: serverId })
export const lettersQuery = z.strictObject({
  state: z.enum(letterStates).optional(),
  /** Continue after this letter: the last id of the page before. */
  after: serverId.optional(),
})

export interface LetterLine {
  id: string
  kind: LetterKind
  to: string
  toName: string
  subject: string
  state: LetterState
  attempts: number
  nextAt: Time | null
  sentAt: Time | null
  lastError: string | null
  createdAt: Time
}
export interface Letter extends LetterLine {
  messageId: string
  text: string
  /** A whole HTML document, shown only inside a sandboxed frame. */
  html: string
  /** False while it is on its way, and once its one-use link is gone. */
  sendable: boolean
}
export interface LettersAnswer {
  letters: LetterLine[]
  more: boolean
  counts: Record<LetterState, number>
  /** Where letters go: the local fake, or the real server's host. */
  carrier: string
}
