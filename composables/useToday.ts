import type { Day } from '~/utils/contracts/common'

/** Today in UTC as `YYYY-MM-DD`: read once, on the server, so that both paints of a page agree. */
export function useToday() {
  return useState<Day>('today', () => new Date().toISOString().slice(0, 10))
}
