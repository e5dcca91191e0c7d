import { addComment } from '~/server/services/threads'
import { limit } from '~/server/utils/limits'
import { answerMade } from '~/server/utils/made'
import { route } from '~/server/utils/route'
import { newComment, threadParams } from '~/utils/contracts/thread'

/** Answers in a thread. */
export default route('POST /api/productions/:production/shots/:code/threads/:thread/comments', {
  params: threadParams,
  body: newComment,
  act: async (ask) => {
    await limit(ask.event, 'comment')
    return answerMade(ask.event, await addComment(ask, ask.body))
  },
})
