import { membershipsOf } from '~/server/services/people'
import { route } from '~/server/utils/route'

/** The productions one is a member of, with one's role in each. */
export default route('GET /api/productions', { act: ({ person }) => membershipsOf(person.id) })
