import { changeShot } from '~/server/services/shots'
import { route } from '~/server/utils/route'
import { shotChange, shotParams } from '~/utils/contracts/production'

/** Changes what the shot form holds: title, place, frames, brief, due date, people. */
export default route('PATCH /api/productions/:production/shots/:code', {
  params: shotParams,
  body: shotChange,
  act: (ask) => changeShot(ask, ask.body),
})
