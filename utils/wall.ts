import { laws } from './contracts/check'
import { desks } from './contracts/production'
import type { Desk, Sequence, Sheet } from './contracts/production'
import type { PersonName } from './contracts/people'
import type { Role } from './permissions'
import type { Law } from './motion/types'

/** What a person wants to see of a wall. It lives in the address, so that it can be sent to somebody. */
export const shows = ['everything', 'my-desk', 'breaks', 'threads', 'due'] as const
export type Show = (typeof shows)[number]

export interface WallFilter {
  show: Show
  mine: boolean
  desk: Desk | null
  person: string | null
  sequence: string | null
  law: Law | null
  words: string
}
/** Who is asking, as far as a filter needs to know. */
export interface Viewer {
  id: string
  role: Role
}
type Query = Record<string, unknown>

const oneOf = <T extends string>(allowed: readonly T[], value: unknown): T | null =>
  allowed.find((one) => one === value) ?? null
const text = (value: unknown) => (typeof value === 'string' ? value : '')

/** Reads a filter from an address; whatever makes no sense counts as not asked for. */
export function readFilter(query: Query): WallFilter {
  return {
    show: oneOf(shows, query.show) ?? 'everything',
    mine: query.mine === '1',
    desk: oneOf(desks, query.desk),
    person: text(query.person) || null,
    sequence: text(query.sequence) || null,
    law: oneOf(laws, query.law),
    words: text(query.words).slice(0, 100),
  }
}

/** The address of a filter: only what differs from "everything". */
export function writeFilter(filter: WallFilter): Record<string, string> {
  const { show, mine, desk, person, sequence, law, words } = filter
  return {
    ...(show === 'everything' ? {} : { show }),
    ...(mine ? { mine: '1' } : {}),
    ...(desk ? { desk } : {}),
    ...(person ? { person } : {}),
    ...(sequence ? { sequence } : {}),
    ...(law ? { law } : {}),
    ...(words ? { words } : {}),
  }
}

/** Is it this person's move? A shot without a supervisor waits for any of them. */
export function isOnDeskOf(sheet: Pick<Sheet, 'desk' | 'animator' | 'supervisor'>, viewer: Viewer): boolean {
  if (sheet.desk === 'animator') return sheet.animator?.id === viewer.id
  if (sheet.desk !== 'supervisor') return false
  return sheet.supervisor ? sheet.supervisor.id === viewer.id : viewer.role === 'supervisor'
}

const WEEK_MS = 7 * 24 * 60 * 60 * 1000
/** Due within a week or late already, and not settled. `today` is a day in UTC. */
export function isDueSoon(sheet: Pick<Sheet, 'desk' | 'dueOn'>, today: string): boolean {
  return sheet.desk !== 'settled' && sheet.dueOn !== null && Date.parse(sheet.dueOn) < Date.parse(today) + WEEK_MS
}

function showHolds(sheet: Sheet, show: Show, viewer: Viewer, today: string): boolean {
  switch (show) {
    case 'everything':
      return true
    case 'my-desk':
      return isOnDeskOf(sheet, viewer)
    case 'breaks':
      return sheet.sketch?.verdict === 'breaks'
    case 'threads':
      return sheet.openThreads > 0
    case 'due':
      return isDueSoon(sheet, today)
  }
}

function wordsHold(sheet: Sheet, words: string): boolean {
  const hay = [sheet.code, sheet.title, sheet.animator?.name, sheet.supervisor?.name].join('\n').toLocaleLowerCase('en')
  return words
    .toLocaleLowerCase('en')
    .split(/\s+/)
    .every((word) => hay.includes(word))
}

/** Does the sheet pass the filter? */
export function passes(sheet: Sheet, filter: WallFilter, viewer: Viewer, today: string): boolean {
  const concerns = (id: string) => sheet.animator?.id === id || sheet.supervisor?.id === id
  return (
    showHolds(sheet, filter.show, viewer, today) &&
    (!filter.mine || concerns(viewer.id)) &&
    (!filter.desk || sheet.desk === filter.desk) &&
    (!filter.person || concerns(filter.person)) &&
    (!filter.sequence || sheet.sequence === filter.sequence) &&
    (!filter.law || sheet.claim?.law === filter.law) &&
    wordsHold(sheet, filter.words)
  )
}

/** Figures about a whole wall, so that the first paint need not carry every sheet. */
export interface Tally {
  desks: Record<Desk, number>
  shows: Record<Show, number>
  sequences: Record<string, { shots: number; settled: number; breaks: number; openThreads: number }>
  people: PersonName[]
  laws: Law[]
}

export function tally(sheets: readonly Sheet[], sequences: readonly Sequence[], viewer: Viewer, today: string): Tally {
  const count = (holds: (sheet: Sheet) => boolean) => sheets.filter(holds).length
  const people = new Map<string, PersonName>()
  for (const { animator, supervisor } of sheets)
    for (const person of [animator, supervisor]) if (person) people.set(person.id, person)
  return {
    desks: Object.fromEntries(desks.map((desk) => [desk, count((sheet) => sheet.desk === desk)])) as Tally['desks'],
    shows: Object.fromEntries(shows.map((show) => [show, count((sheet) => showHolds(sheet, show, viewer, today))])) as Tally['shows'],
    sequences: Object.fromEntries(
      sequences.map(({ code }) => {
        const own = sheets.filter((sheet) => sheet.sequence === code)
        return [
          code,
          {
            shots: own.length,
            settled: own.filter((sheet) => sheet.desk === 'settled').length,
            breaks: own.filter((sheet) => sheet.sketch?.verdict === 'breaks').length,
            openThreads: own.reduce((sum, sheet) => sum + sheet.openThreads, 0),
          },
        ]
      }),
    ),
    people: [...people.values()].sort((a, b) => (a.name < b.name ? -1 : 1)),
    laws: laws.filter((law) => sheets.some((sheet) => sheet.claim?.law === law)),
  }
}
