import { acceptInvitation } from '~/server/services/joining'
import { sessionAnswer } from '~/server/services/people'
import { limit } from '~/server/utils/limits'
import { route } from '~/server/utils/route'
import { invitationAccept } from '~/utils/contracts/people'

/** Accepts an invitation: an account with the password chosen here, and a session. */
export default route('POST /api/invitations/accept', {
  body: invitationAccept,
  status: 201,
  transaction: false,
  act: async ({ event, body }) => {
    await limit(event, 'link-use')
    return sessionAnswer(await acceptInvitation(event, body))
  },
})
