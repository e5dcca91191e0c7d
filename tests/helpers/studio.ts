import { openDatabase, closeDatabase, rows, run } from '~/server/models/database'
import type { MadeLink, SessionAnswer } from '~/utils/contracts/people'
import { anonymous } from './client'
import type { Client } from './client'

/** Passwords that nobody else uses; long enough that no rule about them can be met by accident. */
export const KEEPER = { name: 'Ingrid Vale', email: 'ingrid@harbour.example', password: 'lanterns over wet cobbles' }

/** For tests that sign many people in and out and are not about the cost of a hash: an eighth of it. */
export const CHEAP_HASH = { NUXT_HASH_SCRYPT_COST: '16384' }

/** An empty installation gets its first keeper, signed in. */
export async function makeFirstKeeper(url: string): Promise<Client> {
  const client = anonymous(url)
  const answer = await client.post<SessionAnswer>('/api/first-keeper', KEEPER)
  if (answer.status !== 201) throw new Error(`No first keeper: ${answer.status} ${JSON.stringify(answer.body)}`)
  return client
}

/** The secret of a one-use link: what stands behind the `#`. */
export const tokenOf = (made: MadeLink) => made.link.split('#')[1] ?? ''

let invited = 0

/** Somebody new, invited by the keeper and signed in with a browser of their own. */
export async function newColleague(keeper: Client, wanted: { keeper?: boolean; production?: string; role?: string } = {}) {
  invited += 1
  const email = `colleague-${invited}@harbour.example`
  const password = `gulls on mast number ${invited}`
  const made = await keeper.post<MadeLink>('/api/invitations', { email, name: `Colleague ${invited}`, ...wanted })
  if (made.status !== 201) throw new Error(`Not invited: ${made.status} ${JSON.stringify(made.body)}`)
  const client = anonymous(keeper.url)
  const answer = await client.post<SessionAnswer>('/api/invitations/accept', {
    token: tokenOf(made.body),
    name: `Colleague ${invited}`,
    password,
  })
  const me = answer.body.me
  if (answer.status !== 201 || !me) throw new Error(`Not accepted: ${answer.status} ${JSON.stringify(answer.body)}`)
  return { client, email, password, id: me.id }
}

/** Looks at (or bends) what the server has stored, beside the running server. */
export async function inStore<T>(dataDir: string, task: (store: { rows: typeof rows; run: typeof run }) => Promise<T>): Promise<T> {
  await openDatabase(dataDir)
  try {
    return await task({ rows, run })
  } finally {
    await closeDatabase()
  }
}
