import { changeProfile } from '~/server/services/profile'
import { route } from '~/server/utils/route'
import { profileChange } from '~/utils/contracts/people'

/** One's own name, and which letters one gets. */
export default route('PATCH /api/me', {
  body: profileChange,
  act: ({ person, body }) => changeProfile(person.id, body),
})
