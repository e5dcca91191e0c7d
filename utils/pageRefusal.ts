import { createError } from '#imports'

/**
 * What a page throws where it has nothing to show. Fatal in the browser, so that the error page takes over; on the server every thrown
 * error does, and a fatal one would be logged with its stack as if something had broken.
 */
export const pageRefusal = (statusCode = 404, message = 'There is nothing here.') =>
  createError({ statusCode, message, fatal: import.meta.client })
