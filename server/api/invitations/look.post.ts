import { findLink } from '~/server/services/links'
import { limit } from '~/server/utils/limits'
import { route } from '~/server/utils/route'
import { linkLook } from '~/utils/contracts/people'
import type { LinkAnswer } from '~/utils/contracts/people'

/** Whom a link is for. A POST, so that its secret stands in no address. */
export default route('POST /api/invitations/look', {
  body: linkLook,
  transaction: false,
  act: async ({ event, body }): Promise<LinkAnswer> => {
    await limit(event, 'link-look')
    const { kind, email, name } = await findLink(body.token)
    return { kind, email, name }
  },
})
