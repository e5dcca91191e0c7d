/**
 * Who may do what: the one table. Every route, every socket event and every screen asks it;
 * whatever it does not grant is denied. A person who is not a member is told 404, never 403.
 */

export const roles = ['guest', 'animator', 'supervisor', 'coordinator'] as const
export type Role = (typeof roles)[number]

/** What is known about the thing acted on. A fact that is not stated counts as false. */
export interface Facts {
  /** The shot's animator is the person asking. */
  ownShot?: boolean
  /** The person asking posted the take. */
  ownTake?: boolean
  /** The person asking started the thread. */
  ownThread?: boolean
  /** The take has a ruling. */
  takeRuled?: boolean
  /** Some take of the shot has been ruled on. */
  shotRuled?: boolean
}

type Rule = true | ((facts: Facts) => boolean)

const everyone = { guest: true, animator: true, supervisor: true, coordinator: true } as const
const ownUnruledTake = (facts: Facts) => facts.ownTake === true && facts.takeRuled !== true
const ownThread = (facts: Facts) => facts.ownThread === true

export const permissions = {
  'production.see': everyone,
  'comment.write': everyone,
  'thread.settle': { guest: ownThread, animator: ownThread, supervisor: ownThread, coordinator: ownThread },
  'take.post': { animator: (facts: Facts) => facts.ownShot === true, supervisor: true },
  'take.takeBack': { animator: ownUnruledTake, supervisor: ownUnruledTake },
  'take.flag': { supervisor: true },
  'finding.waive': { supervisor: true },
  'take.rule': { supervisor: (facts: Facts) => facts.ownTake !== true },
  'shot.reopen': { supervisor: true },
  'claim.set': {
    animator: (facts: Facts) => facts.ownShot === true && facts.shotRuled !== true,
    supervisor: true,
  },
  'shot.plan': { supervisor: true, coordinator: true },
  'members.manage': { supervisor: true, coordinator: true },
} as const satisfies Record<string, Partial<Record<Role, Rule>>>

export type Action = keyof typeof permissions

/** True when the table grants `action` to `role` on a thing of which `facts` hold. */
export function may(role: Role | null | undefined, action: Action, facts: Facts = {}): boolean {
  if (!role) return false
  const rules: Partial<Record<Role, Rule>> = permissions[action]
  // Own properties only: a role named like something on Object.prototype must grant nothing.
  const rule = Object.hasOwn(rules, role) ? rules[role] : undefined
  return rule === true || (typeof rule === 'function' && rule(facts) === true)
}

/** What a route asks before it acts: nobody in particular, someone signed in, a keeper, or an action of the table. */
export type Need = 'anyone' | 'signed-in' | 'keeper' | Action


/** Every route there is. A handler without an entry does not compile; a file without one fails the suite. */
export const routes = {
  'GET /api/health': 'anyone',
  'GET /api/session': 'anyone',
  'POST /api/session': 'anyone',
  'DELETE /api/session': 'anyone',
  'POST /api/first-keeper': 'anyone',
  'POST /api/resets': 'anyone',
  'POST /api/resets/use': 'anyone',
  'POST /api/invitations/look': 'anyone',
  'POST /api/invitations/accept': 'anyone',

  'PATCH /api/me': 'signed-in',
  'POST /api/me/email': 'signed-in',
  'POST /api/me/password': 'signed-in',
  'GET /api/me/sessions': 'signed-in',
  'DELETE /api/me/sessions/:session': 'signed-in',
  'GET /api/productions': 'signed-in',
  'POST /api/check': 'signed-in',

  'POST /api/productions': 'keeper',
  'GET /api/accounts': 'keeper',
  'PATCH /api/accounts/:person': 'keeper',
  'DELETE /api/accounts/:person/sessions': 'keeper',
  'POST /api/accounts/:person/reset': 'keeper',
  'GET /api/invitations': 'keeper',
  'POST /api/invitations': 'keeper',
  'DELETE /api/invitations/:invitation': 'keeper',
  'GET /api/letters': 'keeper',
  'GET /api/letters/:letter': 'keeper',
  'POST /api/letters/:letter/send': 'keeper',

  'GET /api/productions/:production': 'production.see',
  'GET /api/productions/:production/wall': 'production.see',
  'GET /api/productions/:production/wall/:code': 'production.see',
  'GET /api/productions/:production/events': 'production.see',
  'GET /api/productions/:production/members': 'production.see',
  'POST /api/productions/:production/members': 'members.manage',
  'PATCH /api/productions/:production/members/:person': 'members.manage',
  'DELETE /api/productions/:production/members/:person': 'members.manage',
  'POST /api/productions/:production/sequences': 'shot.plan',
  'PATCH /api/productions/:production/sequences/:sequence': 'shot.plan',
  'POST /api/productions/:production/shots': 'shot.plan',
  'GET /api/productions/:production/shots/:code': 'production.see',
  'PATCH /api/productions/:production/shots/:code': 'shot.plan',
  'PUT /api/productions/:production/shots/:code/claim': 'claim.set',
  'POST /api/productions/:production/shots/:code/reopen': 'shot.reopen',
  'POST /api/productions/:production/shots/:code/takes': 'take.post',
  'GET /api/productions/:production/shots/:code/takes/:number': 'production.see',
  'DELETE /api/productions/:production/shots/:code/takes/:number': 'take.takeBack',
  'POST /api/productions/:production/shots/:code/takes/:number/flags': 'take.flag',
  'DELETE /api/productions/:production/shots/:code/takes/:number/flags/:flag': 'take.flag',
  'POST /api/productions/:production/shots/:code/takes/:number/waivers': 'finding.waive',
  'DELETE /api/productions/:production/shots/:code/takes/:number/waivers/:waiver': 'finding.waive',
  'POST /api/productions/:production/shots/:code/takes/:number/rulings': 'take.rule',
  'POST /api/productions/:production/shots/:code/threads': 'comment.write',
  'POST /api/productions/:production/shots/:code/threads/:thread/comments': 'comment.write',
  'PATCH /api/productions/:production/shots/:code/threads/:thread': 'thread.settle',
} as const satisfies Record<string, Need>

export type RouteName = keyof typeof routes

/** Every event that a client may send over the socket. `watch` follows a production, `look` says which shot is on screen. */
export const socketEvents = {
  watch: 'production.see',
  look: 'production.see',
} as const satisfies Record<string, Action>

export type SocketEvent = keyof typeof socketEvents
