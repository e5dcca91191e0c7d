import { notFound } from '~/server/utils/fail'
import { log } from '~/server/utils/log'
import { route } from '~/server/utils/route'
import { closeSession, endOneSession } from '~/server/utils/session'
import { sessionParams } from '~/utils/contracts/people'

/** Ends one of one's own sessions; anybody else's is not there. */
export default route('DELETE /api/me/sessions/:session', {
  params: sessionParams,
  act: async ({ event, params, person }) => {
    if (!(await endOneSession(params.session, person.id))) notFound()
    if (params.session === person.sessionId) await closeSession(event)
    log.info('session ended', { person: person.id, session: params.session })
    return { ended: params.session }
  },
})
