import { sessionAnswer } from '~/server/services/people'
import { log } from '~/server/utils/log'
import { route } from '~/server/utils/route'
import { closeSession } from '~/server/utils/session'

/** Signs out: the session ends on the server, so that a copy of its cookie is worth nothing. */
export default route('DELETE /api/session', {
  act: async ({ event, visitor }) => {
    await closeSession(event)
    if (visitor) log.info('signed out', { person: visitor.id })
    return sessionAnswer(null)
  },
})
