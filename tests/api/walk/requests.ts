import { v4 } from 'uuid'
import type { RouteName } from '~/utils/permissions'
import { emailOf, fall, fallClaim, SEED_PASSWORD } from '../../helpers/seed'
import type { House } from '../../helpers/seed'
import { newInvitation, newLetter, newMemberOf, newPerson, newSession } from './people'
import type { Asker, Scene } from './scenes'

export interface Prepared {
  /** What stands for `:production` and so on in the route's name. */
  parts?: Record<string, string | number>
  body?: unknown
  /** The status where the asker may pass. */
  passes: number
}
type Prepare = (at: { house: House; asker: Asker; scene: Scene }) => Prepared | Promise<Prepared>

const TOKEN = 'A'.repeat(43)
const missing = v4()
const self = ({ people }: House, asker: Asker) => (asker === 'signedOut' ? null : people[asker])

const inProduction = (rest: (at: { house: House; asker: Asker; scene: Scene }) => Prepared | Promise<Prepared>): Prepare =>
  async (at) => {
    const { parts, ...prepared } = await rest(at)
    return { ...prepared, parts: { production: at.house.production.slug, ...parts } }
  }
const onShot = (rest: (scene: Scene) => Prepared) =>
  inProduction(({ scene }) => {
    const { parts, ...prepared } = rest(scene)
    return { ...prepared, parts: { code: scene.shot.code, number: scene.take.number, thread: scene.thread.id, ...parts } }
  })

/** One well-formed request for every route there is, on things that are really there. A route without one does not compile. */
export const requests: Record<RouteName, Prepare> = {
  'GET /api/health': () => ({ passes: 200 }),
  'GET /api/session': () => ({ passes: 200 }),
  'POST /api/session': ({ asker }) => ({
    body: { email: emailOf(asker === 'signedOut' ? 'guest' : asker), password: SEED_PASSWORD },
    passes: 200,
  }),
  'DELETE /api/session': () => ({ passes: 200 }),
  // The house has a keeper, and these links never were: that is said, but nobody is refused for who they are.
  'POST /api/first-keeper': () => ({ body: { name: 'Late', email: 'late@pier.example', password: SEED_PASSWORD }, passes: 409 }),
  'POST /api/resets': () => ({ body: { email: 'nobody@pier.example' }, passes: 202 }),
  'POST /api/resets/use': () => ({ body: { token: TOKEN, password: SEED_PASSWORD }, passes: 410 }),
  'POST /api/invitations/look': () => ({ body: { token: TOKEN }, passes: 410 }),
  'POST /api/invitations/accept': () => ({ body: { token: TOKEN, name: 'Late', password: SEED_PASSWORD }, passes: 410 }),

  'PATCH /api/me': async ({ house, asker }) => {
    const person = await self(house, asker)?.reload()
    return { body: { name: person?.name ?? 'Nobody', version: person?.version ?? 1 }, passes: 200 }
  },
  'POST /api/me/email': () => ({ body: { email: 'new@pier.example', currentPassword: 'not the password' }, passes: 422 }),
  'POST /api/me/password': () => ({ body: { currentPassword: 'not the password', password: SEED_PASSWORD }, passes: 422 }),
  'GET /api/me/sessions': () => ({ passes: 200 }),
  'DELETE /api/me/sessions/:session': async ({ house, asker }) => {
    const person = self(house, asker)
    return { parts: { session: person ? (await newSession(person)).id : missing }, passes: 200 }
  },
  'GET /api/productions': () => ({ passes: 200 }),
  'POST /api/check': () => ({ body: { ...fallClaim, fps: 24, keys: fall() }, passes: 200 }),

  'POST /api/productions': () => ({ body: { slug: `p-${v4().slice(0, 8)}`, title: 'Another' }, passes: 201 }),
  'GET /api/accounts': () => ({ passes: 200 }),
  'PATCH /api/accounts/:person': async () => ({ parts: { person: (await newPerson()).id }, body: { disabled: true, version: 1 }, passes: 200 }),
  'DELETE /api/accounts/:person/sessions': async () => ({ parts: { person: (await newPerson()).id }, passes: 200 }),
  'POST /api/accounts/:person/reset': async () => ({ parts: { person: (await newPerson()).id }, passes: 201 }),
  'GET /api/invitations': () => ({ passes: 200 }),
  'POST /api/invitations': () => ({ body: { email: `${v4()}@pier.example`, name: 'Invited' }, passes: 201 }),
  'DELETE /api/invitations/:invitation': async () => ({ parts: { invitation: (await newInvitation()).id }, passes: 200 }),
  'GET /api/letters': () => ({ passes: 200 }),
  'GET /api/letters/:letter': async () => ({ parts: { letter: (await newLetter()).id }, passes: 200 }),
  // The letter's one-use link is gone: it can't be sent again, which is no refusal of the keeper.
  'POST /api/letters/:letter/send': async () => ({ parts: { letter: (await newLetter()).id }, passes: 409 }),

  'GET /api/productions/:production': inProduction(() => ({ passes: 200 })),
  'GET /api/productions/:production/wall': inProduction(() => ({ passes: 200 })),
  'GET /api/productions/:production/wall/:code': onShot(() => ({ passes: 200 })),
  'GET /api/productions/:production/events': inProduction(() => ({ passes: 200 })),
  'GET /api/productions/:production/members': inProduction(() => ({ passes: 200 })),
  'POST /api/productions/:production/members': inProduction(async () => ({
    body: { email: (await newPerson()).email, role: 'guest' },
    passes: 201,
  })),
  'PATCH /api/productions/:production/members/:person': inProduction(async ({ house }) => ({
    parts: { person: (await newMemberOf(house, 'guest')).id },
    body: { role: 'animator', version: 1 },
    passes: 200,
  })),
  'DELETE /api/productions/:production/members/:person': inProduction(async ({ house }) => ({
    parts: { person: (await newMemberOf(house, 'guest')).id },
    passes: 204,
  })),
  'POST /api/productions/:production/sequences': inProduction(() => ({
    body: { code: v4().slice(0, 8).toUpperCase(), title: 'One more' },
    passes: 201,
  })),
  'PATCH /api/productions/:production/sequences/:sequence': inProduction(({ house }) => ({
    parts: { sequence: house.sequence.code },
    body: { title: `The pier ${v4()}` },
    passes: 200,
  })),
  'POST /api/productions/:production/shots': inProduction(() => ({
    body: {
      clientId: v4(), code: `NEW-${v4().slice(0, 8).toUpperCase()}`, title: 'New', sequence: 'PIR', firstFrame: 1, lastFrame: 9, fps: 24,
    },
    passes: 201,
  })),
  'GET /api/productions/:production/shots/:code': onShot(() => ({ passes: 200 })),
  'PATCH /api/productions/:production/shots/:code': onShot(({ shot }) => ({ body: { title: 'Renamed', version: shot.version }, passes: 200 })),
  'PUT /api/productions/:production/shots/:code/claim': onShot(({ shot }) => ({
    body: { claim: fallClaim, version: shot.version },
    passes: 200,
  })),
  'POST /api/productions/:production/shots/:code/reopen': onShot(({ shot }) => ({
    body: { reason: 'The edit changed.', version: shot.version },
    // There is no ruling on it.
    passes: 409,
  })),
  'POST /api/productions/:production/shots/:code/takes': onShot(() => ({ body: { clientId: v4(), keys: fall() }, passes: 201 })),
  'GET /api/productions/:production/shots/:code/takes/:number': onShot(() => ({ passes: 200 })),
  'DELETE /api/productions/:production/shots/:code/takes/:number': onShot(() => ({ passes: 200 })),
  'POST /api/productions/:production/shots/:code/takes/:number/flags': onShot(() => ({
    body: { clientId: v4(), fromFrame: 1011, toFrame: 1015, reason: 'Too far.' },
    passes: 201,
  })),
  'DELETE /api/productions/:production/shots/:code/takes/:number/flags/:flag': onShot(({ flag }) => ({ parts: { flag: flag.id }, passes: 204 })),
  'POST /api/productions/:production/shots/:code/takes/:number/waivers': onShot(() => ({
    body: { clientId: v4(), finding: { kind: 'misplaced', frames: [1015] }, reason: 'Meant.' },
    // The scene has it waived already.
    passes: 409,
  })),
  'DELETE /api/productions/:production/shots/:code/takes/:number/waivers/:waiver': onShot(({ waiver }) => ({
    parts: { waiver: waiver.id },
    passes: 204,
  })),
  'POST /api/productions/:production/shots/:code/takes/:number/rulings': onShot(({ shot, ruled }) => ({
    body: { clientId: v4(), decision: 'stands', version: shot.version },
    passes: ruled ? 409 : 201,
  })),
  'POST /api/productions/:production/shots/:code/threads': onShot(() => ({
    body: { clientId: v4(), take: 1, fromFrame: 1015, toFrame: 1015, comment: { clientId: v4(), body: 'Here.' } },
    passes: 201,
  })),
  'POST /api/productions/:production/shots/:code/threads/:thread/comments': onShot(() => ({
    body: { clientId: v4(), body: 'Because.' },
    passes: 201,
  })),
  'PATCH /api/productions/:production/shots/:code/threads/:thread': onShot(() => ({ body: { settled: true }, passes: 200 })),
}

/** `GET /api/x/:part` → the verb and the path with its parts filled in. @throws for a part that was left out */
export function filled(name: RouteName, parts: Record<string, string | number> = {}): { verb: string; path: string } {
  const [verb = '', pattern = ''] = name.split(' ')
  const path = pattern.replace(/:(\w+)/g, (_, part: string) => {
    const value = parts[part]
    if (value === undefined) throw new Error(`${name}: nothing stands for :${part}.`)
    return encodeURIComponent(value)
  })
  return { verb, path }
}
