import type { Issue, Refusal } from '~/utils/contracts/common'

/** What a refused or failed request means to a screen. */
export interface Refused {
  /** 0 where no answer came at all. */
  statusCode: number
  message: string
  issues: Issue[]
  /** What stands on the server now, where somebody else was faster (409). */
  current: unknown
}

interface FetchProblem {
  statusCode?: number
  status?: number
  data?: Partial<Refusal>
}

/** Reads whatever $fetch threw. Never a stack, never "[POST] /api/…: 422": always a sentence for people. */
export function refusedBy(problem: unknown): Refused {
  const { statusCode, status, data } = (problem ?? {}) as FetchProblem
  const code = statusCode ?? status ?? 0
  const message =
    (typeof data?.message === 'string' && data.message) ||
    (code === 0
      ? 'The server can’t be reached. Nothing is lost: try again when the line is back.'
      : 'The server could not do this. Try again in a moment.')
  return { statusCode: code, message, issues: data?.data?.issues ?? [], current: data?.data?.current ?? null }
}

/** Complaints by path, the first of each: `{ 'subject.height': 'A size is above zero.' }`. */
export function complaintsOf(issues: readonly Issue[]): Record<string, string> {
  const found: Record<string, string> = {}
  for (const { path, message } of issues) found[path] ??= message
  return found
}
