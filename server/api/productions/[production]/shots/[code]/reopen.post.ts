import { reopen } from '~/server/services/rulings'
import { route } from '~/server/utils/route'
import { reopening, shotParams } from '~/utils/contracts/production'

/** Puts a settled shot back on the animator's desk. */
export default route('POST /api/productions/:production/shots/:code/reopen', {
  params: shotParams,
  body: reopening,
  act: (ask) => reopen(ask, ask.body),
})
