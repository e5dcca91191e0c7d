import type { Flag, ShotPage } from '~/utils/contracts/take'
import type { Comment, Thread } from '~/utils/contracts/thread'

/** Adds a comment to its thread: once, whatever came first, and in the order of the numbers. Same threads where nothing changed. */
export function addComment(threads: Thread[], comment: Comment): Thread[] {
  const thread = threads.find(({ id }) => id === comment.thread)
  if (!thread || thread.comments.some(({ id }) => id === comment.id)) return threads
  const comments = [...thread.comments, comment].sort((a, b) => a.n - b.n)
  return threads.map((each) => (each === thread ? { ...thread, comments } : each))
}

/**
 * A page that was just fetched, beside the one on screen: comments that were heard of while it was under way stay, and an
 * answer that is older than what the screen shows already changes nothing.
 */
export function mergePage(shown: ShotPage | null, fetched: ShotPage): ShotPage {
  if (!shown || shown.code !== fetched.code || shown.production.slug !== fetched.production.slug) return fetched
  if (fetched.eventNumber < shown.eventNumber && shown.take?.number === fetched.take?.number) return shown
  const newer = shown.threads.flatMap(({ comments }) => comments).filter(({ n }) => n > fetched.eventNumber)
  return newer.length === 0 ? fetched : { ...fetched, threads: newer.reduce(addComment, fetched.threads) }
}

/** Does a flag or thread look at this frame? A thread without frames looks at the whole take. */
export const covers = (run: { fromFrame: number | null; toFrame: number | null }, frame: number): boolean =>
  run.fromFrame !== null && run.toFrame !== null && frame >= run.fromFrame && frame <= run.toFrame

export const flagged = (flags: readonly Flag[], thread: Thread): boolean =>
  flags.some(
    (flag) => thread.fromFrame !== null && thread.toFrame !== null && flag.fromFrame <= thread.toFrame && flag.toFrame >= thread.fromFrame,
  )

/** Threads for the margin: this take's and those of no take first, by frame, then the other takes'. */
export function inMarginOrder(threads: readonly Thread[], take: number | null): Thread[] {
  const elsewhere = (thread: Thread) => (thread.take !== null && thread.take !== take ? 1 : 0)
  return [...threads].sort(
    (a, b) =>
      elsewhere(a) - elsewhere(b) ||
      (b.take ?? take ?? 0) - (a.take ?? take ?? 0) ||
      (a.fromFrame ?? -Infinity) - (b.fromFrame ?? -Infinity) ||
      (a.at < b.at ? -1 : 1),
  )
}
