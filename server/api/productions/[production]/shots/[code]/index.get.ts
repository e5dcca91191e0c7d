import { shotPage } from '~/server/services/shotPage'
import { route } from '~/server/utils/route'
import { shotParams } from '~/utils/contracts/production'
import { shotQuery } from '~/utils/contracts/take'

/** All that the shot page shows, for one chosen take. */
export default route('GET /api/productions/:production/shots/:code', {
  params: shotParams,
  query: shotQuery,
  act: (ask) => shotPage(ask, ask.role, ask.query.take),
})
