import type { Presence } from '~/utils/contracts/event'
import type { PersonName } from '~/utils/contracts/people'

interface Look {
  production: string
  shot: string
  person: PersonName
}
type Lookers = Presence['lookers']

/** Several people opening a page at once are one announcement, not several. */
const GATHER_MS = 100

/**
 * Who has which shot on screen, by socket. Kept in memory only: whoever is not connected is not looking.
 * `announce` hears of a production whose list has changed, at most once per GATHER_MS.
 */
export class PresenceBoard {
  readonly #looks = new Map<string, Look>()
  readonly #told = new Map<string, string>()
  readonly #waiting = new Map<string, NodeJS.Timeout>()

  constructor(private readonly announce: (presence: Presence) => void) {}

  /** The socket's person looks at a shot; null: at none. */
  set(socketId: string, look: Look | null): void {
    const before = this.#looks.get(socketId)
    if (look) this.#looks.set(socketId, look)
    else this.#looks.delete(socketId)
    if (before) this.#gather(before.production)
    if (look && look.production !== before?.production) this.#gather(look.production)
  }

  /** Each person once per shot, however many windows they have open; in a fixed order. */
  lookers(production: string): Lookers {
    const found = new Map<string, Lookers[number]>()
    for (const look of this.#looks.values()) {
      if (look.production !== production) continue
      found.set(`${look.shot} ${look.person.id}`, { person: look.person, shot: look.shot })
    }
    return [...found.entries()].sort(([a], [b]) => (a < b ? -1 : 1)).map(([, looker]) => looker)
  }

  close(): void {
    for (const timer of this.#waiting.values()) clearTimeout(timer)
    this.#waiting.clear()
  }

  #gather(production: string): void {
    if (this.#waiting.has(production)) return
    const tell = () => {
      this.#waiting.delete(production)
      const lookers = this.lookers(production)
      const text = JSON.stringify(lookers)
      if (text === (this.#told.get(production) ?? '[]')) return
      if (lookers.length > 0) this.#told.set(production, text)
      else this.#told.delete(production)
      this.announce({ production, lookers })
    }
    this.#waiting.set(production, setTimeout(tell, GATHER_MS))
  }
}
