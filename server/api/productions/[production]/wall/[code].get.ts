import { sheet } from '~/server/services/wall'
import { route } from '~/server/utils/route'
import { shotParams } from '~/utils/contracts/production'

/** One sheet, for a wall that heard of a change. */
export default route('GET /api/productions/:production/wall/:code', {
  params: shotParams,
  act: ({ production, params }) => sheet(production, params.code),
})
