import { makeAccountReset } from '~/server/services/accounts'
import { limit } from '~/server/utils/limits'
import { route } from '~/server/utils/route'
import { personParams } from '~/utils/contracts/people'

/** A link to choose a new password with. The answer is the only time that the keeper sees it. */
export default route('POST /api/accounts/:person/reset', {
  params: personParams,
  status: 201,
  act: async ({ event, person, params }) => {
    await limit(event, 'invite')
    return makeAccountReset(person.id, params.person)
  },
})
