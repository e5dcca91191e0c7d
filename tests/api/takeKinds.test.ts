import { v4 } from 'uuid'
import { beforeAll, describe, expect, it } from 'vitest'
import { Shot } from '~/server/models'
import type { Claim, Sheet } from '~/utils/contracts/production'
import type { ShotFacts, ShotPage, Take } from '~/utils/contracts/take'
import { carriedList, carriedSpans, swingPoints } from '../helpers/kinds'
import { ok, openPier } from '../helpers/pier'
import type { Pier } from '../helpers/pier'
import { refused } from '../helpers/refused'
import { fall, fallClaim } from '../helpers/seed'

/** Claims and takes of points and of several laws, over HTTP. */

let pier: Pier
beforeAll(async () => {
  pier = await openPier(['animator', 'supervisor'])
})

const pointClaim: Claim = { law: 'pendulum', measure: 'point', unit: 'px', pivot: { x: 500, y: 100 }, slop: 1, tolerance: 0.1 }
const spansClaim: Claim = { law: 'odd-rule', measure: 'distance', unit: 'px', slop: 1, tolerance: 0.1, spans: carriedSpans.map((span) => ({ ...span })) }
const post = (base: string, keys: unknown) => pier.as.animator.post(`${base}/takes`, { clientId: v4(), keys })

describe('a claim of points', () => {
  it('comes back as it was set, and a take of points is kept as it was posted', async () => {
    const { base, shot } = await pier.shot({ claim: null })
    const facts = await ok<ShotFacts>(pier.as.supervisor.put(`${base}/claim`, { claim: { ...pointClaim, yAxis: 'down' }, version: shot.version }), 200)
    expect(facts.claim).toEqual({ ...pointClaim, yAxis: 'down' })
    const take = await ok<Take>(post(base, swingPoints), 201)
    expect(take).toMatchObject({ number: 1, verdict: 'holds', claim: { measure: 'point' } })
    expect(take.answer.keys.map(({ frame, point }) => ({ frame, ...point }))).toEqual(swingPoints)
    const page = await ok<ShotPage>(pier.as.animator.get(base), 200)
    expect(page.take?.answer).toEqual(take.answer)
  })
  it('draws its sheet by the readings along the path', async () => {
    const { base, shot } = await pier.shot({ claim: pointClaim })
    await ok(post(base, swingPoints), 201)
    const { sketch } = await ok<Sheet>(pier.as.animator.get(`${pier.here}/wall/${shot.code}`), 200)
    expect(sketch).toMatchObject({ verdict: 'holds', drawings: swingPoints.length, headline: expect.stringMatching(/^Holds/) })
    // Six degrees to either side of the lowest point.
    const readings = sketch!.marks.map(({ reading }) => reading)
    expect(Math.abs(Math.max(...readings) - 6)).toBeLessThan(0.2)
    expect(Math.abs(Math.min(...readings) + 6)).toBeLessThan(0.2)
  })
  it('takes no readings, and a claim of readings no points', async () => {
    const [ofPoints, ofReadings] = [await pier.shot({ claim: pointClaim }), await pier.shot({ claim: fallClaim })]
    const wanted = async (send: () => ReturnType<typeof post>) => (await refused(send, 422, 'keys[0]')).data?.issues
    expect(await wanted(() => post(ofPoints.base, fall()))).toEqual([{ path: 'keys[0]', message: 'This is judged by points: every key has a frame, x and y.' }])
    expect(await wanted(() => post(ofReadings.base, swingPoints))).toEqual([{ path: 'keys[0]', message: 'This is judged by readings: every key has a frame and a reading.' }])
  })
  it.each<[string, object, string]>([
    ['half a point', { frame: 1003, x: 3 }, 'keys[1].y'],
    ['a point that is a reading too', { frame: 1003, x: 3, y: 4, reading: 5 }, 'keys[1]'],
    ['a point off every drawing', { frame: 1003, x: 1e7, y: 4 }, 'keys[1].x'],
    ['a frame that goes back', { frame: 1000, x: 3, y: 4 }, 'keys[1].frame'],
  ])('takes no %s', async (_, key, path) => {
    const { base } = await pier.shot({ claim: pointClaim })
    await refused(() => post(base, swingPoints.with(1, key as never)), 422, path)
  })
})

describe('a claim of several laws', () => {
  it('comes back as it was set, and judges each of them', async () => {
    const { base, shot } = await pier.shot({ claim: null })
    const facts = await ok<ShotFacts>(pier.as.supervisor.put(`${base}/claim`, { claim: spansClaim, version: shot.version }), 200)
    expect(facts.claim).toEqual(spansClaim)
    expect((await Shot.findByPk(shot.id))?.claim).toEqual(spansClaim)
    const take = await ok<Take>(post(base, carriedList), 201)
    expect(take.verdict).toBe('holds')
    expect(take.answer.spans?.map(({ law, verdict }) => [law, verdict])).toEqual([['odd-rule', 'holds'], ['steady', 'holds'], ['slow-in', 'holds']])
  })
  it('goes with the list’s own ends', async () => {
    const { base } = await pier.shot({ claim: spansClaim })
    const shorter = carriedList.slice(2, -2)
    const take = await ok<Take>(post(base, shorter), 201)
    expect(take.answer.spans?.map(({ from, to }) => [from, to])).toEqual([[1003, 1009], [1009, 1021], [1021, 1029]])
    expect(take.claim).toEqual(spansClaim)
  })
  it('wants a drawing on each joint', async () => {
    const { base } = await pier.shot({ claim: spansClaim })
    const without = (frame: number) => carriedList.filter((key) => key.frame !== frame)
    const { data } = await refused(() => post(base, without(1021)), 422, 'keys')
    expect(data?.issues).toEqual([{ path: 'keys', message: 'The claim’s laws meet at frame 1021: the list needs a drawing there, between its first and its last.' }])
    await refused(() => post(base, carriedList.filter(({ frame }) => frame <= 1021)), 422, 'keys')
  })
})
