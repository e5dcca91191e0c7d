import { defineNitroPlugin } from '#imports'
import { carrier, pace } from '~/server/services/letters/carrierInUse'
import { deliver } from '~/server/services/letters/deliver'
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
    const { mailFrom, baseUrl, sessionSecret } = settings()
    const means = { carrier: carrier(), from: mailFrom, baseUrl, sessionSecret }
    worker = startMailWorker(pace(), (letter, signal) => deliver(letter, { ...means, signal }))
    outbox.on('owed', worker.wake)
    log.info('mail worker started', { place: means.carrier.place })
  }

  begin().catch((problem: unknown) => log.error('mail worker did not start', { problem: String(problem) }))
  nitro.hooks.hook('close', async () => {
    closing = true
    await worker?.stop()
  })
})
