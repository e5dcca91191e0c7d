import { limitJudging } from '~/server/utils/limits'
import { route } from '~/server/utils/route'
import { checkRequest } from '~/utils/contracts/check'
import { judge } from '~/utils/motion'

/** The judge's answer to a list, with nothing stored. */
export default route('POST /api/check', {
  body: checkRequest,
  transaction: false,
  act: async ({ event, body }) => {
    await limitJudging(event, body.keys)
    return judge(body)
  },
})
