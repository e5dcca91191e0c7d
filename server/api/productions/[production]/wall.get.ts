import { wall } from '~/server/services/wall'
import { route } from '~/server/utils/route'
import { productionParams } from '~/utils/contracts/production'

/** All sheets in story order. */
export default route('GET /api/productions/:production/wall', {
  params: productionParams,
  act: ({ production }) => wall(production),
})
