import { membersOf } from '~/server/services/members'
import { route } from '~/server/utils/route'
import { productionParams } from '~/utils/contracts/production'

/** Everybody of the production; addresses only for those who manage the members. */
export default route('GET /api/productions/:production/members', {
  params: productionParams,
  act: ({ production, role }) => membersOf(production, role),
})
