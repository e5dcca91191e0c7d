import { addComment } from '~/server/services/threads'
import { answerMade } from '~/server/utils/made'
import { route } from '~/server/utils/route'
import { newComment, threadParams } from '~/utils/contracts/thread'

/** Answers in a thread. */
export default route('POST /api/productions/:production/shots/:code/threads/:thread/comments', {
  params: threadParams,
  body: newComment,
  act: async (ask) => answerMade(ask.event, await addComment(ask, ask.body)),
})
