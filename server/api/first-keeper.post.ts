import { makeFirstKeeper } from '~/server/services/joining'
import { sessionAnswer } from '~/server/services/people'
import { limit } from '~/server/utils/limits'
import { route } from '~/server/utils/route'
import { firstKeeper } from '~/utils/contracts/people'

/** Makes the first keeper of an installation that has none, and signs them in. */
export default route('POST /api/first-keeper', {
  body: firstKeeper,
  status: 201,
  transaction: false,
  act: async ({ event, body }) => {
    await limit(event, 'first-keeper')
    return sessionAnswer(await makeFirstKeeper(event, body))
  },
})
