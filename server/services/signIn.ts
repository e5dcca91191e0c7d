import type { H3Event } from 'h3'
import { getHeader } from 'h3'
import { Person } from '~/server/models'
import { run, write } from '~/server/models/database'
import { remoteAddress } from '~/server/utils/address'
import { deviceName } from '~/server/utils/device'
import { fail } from '~/server/utils/fail'
import { rememberBrowser } from '~/server/utils/knownBrowser'
import { admitSignIn } from '~/server/utils/limits'
import { log } from '~/server/utils/log'
import { fits, rehashed } from '~/server/utils/password'
import { startSession } from '~/server/utils/session'

// One sentence for every reason, so that nobody learns whether an address has an account here.
const refuse = (): never => fail(401, 'This address and password do not go together.')

/** Checks address and password and starts a session. @returns who signed in. @throws 401, 429 */
export async function signIn(event: H3Event, email: string, password: string): Promise<string> {
  const wasGood = await admitSignIn(event, email)
  const person = await Person.findOne({ where: { email } })
  const right = await fits(event, person?.passwordHash, password)
  if (!right || !person?.passwordHash || person.disabledAt !== null) {
    log.warn('sign-in refused', { person: person?.id ?? null, address: remoteAddress(event.node.req) })
    return refuse()
  }
  await wasGood()
  const old = person.passwordHash
  const better = await rehashed(event, old, password)
  await write(async () => {
    // Half a second has gone by: the password may be another one now, or the account closed.
    const same = await run('UPDATE people SET password_hash = :hash WHERE id = :id AND password_hash = :old AND disabled_at IS NULL', {
      hash: better ?? old,
      id: person.id,
      old,
    })
    if (same === 0) refuse()
    await openSession(event, person)
  })
  return person.id
}

/** A session for somebody who has just proved who they are, in this very request. */
export async function openSession(event: H3Event, person: { id: string; email: string }): Promise<void> {
  const address = remoteAddress(event.node.req)
  await startSession(event, person.id, deviceName(getHeader(event, 'user-agent')), address)
  rememberBrowser(event, person.email)
  log.info('signed in', { person: person.id, address })
}
