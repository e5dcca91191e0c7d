/** A socket may send this many events at once, and this many a second in the long run. */
export const BURST = 20
export const PER_SECOND = 5

/** How many events a socket may still send: fills up with time, each event takes one. */
export class Allowance {
  #left = BURST
  #at: number

  /** `now` answers milliseconds that never go back. */
  constructor(private readonly now: () => number = () => performance.now()) {
    this.#at = now()
  }

  /** False when there is nothing left to take. */
  take(): boolean {
    const at = this.now()
    this.#left = Math.min(BURST, this.#left + ((at - this.#at) / 1000) * PER_SECOND)
    this.#at = at
    if (this.#left < 1) return false
    this.#left -= 1
    return true
  }
}
