import { liftFlag } from '~/server/services/flags'
import { route } from '~/server/utils/route'
import { flagParams } from '~/utils/contracts/take'

/** Lifts a flag before the take is ruled on. */
export default route('DELETE /api/productions/:production/shots/:code/takes/:number/flags/:flag', {
  params: flagParams,
  act: (ask) => liftFlag(ask, ask.params.flag),
})
