import type { EventHandler, H3Event } from 'h3'
import { defineEventHandler, getRequestPath, setResponseHeader, setResponseStatus } from 'h3'
import type { z } from 'zod'
import { write } from '~/server/models/database'
import type { Production, Shot, Take, Thread } from '~/server/models'
import { may, routes } from '~/utils/permissions'
import type { Facts, Need, Role, RouteName } from '~/utils/permissions'
import { Failure, fail, forbidden } from './fail'
import { log } from './log'
import { isOwnOrigin } from './origin'
import { parseBody, parseParams, parseQuery } from './parse'
import { ready } from './ready'
import { factsOf, loadScope } from './scope'
import type { Scope } from './scope'
import { findPerson, requirePerson } from './session'
import type { Asker } from './session'

interface Spec<Params, Query, Body, Answer> {
  params?: z.ZodType<Params>
  query?: z.ZodType<Query>
  body?: z.ZodType<Body>
  /** Status of a good answer; 200 unless said. */
  status?: number
  /** False for what stores nothing or must not hold the writer while it hashes a password. */
  transaction?: boolean
  act: (ask: Ask<Params, Query, Body>) => Promise<Answer> | Answer
}

/** A request that has passed every gate. What its address does not name is a mistake of ours to ask for. */
export class Ask<Params = unknown, Query = unknown, Body = unknown> {
  constructor(
    readonly event: H3Event,
    private readonly asker: Asker | null,
    readonly params: Params,
    readonly query: Query,
    readonly body: Body,
    private readonly scope: Scope,
    /** What the table of permissions was told about the things in scope. */
    readonly facts: Facts,
  ) {}

  get person(): Asker {
    return this.asker ?? fail(401, 'Sign in first.')
  }
  /** Who is signed in, where a route is open to anyone. */
  get visitor(): Asker | null {
    return this.asker
  }
  get production(): Production {
    return known(this.scope.production)
  }
  get role(): Role {
    return known(this.scope.role)
  }
  get shot(): Shot {
    return known(this.scope.shot)
  }
  get take(): Take {
    return known(this.scope.take)
  }
  get thread(): Thread {
    return known(this.scope.thread)
  }
}

function known<T>(thing: T | undefined): T {
  if (thing === undefined) throw new Error('A handler asked for something that its address does not name.')
  return thing
}

/**
 * A route, with its gates in the order that engineering.md fixes: who is it (401), is the input well-formed (422),
 * may they see the thing (404), may they do this (403), act in one transaction. The name must stand in the table of
 * utils/permissions.ts, which also says what the route needs.
 */
export function route<Params = undefined, Query = undefined, Body = undefined, Answer = unknown>(
  name: RouteName,
  spec: Spec<Params, Query, Body, Answer>,
): EventHandler {
  const need = routes[name]
  const reads = name.startsWith('GET ')

  async function pass(event: H3Event): Promise<Answer> {
    await ready()
    if (!reads && !isOwnOrigin(event.node.req.headers)) fail(403, 'This request comes from another site.')
    const person = need === 'anyone' ? await findPerson(event) : await requirePerson(event)
    const params = spec.params ? parseParams(event, spec.params) : (undefined as Params)
    const query = spec.query ? parseQuery(event, spec.query) : (undefined as Query)
    const body = spec.body ? await parseBody(event, spec.body) : (undefined as Body)

    async function gatesAndAct(person: Asker | null): Promise<Answer> {
      const scope = person ? await loadScope(person, (params ?? {}) as object) : {}
      let facts: Facts = {}
      if (need === 'keeper') {
        // Who is no keeper learns nothing of these places.
        if (!person?.keeper) fail(404, 'There is nothing here.')
      } else if (need !== 'anyone' && need !== 'signed-in' && person) {
        facts = await factsOf(person, scope)
        if (!may(scope.role, need, facts)) refuse(name, person)
      }
      return spec.act(new Ask(event, person, params, query, body, scope, facts))
    }
    if (reads || spec.transaction === false) return gatesAndAct(person)
    // It may have waited for its turn: a session that ended meanwhile, or an account that was closed, writes nothing any more.
    return write(async () => gatesAndAct(person && (await findPersonAgain(event, need))))
  }

  return defineEventHandler(async (event) => {
    setResponseHeader(event, 'cache-control', 'no-store')
    try {
      const answer = await pass(event)
      if (spec.status) setResponseStatus(event, spec.status)
      return answer ?? null
    } catch (problem) {
      return refusal(event, problem)
    }
  })
}

async function findPersonAgain(event: H3Event, need: Need): Promise<Asker | null> {
  event.context.asker = undefined
  return need === 'anyone' ? findPerson(event) : requirePerson(event)
}

function refuse(name: RouteName, person: Asker): never {
  log.warn('refused', { route: name, person: person.id })
  return forbidden()
}

/** Turns whatever was thrown into the one shape of an answer. */
export function refusal(event: H3Event, problem: unknown) {
  if (problem instanceof Failure) {
    setResponseStatus(event, problem.statusCode)
    return problem.toWire()
  }
  log.error('request failed', {
    path: getRequestPath(event).split('?')[0],
    problem: problem instanceof Error ? `${problem.name}: ${problem.message}` : String(problem),
    stack: problem instanceof Error ? problem.stack : undefined,
  })
  setResponseStatus(event, 500)
  return { statusCode: 500, message: 'Something went wrong on our side. Nothing was stored; try again.' }
}
