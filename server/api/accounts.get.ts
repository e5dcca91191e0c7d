import { allAccounts } from '~/server/services/accounts'
import { route } from '~/server/utils/route'

/** Everybody with an account, and everybody who was named as a member. */
export default route('GET /api/accounts', { act: ({ person }) => allAccounts(person.id) })
