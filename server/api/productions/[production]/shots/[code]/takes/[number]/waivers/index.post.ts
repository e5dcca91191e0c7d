import { waive } from '~/server/services/waivers'
import { answerMade } from '~/server/utils/made'
import { route } from '~/server/utils/route'
import { newWaiver, takeParams } from '~/utils/contracts/take'

/** Lets one finding pass, with the reason. */
export default route('POST /api/productions/:production/shots/:code/takes/:number/waivers', {
  params: takeParams,
  body: newWaiver,
  act: async (ask) => answerMade(ask.event, await waive(ask, ask.body)),
})
