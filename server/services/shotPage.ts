import { Take } from '~/server/models'
import { row } from '~/server/models/database'
import { notFound } from '~/server/utils/fail'
import type { ShotPage, TakeLine } from '~/utils/contracts/take'
import { deskOf } from '~/utils/desk'
import { may } from '~/utils/permissions'
import type { Role } from '~/utils/permissions'
import { postings, takeLines } from './history'
import { rulingReaders } from './letters'
import { shotFacts } from './shots'
import { takeWire } from './takes'
import { threadsOf } from './threads'
import type { OnShot } from './wire'

/**
 * All that the shot page shows, with the take that was asked for or the newest standing one. @throws 404 for a take
 * that never was. The event number is read first: what changes meanwhile comes again as an event.
 */
export async function shotPage({ production, shot, person }: OnShot, role: Role, asked?: number): Promise<ShotPage> {
  const newestEvent = await row<{ n: number }>('SELECT event_number AS n FROM productions WHERE id = :id', { id: production.id })
  const lines = await takeLines(shot.id)
  const newest = deskOf(shot.createdAt, postings(lines)).newest
  const number = asked ?? newest
  const line = lines.find((one) => one.number === number)
  if (asked !== undefined && !line) notFound()
  const take = line ? await Take.findOne({ where: { shotId: shot.id, number: line.number } }) : null

  const mayRule = take !== null && line?.number === newest && awaits(line) && may(role, 'take.rule', { ownTake: take.personId === person.id })
  return {
    ...(await shotFacts(shot, lines)),
    production: { slug: production.slug, title: production.title },
    takes: lines,
    take: take && line ? await takeWire(take, line) : null,
    threads: await threadsOf(shot.id),
    letterCount: mayRule ? (await rulingReaders(take, person.id)).length : 0,
    eventNumber: newestEvent?.n ?? 0,
  }
}

const awaits = (line: TakeLine | undefined) => line !== undefined && line.ruling === null && line.withdrawnAt === null
