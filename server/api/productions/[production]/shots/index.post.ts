import { createShot } from '~/server/services/shots'
import { answerMade } from '~/server/utils/made'
import { route } from '~/server/utils/route'
import { newShot, productionParams } from '~/utils/contracts/production'

/** Puts a new shot on the wall. */
export default route('POST /api/productions/:production/shots', {
  params: productionParams,
  body: newShot,
  act: async (ask) => answerMade(ask.event, await createShot(ask, ask.body)),
})
