import { endAccountSessions } from '~/server/services/accounts'
import { route } from '~/server/utils/route'
import { personParams } from '~/utils/contracts/people'

/** Ends all of somebody's sessions. */
export default route('DELETE /api/accounts/:person/sessions', {
  params: personParams,
  act: async ({ person, params }) => ({ ended: await endAccountSessions(person.id, params.person) }),
})
