import { v7 as uuid } from 'uuid'
import { Membership, Production } from '~/server/models'
import { afterCommit } from '~/server/models/database'
import { invalid } from '~/server/utils/fail'
import { log } from '~/server/utils/log'
import type { Membership as Member } from '~/utils/contracts/people'
import { appendEvent } from './events'
import { news } from './news'

/** Makes a production. Somebody has to let the others in: its maker, as supervisor. Inside `write`. @throws 422 for a taken name */
export async function makeProduction(keeperId: string, { slug, title }: { slug: string; title: string }): Promise<Member> {
  if (await Production.findOne({ where: { slug } })) invalid('slug', 'This short name is taken.')
  const createdAt = new Date().toISOString()
  const production = await Production.create({ id: uuid(), slug, title, createdAt })
  await Membership.create({ productionId: production.id, personId: keeperId, role: 'supervisor', createdAt })
  await appendEvent(production, { kind: 'member', personId: keeperId })
  afterCommit(() => news.emit('membership', { production: slug, personId: keeperId, role: 'supervisor' }))
  log.info('production made', { by: keeperId, production: slug })
  return { production: slug, title, role: 'supervisor' }
}
