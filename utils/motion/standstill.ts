import type { Law } from './types'

/** Whether a law's motion has a standstill in it, and so can be claimed to start from rest. Even spacing has none. */
export function canRest(law: Law): law is Exclude<Law, 'steady'> {
  return law !== 'steady'
}
