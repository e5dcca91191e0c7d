import { expect } from 'vitest'
import type { Refusal } from '~/utils/contracts/common'
import type { Answer } from './client'
import { rowCounts } from './store'

/** Sends it, and insists on a refusal of the one shape with nothing stored. */
export async function refused(send: () => Promise<Answer>, status: number, path?: string): Promise<Refusal> {
  const before = await rowCounts(['sessions'])
  const { body, headers, ...answer } = await send()
  expect(answer.status, JSON.stringify(body)).toBe(status)
  expect(headers.get('content-type')).toMatch(/^application\/json/)
  const refusal = body as Refusal
  expect(refusal.statusCode).toBe(status)
  expect(refusal.message).toMatch(/\S/)
  expect(Object.keys(refusal).every((key) => ['statusCode', 'message', 'data'].includes(key))).toBe(true)
  expect(JSON.stringify(refusal)).not.toMatch(/\bat .+:\d+:\d+|node_modules|SQLITE|Sequelize|ZodError/)
  if (path !== undefined) expect(refusal.data?.issues?.map((issue) => issue.path)).toContain(path)
  expect(await rowCounts(['sessions'])).toEqual(before)
  return refusal
}
