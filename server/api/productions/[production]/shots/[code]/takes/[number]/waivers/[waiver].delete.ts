import { liftWaiver } from '~/server/services/waivers'
import { route } from '~/server/utils/route'
import { waiverParams } from '~/utils/contracts/take'

/** Lifts a waiver before the take is ruled on. */
export default route('DELETE /api/productions/:production/shots/:code/takes/:number/waivers/:waiver', {
  params: waiverParams,
  act: (ask) => liftWaiver(ask, ask.params.waiver),
})
