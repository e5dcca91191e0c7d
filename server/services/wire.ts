import type { Production, Sequence, Shot, Take } from '~/server/models'
import type { PersonName } from '~/utils/contracts/people'
import type { Sequence as SequenceWire } from '~/utils/contracts/production'

/** Where something happens, and who does it. A route's `Ask` is one. */
export interface InProduction {
  readonly production: Production
  readonly person: PersonName
}
export interface OnShot extends InProduction {
  readonly shot: Shot
}
export interface OnTake extends OnShot {
  readonly take: Take
}

/** A name for the wire from joined columns; null where nobody stands there. */
export function named(id: string | null, name: string | null): PersonName | null {
  return id === null || name === null ? null : { id, name }
}

/** As `named`, for columns that a person always stands in. */
export const someone = (id: string, name: string): PersonName => ({ id, name })

/** Only what a colleague needs of who is asking: the session stays behind. */
export const asker = ({ id, name }: PersonName): PersonName => ({ id, name })

export const now = (): string => new Date().toISOString()

export const sequenceWire = ({ code, title, position }: SequenceWire | Sequence): SequenceWire => ({ code, title, position })
