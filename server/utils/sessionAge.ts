/** A session ends by itself after this long unused, and after this long in all: security.md 7.3.1, 7.3.2. */
export const IDLE_DAYS = 14
export const ABSOLUTE_DAYS = 30
export const DAY = 24 * 60 * 60 * 1000

/** Has a session run out by itself? @param now milliseconds since 1970 */
export function isOver(session: { createdAt: string; seenAt: string }, now: number): boolean {
  return now - Date.parse(session.seenAt) > IDLE_DAYS * DAY || now - Date.parse(session.createdAt) > ABSOLUTE_DAYS * DAY
}
