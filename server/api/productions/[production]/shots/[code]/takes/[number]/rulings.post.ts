import { rule } from '~/server/services/rulings'
import { answerMade } from '~/server/utils/made'
import { route } from '~/server/utils/route'
import { newRuling, takeParams } from '~/utils/contracts/take'

/** Rules on a take: the ruling, its event and its letters are one transaction. */
export default route('POST /api/productions/:production/shots/:code/takes/:number/rulings', {
  params: takeParams,
  body: newRuling,
  act: async (ask) => answerMade(ask.event, await rule(ask, ask.body)),
})
