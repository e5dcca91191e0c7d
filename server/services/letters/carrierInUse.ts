import { useRuntimeConfig } from '#imports'
import { settings } from '~/server/utils/settings'
import { carrierFor } from './carriers'
import type { Carrier } from './carriers'
import { paceOf } from './pace'
import type { Pace } from './pace'

let inUse: Carrier | null = null

/** The pace that this installation's mail worker keeps. */
export const pace = (): Pace => paceOf(Number(useRuntimeConfig().mailPaceSeconds))

/** Where this installation's letters go. */
export function carrier(): Carrier {
  const { mailUrl, dataDir } = settings()
  return (inUse ??= carrierFor(mailUrl, dataDir, pace()))
}
