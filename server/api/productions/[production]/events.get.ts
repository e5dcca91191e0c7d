import { eventsAfter } from '~/server/services/record'
import { route } from '~/server/utils/route'
import { eventsQuery, productionParams } from '~/utils/contracts/production'

/** Everything after number n: how a client catches up. */
export default route('GET /api/productions/:production/events', {
  params: productionParams,
  query: eventsQuery,
  act: ({ production, query }) => eventsAfter(production, query.after),
})
