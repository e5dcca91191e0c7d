import { randomUUID, createHash, randomBytes } from 'node:crypto'
import { IncomingMessage, ServerResponse } from 'node:http'
import { Socket } from 'node:net'
import { join } from 'node:path'
import { createEvent, useSession } from 'h3'
import sqlite3 from 'sqlite3'
import { sessionSecret } from '../../scripts/lib/data.mjs'
import type { Role } from '~/utils/permissions'
import { anonymous } from '../helpers/client'
import type { Client } from '../helpers/client'
import type { TestServer } from '../helpers/server'

/**
 * Puts people, productions and sessions straight into the database of a running server: the suite is about what happens
 * after somebody signed in, and hashing a password for each of dozens of clients would take most of its time.
 */
export class House {
  readonly #database: sqlite3.Database

  constructor(private readonly server: TestServer) {
    this.#database = new sqlite3.Database(join(server.dataDir, 'tiltyard.sqlite'))
    this.#database.exec('PRAGMA busy_timeout = 5000; PRAGMA foreign_keys = ON;')
  }

  run(sql: string, ...values: (string | number | null)[]): Promise<void> {
    return new Promise((resolve, reject) =>
      this.#database.run(sql, values, (problem) => (problem ? reject(problem) : resolve())),
    )
  }
  rows<T>(sql: string, ...values: (string | number | null)[]): Promise<T[]> {
    return new Promise((resolve, reject) =>
      this.#database.all<T>(sql, values, (problem, found) => (problem ? reject(problem) : resolve(found))),
    )
  }
  close(): Promise<void> {
    return new Promise((resolve) => this.#database.close(() => resolve()))
  }

  /** A production with one sequence and some shots. @returns its row's id. */
  async production(slug: string, shots: string[] = []): Promise<string> {
    const id = randomUUID()
    const sequence = randomUUID()
    const at = new Date().toISOString()
    await this.run('INSERT INTO productions (id, slug, title, created_at) VALUES (?, ?, ?, ?)', id, slug, slug, at)
    await this.run(
      'INSERT INTO sequences (id, production_id, code, title, position) VALUES (?, ?, ?, ?, ?)',
      ...[sequence, id, 'PIR', 'Pier', 0],
    )
    for (const [position, code] of shots.entries())
      await this.run(
        `INSERT INTO shots (id, client_id, production_id, sequence_id, code, title, first_frame, last_frame, fps, position, created_at)
         VALUES (?, ?, ?, ?, ?, ?, 1, 100, 24, ?, ?)`,
        ...[randomUUID(), randomUUID(), id, sequence, code, `Shot ${code}`, position, at],
      )
    return id
  }

  /** Somebody new, a member of the given productions (ids), signed in. */
  async person(name: string, roles: Record<string, Role> = {}, keeper = false): Promise<Person> {
    const id = randomUUID()
    const at = new Date().toISOString()
    const email = `${name.toLowerCase().replaceAll(' ', '.')}.${id.slice(0, 8)}@pier.example`
    await this.run(
      // A hash that no password fits: they have an account, and come in by the session below.
      "INSERT INTO people (id, email, name, password_hash, keeper, created_at) VALUES (?, ?, ?, 'none', ?, ?)",
      ...[id, email, name, keeper ? 1 : 0, at],
    )
    for (const [production, role] of Object.entries(roles))
      await this.run(
        'INSERT INTO memberships (production_id, person_id, role, created_at) VALUES (?, ?, ?, ?)',
        ...[production, id, role, at],
      )
    return { id, name, email, ...(await this.session(id)) }
  }

  /** One more session of somebody, in another browser as it were. */
  async session(personId: string, { seenAt = new Date(), createdAt }: { seenAt?: Date; createdAt?: Date } = {}): Promise<SignedIn> {
    const id = randomUUID()
    const token = randomBytes(32).toString('base64url')
    await this.run(
      'INSERT INTO sessions (id, token_hash, person_id, created_at, seen_at) VALUES (?, ?, ?, ?, ?)',
      ...[id, createHash('sha256').update(token).digest('base64url'), personId, (createdAt ?? seenAt).toISOString(), seenAt.toISOString()],
    )
    const cookie = await sealedCookie(token, sessionSecret(this.server.dataDir))
    return { sessionId: id, cookie, client: anonymous(this.server.url, cookie) }
  }
}

export interface SignedIn {
  sessionId: string
  /** As a `Cookie` header carries it. */
  cookie: string
  client: Client
}
export interface Person extends SignedIn {
  id: string
  name: string
  email: string
}

/** The cookie that the server itself would have set for this token. */
export async function sealedCookie(token: string, password: string): Promise<string> {
  const request = new IncomingMessage(new Socket())
  const event = createEvent(request, new ServerResponse(request))
  const session = await useSession<{ secure: { token: string } }>(event, { password, name: 'tiltyard' })
  await session.update({ secure: { token } })
  const line = event.node.res.getHeader('set-cookie')
  return String(Array.isArray(line) ? line.at(-1) : line).split(';')[0] ?? ''
}
