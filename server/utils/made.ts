import type { H3Event } from 'h3'
import { setResponseStatus } from 'h3'
import { fail } from './fail'

/** What a posting with a client-made id answers: the new thing, or the one that the same id made before. */
export interface Made<T> {
  made: boolean
  answer: T
}

/** 201 for what was made just now, 200 for what was there already. */
export function answerMade<T>(event: H3Event, { made, answer }: Made<T>): T {
  setResponseStatus(event, made ? 201 : 200)
  return answer
}

/** The id came before, with something else: a repeat would hand back what was never asked for. */
export const usedElsewhere = (): never => fail(409, 'This id already stands for something else: send it under a new one.')
