import { v7 as uuid } from 'uuid'
import { onTestFinished } from 'vitest'
import { CatchUp } from '~/utils/catch-up'
import type { EventsAnswer, ProductionEvent } from '~/utils/contracts/event'
import type { Comment, Thread } from '~/utils/contracts/thread'
import type { Person } from './house'
import { Line, pause } from './line'
import type { Transport } from './line'

interface Place {
  production: string
  shot: string
}

/**
 * A colleague in front of a page: a socket that comes back by itself, catching up by number with the page's own code,
 * and comments that are sent until they are answered for, always under the same id.
 */
export class Reader {
  readonly line: Line
  readonly events: ProductionEvent[] = []
  readonly #catchUp: CatchUp
  #gone = false

  constructor(
    readonly person: Person,
    readonly place: Place,
    transport: Transport = 'websocket',
  ) {
    this.line = new Line(person.client.url, { cookie: person.cookie, transport, reconnection: true })
    this.#catchUp = new CatchUp({
      after: 0,
      deliver: (event) => this.events.push(event),
      fetchAfter: async (after) => {
        const answer = await person.client.get<EventsAnswer>(`/api/productions/${place.production}/events?after=${after}`)
        if (answer.status !== 200) throw new Error(`Events answered ${answer.status}.`)
        return answer.body
      },
    })
    // As the page does: follow again on every connect, then ask for what was missed.
    this.line.socket.on('connect', () => void this.#follow())
    this.line.socket.on('event', ({ n }) => void this.#keepAsking(() => this.#catchUp.hear(n)))
    onTestFinished(() => {
      this.#gone = true
      this.#catchUp.stop()
    })
  }

  async open(): Promise<this> {
    await this.line.open()
    return this
  }
  /** Comments in the order in which this reader was given them. */
  get comments(): Comment[] {
    return this.events.flatMap(({ comment }) => comment ?? [])
  }

  async startThread(body: string): Promise<Thread> {
    const path = `/api/productions/${this.place.production}/shots/${this.place.shot}/threads`
    const comment = { clientId: uuid(), body }
    const answer = await this.person.client.post<Thread>(path, { clientId: uuid(), fromFrame: 37, toFrame: 37, comment })
    if (answer.status !== 201) throw new Error(`The thread was answered ${answer.status}: ${JSON.stringify(answer.body)}`)
    return answer.body
  }

  /**
   * Sends until answered for. `lose` says before each attempt whether its answer gets lost on the way: after so many
   * milliseconds, or not at all (null). @returns the comment as the server holds it, and how often it was sent.
   */
  async say(thread: string, body: string, lose: () => number | null = () => null): Promise<{ comment: Comment; sent: number }> {
    const { production, shot } = this.place
    const path = `${this.person.client.url}/api/productions/${production}/shots/${shot}/threads/${thread}/comments`
    const text = JSON.stringify({ clientId: uuid(), body })
    for (let sent = 1; ; sent += 1) {
      const lostAfter = lose()
      try {
        const answer = await fetch(path, {
          method: 'POST',
          body: text,
          headers: { 'content-type': 'application/json', origin: this.person.client.url, cookie: this.person.cookie },
          signal: AbortSignal.timeout(lostAfter ?? 10_000),
        })
        const comment = (await answer.json()) as Comment
        if (answer.status === 200 || answer.status === 201) return { comment, sent }
        if (answer.status < 500) throw new Refused(`${answer.status}: ${JSON.stringify(comment)}`)
      } catch (problem) {
        if (problem instanceof Refused || this.#gone) throw problem
      }
      await pause(20)
    }
  }

  async #follow(): Promise<void> {
    await this.#keepAsking(async () => {
      const answer = await this.line.watch(this.place.production)
      if (!answer.ok) throw new Error(answer.message)
      await this.#catchUp.run()
    })
  }
  /** A failed question is asked again while the line stands; when it does not, the next connect asks. */
  async #keepAsking(ask: () => Promise<void>): Promise<void> {
    while (!this.#gone && this.line.socket.connected) {
      try {
        return await ask()
      } catch {
        await pause(50)
      }
    }
  }
}
class Refused extends Error {}

/** Whole numbers from 0 up to `below`, the same for the same seed. */
export function seeded(seed: number): (below: number) => number {
  let state = seed >>> 0
  return (below) => {
    state = (state + 0x6d2b79f5) >>> 0
    let mixed = Math.imul(state ^ (state >>> 15), state | 1)
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61)
    return Math.floor((((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32) * below)
  }
}
