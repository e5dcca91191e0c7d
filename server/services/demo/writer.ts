import { v7 as uuid } from 'uuid'
import { Comment, Flag, Ruling, Shot, Take, Thread, Waiver } from '~/server/models'
import type { Production, Sequence } from '~/server/models'
import { appendEvent, takeNumber } from '~/server/services/events'
import { oweRulingLetters } from '~/server/services/letters'
import { makeSketch } from '~/server/services/sketch'
import { JUDGE_VERSION } from '~/server/services/takes'
import type { EventKind } from '~/utils/contracts/event'
import type { Claim } from '~/utils/contracts/production'
import { requestFor } from '~/utils/contracts/check'
import { judge } from '~/utils/motion'
import type { DemoShot, DemoTake, DemoThread } from './story'

const DAY_MS = 24 * 60 * 60 * 1000

interface Told {
  at: string
  kind: EventKind
  shot: Shot
  personId: string
  take?: number
  /** A comment takes its number when its turn comes. */
  comment?: { id: string; threadId: string; body: string }
}

/** Writes the demo's shots with the days they are said to have happened on; events are numbered at the end, in order of time. */
export class DemoWriter {
  readonly #told: Told[] = []

  constructor(
    private readonly production: Production,
    private readonly people: ReadonlyMap<string, string>,
  ) {}

  async shot(sequence: Sequence, demo: DemoShot, position: number, createdAt: string): Promise<void> {
    const shot = await Shot.create({
      id: uuid(),
      clientId: uuid(),
      productionId: this.production.id,
      sequenceId: sequence.id,
      code: demo.code,
      title: demo.title,
      firstFrame: demo.range[0],
      lastFrame: demo.range[1],
      fps: demo.fps ?? 24,
      brief: demo.brief,
      position,
      dueOn: demo.dueIn === undefined ? null : daysFromNow(demo.dueIn).slice(0, 10),
      animatorId: demo.animator ? this.person(demo.animator) : null,
      supervisorId: demo.supervisor ? this.person(demo.supervisor) : null,
      claim: demo.claim ?? null,
      createdBy: this.person('coordinator'),
      createdAt,
    })
    const takes: Take[] = []
    for (const [i, take] of (demo.takes ?? []).entries()) takes.push(await this.take(shot, take, i + 1))
    for (const thread of demo.threads ?? []) await this.thread(shot, takes, thread)
    // Letters say what the shot's threads are, so they are written once those are there.
    for (const [i, take] of (demo.takes ?? []).entries()) if (take.ruling) await this.rule(shot, takes[i]!, take.ruling)
  }

  private async take(shot: Shot, demo: DemoTake, number: number): Promise<Take> {
    if (!shot.claim) throw new Error(`The demo's ${shot.code} has a take and no claim.`)
    const claim: Claim = shot.claim
    const answer = judge(requestFor(claim, shot.fps, demo.keys))
    const createdAt = daysFromNow(-demo.daysAgo)
    const personId = this.person(demo.by)
    const { unit, slop, tolerance } = claim
    const take = await Take.create({
      id: uuid(), clientId: uuid(), shotId: shot.id, number, keys: demo.keys, unit, slop, tolerance, fps: shot.fps, claim,
      note: demo.note ?? '', personId, createdAt, answer, verdict: answer.verdict, judgeVersion: JUDGE_VERSION,
      sketch: makeSketch(number, answer, claim), withdrawnAt: demo.takenBack ? daysFromNow(0.02 - demo.daysAgo) : null,
    })
    this.#told.push({ at: createdAt, kind: 'take', shot, personId, take: number })
    const said = { clientId: uuid(), takeId: take.id, personId: shot.supervisorId ?? this.person('supervisor'), createdAt: daysFromNow(0.1 - demo.daysAgo) }
    for (const { kind, frames } of answer.findings) {
      const finding = { kind, frames }
      for (const flag of demo.flags?.filter((one) => one.kind === kind) ?? [])
        await Flag.create({ ...said, id: uuid(), clientId: uuid(), ...runOf(frames, demo), reason: flag.reason, finding })
      for (const waiver of demo.waives?.filter((one) => one.kind === kind) ?? [])
        await Waiver.create({ ...said, id: uuid(), clientId: uuid(), reason: waiver.reason, finding })
    }
    return take
  }

  private async thread(shot: Shot, takes: Take[], { take, frames, settled, says }: DemoThread): Promise<void> {
    const [first] = says
    if (!first) return
    const last = says.at(-1) ?? first
    const personId = this.person(first[0])
    const thread = await Thread.create({
      id: uuid(), clientId: uuid(), shotId: shot.id, takeId: take ? (takes[take - 1]?.id ?? null) : null,
      fromFrame: frames?.[0] ?? null, toFrame: frames?.[1] ?? null, personId, createdAt: daysFromNow(-first[1]),
      settledAt: settled ? daysFromNow(0.05 - last[1]) : null, settledBy: settled ? personId : null,
    })
    for (const [i, [who, daysAgo, body]] of says.entries())
      this.#told.push({
        at: daysFromNow(-daysAgo), kind: i === 0 ? 'thread' : 'comment', shot, personId: this.person(who),
        comment: { id: uuid(), threadId: thread.id, body },
      })
  }

  private async rule(shot: Shot, take: Take, { decision, by, note, daysAgo }: NonNullable<DemoTake['ruling']>): Promise<void> {
    const personId = this.person(by)
    const createdAt = daysFromNow(-daysAgo)
    const ruling = await Ruling.create({ id: uuid(), clientId: uuid(), takeId: take.id, decision, note, personId, createdAt })
    this.#told.push({ at: createdAt, kind: 'ruling', shot, personId, take: take.number })
    await oweRulingLetters(ruling)
  }

  /** Numbers everything that happened, earliest first. */
  async tellInOrder(): Promise<void> {
    for (const { at, kind, shot, personId, take, comment } of [...this.#told].sort((a, b) => (a.at < b.at ? -1 : 1))) {
      const n = await takeNumber(this.production)
      if (comment) await Comment.create({ ...comment, clientId: uuid(), eventNumber: n, personId, createdAt: at })
      await appendEvent(this.production, { kind, shot, personId, take, commentId: comment?.id }, n)
    }
  }

  private person(key: string): string {
    const id = this.people.get(key)
    if (!id) throw new Error(`The demo has nobody called ${key}.`)
    return id
  }
}

const daysFromNow = (days: number) => new Date(Date.now() + days * DAY_MS).toISOString()

/** The run of frames that a finding is about: its own, or the whole list's. */
function runOf(frames: readonly number[], { keys }: DemoTake): { fromFrame: number; toFrame: number } {
  const named = frames.length > 0 ? frames : keys.map(({ frame }) => frame)
  return { fromFrame: Math.min(...named), toFrame: Math.max(...named) }
}
