import type { Flag, Person, Shot, Take, Thread, Waiver } from '~/server/models'
import { write } from '~/server/models/database'
import { may, permissions, routes } from '~/utils/permissions'
import type { Action, Facts, Role, RouteName } from '~/utils/permissions'
import { addFlag, addRuling, addShot, addTake, addThread, addWaiver } from '../../helpers/seed'
import type { Cast, House } from '../../helpers/seed'
import { newMemberOf } from './people'

export const askers = [
  'signedOut', 'guest', 'animator', 'otherAnimator', 'supervisor', 'otherSupervisor', 'coordinator', 'keeper', 'outsider',
] as const satisfies (Cast | 'signedOut')[]
export type Asker = (typeof askers)[number]

export interface Wish {
  label: string
  /** Everything in it is the asking person's own. */
  own: boolean
  /** The take has its ruling. */
  ruled: boolean
}
const plain: Wish = { label: 'of somebody else', own: false, ruled: false }
const wishes: Wish[] = [
  plain,
  { label: 'of their own', own: true, ruled: false },
  { label: 'of somebody else, ruled', own: false, ruled: true },
  { label: 'of their own, ruled', own: true, ruled: true },
]

/** The scenes in which the answer can differ: all four where a rule asks for facts, else one. */
export function scenesFor(name: RouteName): Wish[] {
  const need = routes[name]
  if (!Object.hasOwn(permissions, need)) return [plain]
  const rules = Object.values(permissions[need as Action])
  return rules.some((rule) => typeof rule === 'function') ? wishes : [plain]
}

/** One shot with everything a route could name, made afresh for one request. */
export interface Scene extends Wish {
  shot: Shot
  take: Take
  thread: Thread
  flag: Flag
  waiver: Waiver
}

/** In one transaction: a commit each would make the walk wait for the disk thousands of times. */
export function makeScene(house: House, asker: Asker, wish: Wish): Promise<Scene> {
  return write(() => build(house, asker, wish))
}

async function build(house: House, asker: Asker, wish: Wish): Promise<Scene> {
  const { people, production } = house
  const self = asker === 'signedOut' ? null : people[asker]
  // Nobody else's things are ever those of an asker: an extra person owns them.
  const other = await strangerOf(house)
  const owner = wish.own && self ? self : other
  const shot = await addShot(house, { animator: owner, supervisor: people.supervisor })
  const take = await addTake(shot, owner)
  const thread = await addThread(production, shot, owner, take)
  const flag = await addFlag(take, people.supervisor)
  const waiver = await addWaiver(take, people.supervisor)
  if (wish.ruled) await addRuling(take, people.supervisor)
  return { ...wish, shot, take, thread, flag, waiver }
}

const strangers = new WeakMap<House, Person>()
async function strangerOf(house: House): Promise<Person> {
  const known = strangers.get(house)
  if (known) return known
  const made = await newMemberOf(house, 'animator')
  strangers.set(house, made)
  return made
}

const roleOf: Record<Asker, Role | null> = {
  signedOut: null,
  guest: 'guest',
  animator: 'animator',
  otherAnimator: 'animator',
  supervisor: 'supervisor',
  otherSupervisor: 'supervisor',
  coordinator: 'coordinator',
  keeper: null,
  outsider: null,
}

/** The status that must refuse this asker, or null where the table lets them pass. */
export function refusalFor(name: RouteName, asker: Asker, { own, ruled }: Wish): 401 | 403 | 404 | null {
  const need = routes[name]
  if (need === 'anyone') return null
  if (asker === 'signedOut') return 401
  if (need === 'signed-in') return null
  if (need === 'keeper') return asker === 'keeper' ? null : 404
  const role = roleOf[asker]
  if (role === null) return 404
  const facts: Facts = { ownShot: own, ownTake: own, ownThread: own, takeRuled: ruled, shotRuled: ruled }
  return may(role, need, facts) ? null : 403
}
