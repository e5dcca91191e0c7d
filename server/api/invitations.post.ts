import { invite } from '~/server/services/joining'
import { limit } from '~/server/utils/limits'
import { route } from '~/server/utils/route'
import { invitation } from '~/utils/contracts/people'

/** Invites somebody. The answer is the only time that the keeper sees the link. */
export default route('POST /api/invitations', {
  body: invitation,
  status: 201,
  act: async ({ event, body, person }) => {
    await limit(event, 'invite')
    return invite(person.id, body)
  },
})
