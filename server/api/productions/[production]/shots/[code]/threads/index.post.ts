import { openThread } from '~/server/services/threads'
import { limit } from '~/server/utils/limits'
import { answerMade } from '~/server/utils/made'
import { route } from '~/server/utils/route'
import { shotParams } from '~/utils/contracts/production'
import { newThread } from '~/utils/contracts/thread'

/** Opens a thread with its first comment. */
export default route('POST /api/productions/:production/shots/:code/threads', {
  params: shotParams,
  body: newThread,
  act: async (ask) => {
    await limit(ask.event, 'comment')
    return answerMade(ask.event, await openThread(ask, ask.body))
  },
})
