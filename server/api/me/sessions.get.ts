import { ownSessions } from '~/server/services/profile'
import { route } from '~/server/utils/route'

/** Where one is signed in. */
export default route('GET /api/me/sessions', { act: ({ person }) => ownSessions(person) })
