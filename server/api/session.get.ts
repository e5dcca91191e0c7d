import { sessionAnswer } from '~/server/services/people'
import { route } from '~/server/utils/route'

/** Who is signed in, and what kind of installation this is. */
export default route('GET /api/session', {
  act: ({ visitor }) => sessionAnswer(visitor?.id ?? null),
})
