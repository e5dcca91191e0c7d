import { row } from '~/server/models/database'
import { route } from '~/server/utils/route'

/** Says that the house is open: the database answers. */
export default route('GET /api/health', {
  act: async () => ({ open: (await row<{ one: number }>('SELECT 1 AS one'))?.one === 1 }),
})
