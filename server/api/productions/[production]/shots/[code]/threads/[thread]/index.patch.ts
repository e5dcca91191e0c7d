import { settleThread } from '~/server/services/threads'
import { route } from '~/server/utils/route'
import { threadChange, threadParams } from '~/utils/contracts/thread'

/** Settles a thread, or opens it again. */
export default route('PATCH /api/productions/:production/shots/:code/threads/:thread', {
  params: threadParams,
  body: threadChange,
  act: (ask) => settleThread(ask, ask.body),
})
