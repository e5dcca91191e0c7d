import { createSequence } from '~/server/services/sequences'
import { route } from '~/server/utils/route'
import { newSequence, productionParams } from '~/utils/contracts/production'

/** Adds a sequence at the end of the story. */
export default route('POST /api/productions/:production/sequences', {
  params: productionParams,
  body: newSequence,
  status: 201,
  act: (ask) => createSequence(ask, ask.body),
})
