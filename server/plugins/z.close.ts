import { defineNitroPlugin } from '#imports'
import { closeDatabase } from '~/server/models/database'

/** Closes the database last. Hooks run in the order of the plugins' names, and the mail worker still marks the letter in its hand. */
export default defineNitroPlugin((nitro) => {
  nitro.hooks.hook('close', closeDatabase)
})
