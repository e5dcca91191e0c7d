import { showLetter } from '~/server/services/letters/mailRoom'
import { route } from '~/server/utils/route'
import { letterParams } from '~/utils/contracts/letter'

/** One letter as it looks, a one-use link excepted. */
export default route('GET /api/letters/:letter', {
  params: letterParams,
  act: ({ params }) => showLetter(params.letter),
})
