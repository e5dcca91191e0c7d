import { addMember } from '~/server/services/members'
import { route } from '~/server/utils/route'
import { newMember } from '~/utils/contracts/people'
import { productionParams } from '~/utils/contracts/production'

/** Adds somebody who has an account. */
export default route('POST /api/productions/:production/members', {
  params: productionParams,
  body: newMember,
  status: 201,
  act: (ask) => addMember(ask, ask.body),
})
