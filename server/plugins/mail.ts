import { defineNitroPlugin, useRuntimeConfig } from '#imports'
import { carrierFor } from '~/server/services/letters/carriers'
import { deliver } from '~/server/services/letters/deliver'
import { paceOf } from '~/server/services/letters/pace'
import { outbox } from '~/server/services/letters/wake'
import { startMailWorker } from '~/server/services/letters/worker'
import type { MailWorker } from '~/server/services/letters/worker'
import { log } from '~/server/utils/log'
import { ready } from '~/server/utils/ready'
import { settings } from '~/server/utils/settings'

/** The mail worker: woken by every commit that owes a letter, and by the clock. */
export default defineNitroPlugin((nitro) => {
  let worker: MailWorker | null = null
  let closing = false

  async function begin(): Promise<void> {
    await ready()
    if (closing) return
    const { mailUrl, mailFrom, baseUrl, dataDir, sessionSecret } = settings()
    const pace = paceOf(Number(useRuntimeConfig().mailPaceSeconds))
    const carrier = carrierFor(mailUrl, dataDir, pace)
    worker = startMailWorker(pace, (letter, signal) => deliver(letter, { carrier, from: mailFrom, baseUrl, sessionSecret, signal }))
    outbox.on('owed', worker.wake)
    log.info('mail worker started', { place: carrier.place })
  }

  begin().catch((problem: unknown) => log.error('mail worker did not start', { problem: String(problem) }))
  nitro.hooks.hook('close', async () => {
    closing = true
    await worker?.stop()
  })
})
