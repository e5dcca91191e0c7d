import { changeSequence } from '~/server/services/sequences'
import { route } from '~/server/utils/route'
import { sequenceChange, sequenceParams } from '~/utils/contracts/production'

/** Another title, or another place in the story. */
export default route('PATCH /api/productions/:production/sequences/:sequence', {
  params: sequenceParams,
  body: sequenceChange,
  act: (ask) => changeSequence(ask, ask.params.sequence, ask.body),
})
