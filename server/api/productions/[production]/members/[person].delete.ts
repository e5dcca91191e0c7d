import { removeMember } from '~/server/services/members'
import { route } from '~/server/utils/route'
import { memberParams } from '~/utils/contracts/people'

/** Takes a member out of the production. */
export default route('DELETE /api/productions/:production/members/:person', {
  params: memberParams,
  act: (ask) => removeMember(ask, ask.params.person),
})
