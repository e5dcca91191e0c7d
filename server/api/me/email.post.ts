import { changeEmail } from '~/server/services/profile'
import { route } from '~/server/utils/route'
import { emailChange } from '~/utils/contracts/people'

/** One's own address, with the current password. */
export default route('POST /api/me/email', {
  body: emailChange,
  transaction: false,
  act: ({ event, person, body }) => changeEmail(event, person, body),
})
