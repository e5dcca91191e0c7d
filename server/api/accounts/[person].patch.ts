import { changeAccount } from '~/server/services/accounts'
import { route } from '~/server/utils/route'
import { accountChange, personParams } from '~/utils/contracts/people'

/** Closes or opens an account, makes a keeper or a keeper no longer. */
export default route('PATCH /api/accounts/:person', {
  params: personParams,
  body: accountChange,
  act: ({ person, params, body }) => changeAccount(person.id, params.person, body),
})
