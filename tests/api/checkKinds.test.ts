import { beforeAll, describe, expect, it } from 'vitest'
import type { CheckResult } from '~/utils/contracts/check'
import { judge } from '~/utils/motion'
import type { Client } from '../helpers/client'
import { carriedSpans, kinds, oneDrawing, pushed } from '../helpers/kinds'
import { openPier } from '../helpers/pier'
import { rowCounts } from '../helpers/store'

let animator: Client
beforeAll(async () => ({ animator } = (await openPier(['animator'])).as))
const check = async (request: object) => {
  const { status, body } = await animator.post<CheckResult>('/api/check', request)
  expect(status, JSON.stringify(body)).toBe(200)
  return body
}
const kind = (what: string) => kinds.find((one) => one.what === what)!.request

describe.each(kinds)('POST /api/check: $what', ({ request }) => {
  it('holds as it is, as in the browser and to the last digit, and stores nothing', async () => {
    const before = await rowCounts()
    const answer = await check(request)
    expect(answer).toEqual(JSON.parse(JSON.stringify(judge(request))))
    expect(answer).toMatchObject({ verdict: 'holds', reason: null, findings: [] })
    expect(answer.keys.map(({ frame }) => frame)).toEqual(request.keys.map(({ frame }) => frame))
    expect(await rowCounts()).toEqual(before)
  })

  it('breaks at the one drawing that is pushed off its place', async () => {
    const at = 6
    const answer = await check(pushed(request, at, request.unit === 'deg' ? 5 : 25))
    expect(answer.verdict).toBe('breaks')
    const [first] = answer.findings
    expect(oneDrawing).toContain(first?.kind)
    expect(first?.frames).toEqual([request.keys[at]!.frame])
  })
})

describe('what more there is in an answer', () => {
  it('of spans: each one’s own verdict, and joints where both sides agree', async () => {
    const { spans, joints } = await check(kind('three spans that are given'))
    expect(spans).toMatchObject(carriedSpans.map(({ from, to, law }) => ({ from, to, law, verdict: 'holds', contact: false })))
    // 24 px a frame on either side of both joints: what the list is made of.
    for (const joint of joints!) expect([joint.holds, Math.round(joint.before!), Math.round(joint.after!)]).toEqual([true, 24, 24])
    expect(joints!.map(({ frame }) => frame)).toEqual([1009, 1021])
  })
  it('of spans that don’t carry their speed over: a broken joint, unless the claim says contact', async () => {
    const request = kind('three spans that are given')
    const stopped = (request.keys as { frame: number; reading: number }[]).map(({ frame, reading }) => ({ frame, reading: frame <= 1009 ? reading : 96 + (reading - 96) / 4 }))
    const [first, ...others] = carriedSpans
    expect((await check({ ...request, keys: stopped })).findings).toMatchObject([{ kind: 'broken-joint', frames: [1009] }])
    expect(await check({ ...request, keys: stopped, spans: [{ ...first, contact: true }, ...others] })).toMatchObject({ verdict: 'holds', findings: [] })
  })
  it('of points: the path, with y as it was posted, and the law’s own points', async () => {
    const [found, given, up] = await Promise.all(['points of a swing, pivot found', 'points of a swing, pivot given', 'the same swing with y upwards'].map((what) => check(kind(what))))
    for (const [answer, y] of [[found!, 100], [given!, 100], [up!, -100]] as const) {
      expect(answer.path).toMatchObject({ kind: 'circle' })
      if (answer.path?.kind !== 'circle') continue
      // Drawn about 500, 100 with a cord of 300. Twelve degrees of it bulge by 1.6 px: the tenths of the drawing leave some pixels of doubt.
      const doubt = answer.path.given ? 0.1 : 15
      expect(Math.hypot(answer.path.centre.x - 500, answer.path.centre.y - y)).toBeLessThan(doubt)
      expect(Math.abs(answer.path.radius - 300)).toBeLessThan(doubt)
      expect(answer.reads).toEqual({ measure: 'angle', unit: 'deg' })
    }
    expect([found, given].map((answer) => answer!.path?.kind === 'circle' && answer!.path.given)).toEqual([false, true])
    const { ruledPoints } = given!
    for (const [i, { x, y }] of ruledPoints!.fit.entries()) {
      const posted = kind('points of a swing, pivot given').keys[i] as { x: number; y: number }
      expect(Math.hypot(x - posted.x, y - posted.y)).toBeLessThan(1)
    }
  })
})
