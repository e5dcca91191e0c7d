import { sessionAnswer } from '~/server/services/people'
import { signIn } from '~/server/services/signIn'
import { route } from '~/server/utils/route'
import { signIn as signInBody } from '~/utils/contracts/people'

/** Signs in. The session id is new, whatever the browser came with. */
export default route('POST /api/session', {
  body: signInBody,
  transaction: false,
  act: async ({ event, body }) => sessionAnswer(await signIn(event, body.email, body.password)),
})
