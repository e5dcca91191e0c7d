import { sendAgain } from '~/server/services/letters/mailRoom'
import { log } from '~/server/utils/log'
import { route } from '~/server/utils/route'
import { letterParams } from '~/utils/contracts/letter'

/** Puts a letter back into the outbox, due now. */
export default route('POST /api/letters/:letter/send', {
  params: letterParams,
  act: async ({ params, person }) => {
    const letter = await sendAgain(params.letter)
    log.info('letter sent again', { letter: letter.id, keeper: person.id })
    return letter
  },
})
