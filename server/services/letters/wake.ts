import { EventEmitter } from 'node:events'

/** Tells the worker that a letter was committed; nothing is lost when nobody listens, for the worker also looks by the clock. */
export const outbox = new EventEmitter<{ owed: [] }>()
