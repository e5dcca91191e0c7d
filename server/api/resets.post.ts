import { askForReset } from '~/server/services/links'
import { limit } from '~/server/utils/limits'
import { route } from '~/server/utils/route'
import { resetRequest } from '~/utils/contracts/people'

/** Asks for a link to choose a new password with. Answers alike, whether the address has an account or not. */
export default route('POST /api/resets', {
  body: resetRequest,
  status: 202,
  transaction: false,
  act: async ({ event, body }) => {
    await limit(event, 'reset-ask')
    await askForReset(body.email)
    return { asked: true }
  },
})
