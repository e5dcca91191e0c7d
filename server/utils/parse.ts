import type { H3Event } from 'h3'
import { getHeader, getQuery, getRouterParams, readRawBody } from 'h3'
import type { z } from 'zod'
import { LIMITS } from '~/utils/contracts/common'
import { plainIssues } from '~/utils/contracts/issues'
import { fail } from './fail'

const MAX_ISSUES = 20

/** @throws 422 with every field that is wrong, by path. */
export function parse<T>(schema: z.ZodType<T>, value: unknown): T {
  const result = schema.safeParse(value)
  if (result.success) return result.data
  const issues = plainIssues(result.error.issues.slice(0, MAX_ISSUES))
  const first = issues[0]
  return fail(422, first ? `${first.path ? `${first.path}: ` : ''}${first.message}` : 'This is not valid.', { issues })
}

/** The address's own parts. A shape that could never exist is simply not there. */
export function parseParams<T>(event: H3Event, schema: z.ZodType<T>): T {
  const result = schema.safeParse(getRouterParams(event, { decode: true }))
  return result.success ? result.data : fail(404, 'There is nothing here.')
}

export function parseQuery<T>(event: H3Event, schema: z.ZodType<T>): T {
  return parse(schema, getQuery(event))
}

/** @throws 411, 413, 415, 400 or 422 before anything is looked at. */
export async function parseBody<T>(event: H3Event, schema: z.ZodType<T>): Promise<T> {
  if (!/^application\/json\b/i.test(getHeader(event, 'content-type') ?? '')) unfit(415, 'Send JSON.')
  // Node stops reading at the stated length, so a stated length is a real cap.
  const stated = getHeader(event, 'content-length')
  if (stated === undefined) unfit(411, 'Say how long the request is.')
  if (Number(stated) > LIMITS.bodyBytes) unfit(413, `At most ${LIMITS.bodyBytes / 1024} kB at once.`)
  const raw = await readRawBody(event, 'utf8')
  let value: unknown
  try {
    value = JSON.parse(raw ?? '')
  } catch {
    unfit(400, 'This is not JSON.')
  }
  return parse(schema, value)
}

/** The body as a whole is at fault, not one of its fields. */
const unfit = (statusCode: number, message: string): never => fail(statusCode, message, { issues: [{ path: '', message }] })
