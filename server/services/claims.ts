import type { z } from 'zod'
import type { claimChange } from '~/utils/contracts/production'
import type { ShotFacts } from '~/utils/contracts/take'
import { appendEvent } from './events'
import { requireFresh, shotFacts } from './shots'
import type { OnShot } from './wire'

/** Sets what the shot says it shows. Takes posted before keep the claim they were judged by. */
export async function setClaim({ production, shot, person }: OnShot, body: z.infer<typeof claimChange>): Promise<ShotFacts> {
  await requireFresh(shot, body.version)
  await shot.update({ claim: body.claim, version: shot.version + 1 })
  await appendEvent(production, { kind: 'claim', shot, personId: person.id })
  return shotFacts(shot)
}
