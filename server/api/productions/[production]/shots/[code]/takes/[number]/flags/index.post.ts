import { putFlag } from '~/server/services/flags'
import { answerMade } from '~/server/utils/made'
import { route } from '~/server/utils/route'
import { newFlag, takeParams } from '~/utils/contracts/take'

/** Flags a run of frames, with the reason. */
export default route('POST /api/productions/:production/shots/:code/takes/:number/flags', {
  params: takeParams,
  body: newFlag,
  act: async (ask) => answerMade(ask.event, await putFlag(ask, ask.body)),
})
