import { takeWire } from '~/server/services/takes'
import { route } from '~/server/utils/route'
import { takeParams } from '~/utils/contracts/take'

/** One take in full. */
export default route('GET /api/productions/:production/shots/:code/takes/:number', {
  params: takeParams,
  act: ({ take }) => takeWire(take),
})
