import type { Law } from './types'

const RESTING = ['odd-rule', 'topple', 'over-edge', 'pendulum', 'swing-decay', 'bounce'] as const
export type RestingLaw = (typeof RESTING)[number]

/** Whether a law's motion has a standstill in it, and so can be claimed to start from rest. Even spacing has none. */
export function canRest(law: Law): law is RestingLaw {
  return (RESTING as readonly Law[]).includes(law)
}
