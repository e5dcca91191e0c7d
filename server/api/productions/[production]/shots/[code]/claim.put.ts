import { setClaim } from '~/server/services/claims'
import { route } from '~/server/utils/route'
import { claimChange, shotParams } from '~/utils/contracts/production'

/** Sets what the shot says it shows. */
export default route('PUT /api/productions/:production/shots/:code/claim', {
  params: shotParams,
  body: claimChange,
  act: (ask) => setClaim(ask, ask.body),
})
