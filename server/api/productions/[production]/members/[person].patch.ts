import { changeMember } from '~/server/services/members'
import { route } from '~/server/utils/route'
import { memberChange, memberParams } from '~/utils/contracts/people'

/** Gives a member another role. */
export default route('PATCH /api/productions/:production/members/:person', {
  params: memberParams,
  body: memberChange,
  act: (ask) => changeMember(ask, ask.params.person, ask.body),
})
