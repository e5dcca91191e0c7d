import { openLinks } from '~/server/services/links'
import { route } from '~/server/utils/route'

/** The links that still work: invitations and new passwords. Never their secrets. */
export default route('GET /api/invitations', { act: () => openLinks() })
