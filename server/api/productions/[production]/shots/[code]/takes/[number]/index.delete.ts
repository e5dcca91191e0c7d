import { takeBack } from '~/server/services/takes'
import { route } from '~/server/utils/route'
import { takeParams } from '~/utils/contracts/take'

/** Takes one's own take back before it is ruled on. */
export default route('DELETE /api/productions/:production/shots/:code/takes/:number', {
  params: takeParams,
  act: (ask) => takeBack(ask),
})
