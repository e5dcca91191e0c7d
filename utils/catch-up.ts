import type { EventsAnswer, ProductionEvent } from './contracts/event'

interface Ports {
  /** Number of the newest event that is already known. */
  after: number
  /** Events after a number, oldest first; `more` while there are further ones. */
  fetchAfter: (n: number) => Promise<EventsAnswer>
  /** Hears every event once, in order. */
  deliver: (event: ProductionEvent) => void
}

/**
 * Keeps one reader of a production up to date: whatever it is told, and however often, it asks for everything after
 * its last number and hands each event on once, in order. One question is under way at a time. Knows no framework, so
 * that pages and tests run the same.
 */
export class CatchUp {
  #after: number
  #heard = 0
  #again = false
  #stopped = false
  #running: Promise<void> | null = null

  constructor(private readonly ports: Ports) {
    this.#after = ports.after
  }

  /** Number of the newest event that was handed on. */
  get after(): number {
    return this.#after
  }

  /** Somebody says that event `n` exists. @throws as `run` does */
  hear(n: number): Promise<void> {
    this.#heard = Math.max(this.#heard, n)
    if (n <= this.#after) return this.#running ?? Promise.resolve()
    return this.#running ?? this.#start()
  }

  /**
   * Asks for what is new; resolves when everything is here that was there at the time of the call.
   * @throws what `fetchAfter` throws; nothing is lost, the next call goes on from the same number.
   */
  run(): Promise<void> {
    if (!this.#running) return this.#start()
    // The question under way may have been answered before the reason to ask again arose.
    this.#again = true
    return this.#running
  }

  /** Hands nothing on any more, not even what is under way. */
  stop(): void {
    this.#stopped = true
  }

  #start(): Promise<void> {
    this.#running = this.#ask()
    return this.#running
  }

  async #ask(): Promise<void> {
    // From here on `#running` is set, so that a port which throws at once is cleared away like any other.
    await Promise.resolve()
    try {
      while (await this.#askOnce());
    } finally {
      this.#running = null
    }
  }

  /** @returns true when there is reason to ask once more. */
  async #askOnce(): Promise<boolean> {
    this.#again = false
    const heardBefore = this.#heard
    const before = this.#after
    const { events, more } = await this.ports.fetchAfter(before)
    for (const event of events) this.#take(event)
    if (this.#stopped) return false
    const cameOn = this.#after > before
    const missing = this.#heard > this.#after
    // Without progress and without fresh word the answer would be the same again.
    return this.#again || (more && cameOn) || (missing && (cameOn || this.#heard > heardBefore))
  }

  #take(event: ProductionEvent): void {
    if (this.#stopped || event.n <= this.#after) return
    // First the number: a reader that fails over an event must not be given it again and again.
    this.#after = event.n
    try {
      this.ports.deliver(event)
    } catch (problem) {
      console.error(`Event ${event.n} could not be shown:`, problem)
    }
  }
}
