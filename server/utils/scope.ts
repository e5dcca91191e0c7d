import { Membership, Production, Ruling, Shot, Take, Thread } from '~/server/models'
import type { Facts, Role } from '~/utils/permissions'
import { row } from '~/server/models/database'
import { notFound } from './fail'
import type { Asker } from './session'

/** The things that a request's address names, as far as the asking person may know of them. */
export interface Scope {
  production?: Production
  role?: Role
  shot?: Shot
  take?: Take
  thread?: Thread
}
interface Named {
  production?: string
  code?: string
  number?: number
  thread?: string
}

/**
 * Loads what the address names. @throws 404 for whatever is not there, and for every production that the person
 * is no member of: they learn not even that it exists.
 */
export async function loadScope(person: Asker, named: Named): Promise<Scope> {
  if (named.production === undefined) return {}
  const production = await Production.findOne({ where: { slug: named.production } })
  const membership =
    production && (await Membership.findOne({ where: { productionId: production.id, personId: person.id } }))
  if (!production || !membership) return notFound()
  const scope: Scope = { production, role: membership.role }
  if (named.code === undefined) return scope
  scope.shot = (await Shot.findOne({ where: { productionId: production.id, code: named.code } })) ?? notFound()
  if (named.number !== undefined)
    scope.take = (await Take.findOne({ where: { shotId: scope.shot.id, number: named.number } })) ?? notFound()
  if (named.thread !== undefined)
    scope.thread = (await Thread.findOne({ where: { shotId: scope.shot.id, id: named.thread } })) ?? notFound()
  return scope
}

/** What the table of permissions wants to know about the things in scope. */
export async function factsOf(person: Asker, { shot, take, thread }: Scope): Promise<Facts> {
  if (!shot) return {}
  const ruled = await row<{ n: number }>(
    'SELECT count(*) AS n FROM rulings JOIN takes ON takes.id = rulings.take_id WHERE takes.shot_id = :shot',
    { shot: shot.id },
  )
  return {
    ownShot: shot.animatorId === person.id,
    ownTake: take?.personId === person.id,
    ownThread: thread?.personId === person.id,
    takeRuled: take ? (await Ruling.count({ where: { takeId: take.id } })) > 0 : false,
    shotRuled: (ruled?.n ?? 0) > 0,
  }
}
