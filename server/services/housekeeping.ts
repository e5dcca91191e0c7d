import { run, write } from '~/server/models/database'
import { ABSOLUTE_DAYS, DAY, IDLE_DAYS } from '~/server/utils/sessionAge'

/** How long a session that is over is kept: long enough to answer "who was signed in then?". */
const KEPT_DAYS = 30

/**
 * Clears sessions that have been over for a month, whether ended, idle or old. Everybody's newest one stays: it says when they were last
 * here. @param now milliseconds since 1970 @returns how many were cleared
 */
export function clearOldSessions(now: number): Promise<number> {
  const before = (days: number) => new Date(now - days * DAY).toISOString()
  return write(() =>
    run(
      `DELETE FROM sessions
        WHERE (ended_at < :ended OR seen_at < :idle OR created_at < :old)
          AND EXISTS (SELECT 1 FROM sessions AS newer WHERE newer.person_id = sessions.person_id AND newer.seen_at > sessions.seen_at)`,
      { ended: before(KEPT_DAYS), idle: before(IDLE_DAYS + KEPT_DAYS), old: before(ABSOLUTE_DAYS + KEPT_DAYS) },
    ),
  )
}
