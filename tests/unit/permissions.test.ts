import { existsSync, readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { describe, expect, it } from 'vitest'
import { may, permissions, roles, routes, socketEvents } from '~/utils/permissions'
import type { Action, Facts, Role } from '~/utils/permissions'

/** The grid of product.md, "People and roles", written out a second time by hand. Words are explained below it. */
const grid: Record<Action, [guest: string, animator: string, supervisor: string, coordinator: string]> = {
  //                     guest         animator                        supervisor     coordinator
  'production.see':  ['yes',        'yes',                          'yes',          'yes'],
  'comment.write':   ['yes',        'yes',                          'yes',          'yes'],
  'thread.settle':   ['own thread', 'own thread',                   'own thread',   'own thread'],
  'take.post':       ['–',          'own shots',                    'yes',          '–'],
  'take.takeBack':   ['–',          'own, unruled',                 'own, unruled', '–'],
  'take.flag':       ['–',          '–',                            'yes',          '–'],
  'finding.waive':   ['–',          '–',                            'yes',          '–'],
  'take.rule':       ['–',          '–',                            'not own take', '–'],
  'shot.reopen':     ['–',          '–',                            'yes',          '–'],
  'claim.set':       ['–',          'own shots until first ruling', 'yes',          '–'],
  'shot.plan':       ['–',          '–',                            'yes',          'yes'],
  'members.manage':  ['–',          '–',                            'yes',          'yes'],
}
const words: Record<string, (facts: Facts) => boolean> = {
  'yes': () => true,
  '–': () => false,
  'own thread': ({ ownThread }) => ownThread === true,
  'own shots': ({ ownShot }) => ownShot === true,
  'own, unruled': ({ ownTake, takeRuled }) => ownTake === true && takeRuled !== true,
  'not own take': ({ ownTake }) => ownTake !== true,
  'own shots until first ruling': ({ ownShot, shotRuled }) => ownShot === true && shotRuled !== true,
}

const factNames = ['ownShot', 'ownTake', 'ownThread', 'takeRuled', 'shotRuled'] as const
/** Every combination of facts, left out as well as false. */
const everyFacts: Facts[] = Array.from({ length: 3 ** factNames.length }, (_, code) =>
  Object.fromEntries(factNames.flatMap((name, i) => {
    const digit = Math.floor(code / 3 ** i) % 3
    return digit === 0 ? [] : [[name, digit === 1]]
  })),
)

describe('the table of permissions is the grid of product.md (8.2.1)', () => {
  it('names the same actions and roles', () => {
    expect(Object.keys(permissions).sort()).toEqual(Object.keys(grid).sort())
    expect([...roles]).toEqual(['guest', 'animator', 'supervisor', 'coordinator'])
  })

  for (const [action, line] of Object.entries(grid) as [Action, string[]][])
    it(`${action}: ${roles.map((role, i) => `${role} ${line[i]}`).join(' · ')}`, () => {
      for (const [i, role] of roles.entries())
        for (const facts of everyFacts)
          expect(may(role, action, facts), `${role} with ${JSON.stringify(facts)}`).toBe(words[line[i]!]!(facts))
    })

  it('grants nothing to nobody, and to no role of its own invention', () => {
    const all = { ownShot: true, ownTake: true, ownThread: true }
    const invented = [null, undefined, '', 'keeper', 'admin', 'Supervisor', '__proto__', 'constructor', 'toString', 'hasOwnProperty']
    for (const role of invented)
      for (const action of Object.keys(permissions) as Action[])
        for (const facts of [{}, all]) expect(may(role as Role, action, facts), `${role} ${action}`).toBe(false)
  })

  it('takes only true for true: whatever else is handed in as a fact grants nothing', () => {
    for (const truthy of [1, 'yes', {}, [], 'false'])
      expect(may('animator', 'take.post', { ownShot: truthy as unknown as boolean }), String(truthy)).toBe(false)
  })
})

const root = fileURLToPath(new URL('../..', import.meta.url))
const verbs = ['get', 'post', 'put', 'patch', 'delete']

/** `shots/[code]/index.get.ts` → `GET /api/shots/:code`. */
function routeOf(file: string): string {
  const verb = verbs.find((one) => file.endsWith(`.${one}.ts`))
  if (!verb) return `a handler without a verb: ${file}`
  const path = file.slice(0, -`.${verb}.ts`.length).replace(/(?:^|\/)index$/, '').replace(/\[(\w+)\]/g, ':$1')
  return `${verb.toUpperCase()} /api/${path}`
}

const files = readdirSync(join(root, 'server/api'), { recursive: true, encoding: 'utf8' })
  .map((file) => file.replaceAll('\\', '/'))
  .filter((file) => file.endsWith('.ts') && file !== '[...].ts')

describe('every route has its rule', () => {
  it('each file of server/api stands in the table, and each entry of the table has its file', () => {
    expect(files.map(routeOf).sort()).toEqual(Object.keys(routes).sort())
  })

  it.each(files)('%s goes through the gates, under its own name', (file) => {
    const source = readFileSync(join(root, 'server/api', file), 'utf8')
    expect(source).toMatch(/^export default route\(/m)
    expect(source).toContain(`route('${routeOf(file)}'`)
    expect(source.match(/\bdefineEventHandler\b|\beventHandler\b|\bdefineLazyEventHandler\b/)).toBeNull()
  })

  it('no other folder answers requests behind the gates’ back', () => {
    const elsewhere = ['server/routes', 'server/handlers'].filter((folder) => existsSync(join(root, folder)))
    expect(elsewhere).toEqual([])
  })

  it('a route of a production asks an action of the table; a keeper’s route never lies inside one', () => {
    for (const [name, need] of Object.entries(routes)) {
      const inside = name.includes('/api/productions/:production')
      expect(Object.hasOwn(permissions, need), name).toBe(inside)
    }
  })

  it('every event that a socket may send asks an action of the table', () => {
    for (const [event, action] of Object.entries(socketEvents)) expect(Object.hasOwn(permissions, action), event).toBe(true)
    expect(Object.keys(socketEvents).sort()).toEqual(['look', 'watch'])
  })

  it('what needs nobody signed in is this list and no more', () => {
    const open = Object.entries(routes).filter(([, need]) => need === 'anyone').map(([name]) => name)
    expect(open.sort()).toEqual([
      'DELETE /api/session',
      'GET /api/health',
      'GET /api/session',
      'POST /api/first-keeper',
      'POST /api/invitations/accept',
      'POST /api/invitations/look',
      'POST /api/resets',
      'POST /api/resets/use',
      'POST /api/session',
    ])
  })
})
