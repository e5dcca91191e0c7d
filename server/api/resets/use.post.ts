import { resetPassword } from '~/server/services/joining'
import { sessionAnswer } from '~/server/services/people'
import { limit } from '~/server/utils/limits'
import { route } from '~/server/utils/route'
import { resetUse } from '~/utils/contracts/people'

/** Chooses a new password by a link, and signs in. */
export default route('POST /api/resets/use', {
  body: resetUse,
  transaction: false,
  act: async ({ event, body }) => {
    await limit(event, 'link-use')
    return sessionAnswer(await resetPassword(event, body))
  },
})
