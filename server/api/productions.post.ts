import { makeProduction } from '~/server/services/newProduction'
import { route } from '~/server/utils/route'
import { newProduction } from '~/utils/contracts/people'

/** Makes a production; its maker is its first supervisor. */
export default route('POST /api/productions', {
  body: newProduction,
  status: 201,
  act: ({ person, body }) => makeProduction(person.id, body),
})
