import { aboutProduction } from '~/server/services/about'
import { route } from '~/server/utils/route'
import { productionParams } from '~/utils/contracts/production'

/** The production's sequences and people. */
export default route('GET /api/productions/:production', {
  params: productionParams,
  act: ({ production, role }) => aboutProduction(production, role),
})
