import type { Issue, Refusal } from '~/utils/contracts/common'

/** A refusal that a person can act on. Anything else that is thrown becomes a plain 500. */
export class Failure extends Error {
  constructor(
    readonly statusCode: number,
    message: string,
    readonly details: Refusal['data'] = undefined,
  ) {
    super(message)
  }

  /** What crosses the wire: never a stack. */
  toWire(): Refusal {
    return { statusCode: this.statusCode, message: this.message, ...(this.details ? { data: this.details } : {}) }
  }
}

/** Ends the request with a 4xx and one clear sentence. */
export function fail(statusCode: number, message: string, details?: Refusal['data']): never {
  throw new Failure(statusCode, message, details)
}

export const notFound = (): never => fail(404, 'There is nothing here.')
export const forbidden = (): never => fail(403, 'Your role does not allow this here.')
/** 422 that points at one field. */
export const invalid = (path: string, message: string): never =>
  fail(422, message, { issues: [{ path, message }] satisfies Issue[] })
/** 409: somebody else was faster; `current` is what stands now, so that nothing typed is lost. */
export const stale = (current: unknown): never =>
  fail(409, 'Somebody changed this while you were writing. Both texts are kept: compare, then send again.', { current })
