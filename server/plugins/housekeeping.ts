import { defineNitroPlugin } from '#imports'
import { clearOldSessions } from '~/server/services/housekeeping'
import { log } from '~/server/utils/log'
import { ready } from '~/server/utils/ready'
import { DAY } from '~/server/utils/sessionAge'

/** Once at the start and then every day, what nobody will ask for again is put away. */
export default defineNitroPlugin((nitro) => {
  async function tidy(): Promise<void> {
    await ready()
    const cleared = await clearOldSessions(Date.now())
    if (cleared > 0) log.info('old sessions cleared', { cleared })
  }
  const tidyOrSay = () => void tidy().catch((problem: unknown) => log.error('housekeeping failed', { problem: String(problem) }))
  tidyOrSay()
  const daily = setInterval(tidyOrSay, DAY)
  daily.unref()
  nitro.hooks.hook('close', () => clearInterval(daily))
})
