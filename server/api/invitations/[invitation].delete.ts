import { withdrawLink } from '~/server/services/links'
import { notFound } from '~/server/utils/fail'
import { log } from '~/server/utils/log'
import { route } from '~/server/utils/route'
import { invitationParams } from '~/utils/contracts/people'

/** Withdraws a link that has not been used. */
export default route('DELETE /api/invitations/:invitation', {
  params: invitationParams,
  act: async ({ params, person }) => {
    if (!(await withdrawLink(params.invitation))) notFound()
    log.info('link withdrawn', { by: person.id, invitation: params.invitation })
    return { withdrawn: params.invitation }
  },
})
