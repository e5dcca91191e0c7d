import { v7 as uuid } from 'uuid'
import type { z } from 'zod'
import { Take } from '~/server/models'
import { row, rows } from '~/server/models/database'
import { fail, invalid, notFound } from '~/server/utils/fail'
import { usedElsewhere } from '~/server/utils/made'
import type { Made } from '~/server/utils/made'
import { jointWanted, keysSuit, keysWanted, missingJoint, requestFor } from '~/utils/contracts/check'
import { sameFinding } from '~/utils/contracts/take'
import type { FindingName, Flag, newTake, Take as TakeWire, TakeLine, Waiver } from '~/utils/contracts/take'
import { deskOf } from '~/utils/desk'
import { judge } from '~/utils/motion'
import { appendEvent } from './events'
import { postings, takeLines } from './history'
import { raiseVersion } from './shots'
import { makeSketch } from './sketch'
import { now, someone } from './wire'
import type { OnShot, OnTake } from './wire'

/** Raised with every change of the judge that can change an answer: a stored answer says which judge gave it. */
export const JUDGE_VERSION = '3'

/** Posts a list: judged here and now, by the claim as it stands; numbered, and never changed again. */
export async function postTake({ production, shot, person }: OnShot, body: z.infer<typeof newTake>): Promise<Made<TakeWire>> {
  const before = await Take.findOne({ where: { personId: person.id, clientId: body.clientId } })
  if (before && before.shotId !== shot.id) usedElsewhere()
  if (before) return { made: false, answer: await takeWire(before) }

  const { claim } = shot
  if (!claim) return fail(409, 'Say what this shot claims first: without a law there is nothing to judge a list by.')
  const lines = await takeLines(shot.id)
  if (deskOf(shot.createdAt, postings(lines)).desk === 'settled')
    fail(409, 'This shot is settled: a supervisor reopens it before another take is posted.')
  const number = (lines.at(-1)?.number ?? 0) + 1
  if (!keysSuit(claim, body.keys)) invalid('keys[0]', keysWanted[claim.measure === 'point' ? 'point' : 'reading'])
  const joint = missingJoint(claim, body.keys)
  if (joint !== null) invalid('keys', jointWanted(joint))
  const answer = judge(requestFor(claim, shot.fps, body.keys))
  const take = await Take.create({
    id: uuid(),
    clientId: body.clientId,
    shotId: shot.id,
    number,
    keys: body.keys,
    unit: claim.unit,
    slop: claim.slop,
    tolerance: claim.tolerance,
    fps: shot.fps,
    claim,
    note: body.note,
    personId: person.id,
    createdAt: now(),
    answer,
    verdict: answer.verdict,
    judgeVersion: JUDGE_VERSION,
    sketch: makeSketch(number, answer, claim),
  })
  await raiseVersion(shot)
  await appendEvent(production, { kind: 'take', shot, personId: person.id, take: number })
  return { made: true, answer: await takeWire(take) }
}

/** Takes a take back: it stays in the history as a line, and decides nothing any more. Doing it twice is doing it once. */
export async function takeBack({ production, shot, take, person }: OnTake): Promise<TakeLine> {
  if (!take.withdrawnAt) {
    await take.update({ withdrawnAt: now() })
    await raiseVersion(shot)
    await appendEvent(production, { kind: 'take-back', shot, personId: person.id, take: take.number })
  }
  return lineOf(take)
}

/** A take in full, as it crosses the wire. `line` saves a query where the caller has it. */
export async function takeWire(take: Take, line?: TakeLine): Promise<TakeWire> {
  return {
    ...(line ?? (await lineOf(take))),
    claim: take.claim,
    fps: take.fps,
    judgeVersion: take.judgeVersion,
    answer: take.answer,
    flags: await flagsOf(take.id),
    waivers: await waiversOf(take.id),
  }
}

async function lineOf(take: Take): Promise<TakeLine> {
  return (await takeLines(take.shotId)).find((line) => line.number === take.number) ?? notFound()
}

/** Notes on a take are written while it waits for a ruling, and not after. @throws 409 */
export async function requireUnruled(take: Take): Promise<void> {
  if (take.withdrawnAt) fail(409, `Take ${take.number} was taken back.`)
  if (await row<{ id: string }>('SELECT id FROM rulings WHERE take_id = :take', { take: take.id }))
    fail(409, `Take ${take.number} has been ruled on: its record stays as it was.`)
}

/** True when the judge's answer to this take holds that very finding. */
export function hasFinding(take: Take, name: FindingName): boolean {
  return take.answer.findings.some((finding) => sameFinding(finding, name))
}

interface NoteRow {
  id: string
  reason: string
  finding: string | null
  at: string
  personId: string
  personName: string
}

/** Flags that were not lifted, in the order of their frames. */
async function flagsOf(takeId: string): Promise<Flag[]> {
  const found = await rows<NoteRow & { fromFrame: number; toFrame: number }>(
    `SELECT flags.id, flags.from_frame AS fromFrame, flags.to_frame AS toFrame, flags.reason, flags.finding,
            flags.created_at AS at, people.id AS personId, people.name AS personName
       FROM flags JOIN people ON people.id = flags.person_id
      WHERE flags.take_id = :takeId AND flags.lifted_at IS NULL ORDER BY flags.from_frame, flags.created_at, flags.id`,
    { takeId },
  )
  return found.map(({ id, fromFrame, toFrame, reason, finding, at, personId, personName }) => ({
    id,
    fromFrame,
    toFrame,
    reason,
    finding: finding === null ? null : (JSON.parse(finding) as FindingName),
    by: someone(personId, personName),
    at,
  }))
}

/** Waivers that were not lifted, in the order they were given. */
async function waiversOf(takeId: string): Promise<Waiver[]> {
  const found = await rows<NoteRow & { finding: string }>(
    `SELECT waivers.id, waivers.reason, waivers.finding, waivers.created_at AS at, people.id AS personId, people.name AS personName
       FROM waivers JOIN people ON people.id = waivers.person_id
      WHERE waivers.take_id = :takeId AND waivers.lifted_at IS NULL ORDER BY waivers.created_at, waivers.id`,
    { takeId },
  )
  return found.map(({ id, finding, reason, at, personId, personName }) => ({
    id,
    finding: JSON.parse(finding) as FindingName,
    reason,
    by: someone(personId, personName),
    at,
  }))
}
