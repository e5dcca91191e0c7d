import { postTake } from '~/server/services/takes'
import { limitJudging } from '~/server/utils/limits'
import { answerMade } from '~/server/utils/made'
import { route } from '~/server/utils/route'
import { shotParams } from '~/utils/contracts/production'
import { newTake } from '~/utils/contracts/take'

/** Posts a spacing list; the answer holds what the judge says. */
export default route('POST /api/productions/:production/shots/:code/takes', {
  params: shotParams,
  body: newTake,
  act: async (ask) => {
    await limitJudging(ask.event, ask.body.keys)
    return answerMade(ask.event, await postTake(ask, ask.body))
  },
})
