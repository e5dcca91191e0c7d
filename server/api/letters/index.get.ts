import { carrier } from '~/server/services/letters/carrierInUse'
import { listLetters } from '~/server/services/letters/mailRoom'
import { route } from '~/server/utils/route'
import { lettersQuery } from '~/utils/contracts/letter'

/** Every letter sent or still owed, newest first. */
export default route('GET /api/letters', {
  query: lettersQuery,
  act: ({ query }) => listLetters(query, carrier().place),
})
