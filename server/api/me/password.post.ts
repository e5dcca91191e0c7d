import { changePassword } from '~/server/services/profile'
import { route } from '~/server/utils/route'
import { passwordChange } from '~/utils/contracts/people'

/** One's own password, with the current one; other sessions end with it unless told otherwise. */
export default route('POST /api/me/password', {
  body: passwordChange,
  transaction: false,
  act: ({ event, person, body }) => changePassword(event, person, body),
})
