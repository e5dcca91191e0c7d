import type { Production } from '~/server/models'
import type { Production as ProductionWire } from '~/utils/contracts/production'
import type { Role } from '~/utils/permissions'
import { membersOf } from './members'
import { sequencesOf } from './wall'

/** What every screen of a production needs to know: its sequences, and who is who. */
export async function aboutProduction(production: Production, role: Role): Promise<ProductionWire> {
  const members = await membersOf(production, role)
  return {
    slug: production.slug,
    title: production.title,
    role,
    sequences: await sequencesOf(production.id),
    // Somebody whose account is disabled can't be given anything to do.
    members: members.filter(({ disabled }) => !disabled).map(({ id, name, role: theirs }) => ({ id, name, role: theirs })),
  }
}
