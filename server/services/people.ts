import { Setting } from '~/server/models'
import { row, rows } from '~/server/models/database'
import { fail } from '~/server/utils/fail'
import { DEMO_PASSWORD } from './demo/people'
import type { Me, MailWish, Membership, SessionAnswer } from '~/utils/contracts/people'

/** What screens are told about the person signed in, and about the installation before anybody is. */

/** Offered on a demo installation's sign-in page; no other installation has an account that anybody could know. */
const DEMO_ACCOUNTS = ['animator', 'supervisor', 'coordinator', 'guest', 'keeper'] as const

export async function membershipsOf(personId: string): Promise<Membership[]> {
  return rows<Membership>(
    `SELECT productions.slug AS production, productions.title, memberships.role
       FROM memberships JOIN productions ON productions.id = memberships.production_id
      WHERE memberships.person_id = :personId ORDER BY productions.title, productions.slug`,
    { personId },
  )
}

/** @throws 401 when the account has gone meanwhile. */
export async function meOf(personId: string): Promise<Me> {
  const person = await row<{ id: string; name: string; email: string; keeper: number; mailWish: MailWish; version: number }>(
    `SELECT id, name, email, keeper, mail_wish AS mailWish, version FROM people
      WHERE id = :personId AND disabled_at IS NULL`,
    { personId },
  )
  if (!person) return fail(401, 'Sign in first.')
  return { ...person, keeper: person.keeper === 1, memberships: await membershipsOf(personId) }
}

export async function isDemo(): Promise<boolean> {
  return (await Setting.findByPk('demo'))?.value === '1'
}

/** Has nobody ever been made keeper here? A demo installation is never empty. */
export async function isEmpty(): Promise<boolean> {
  const found = await row<{ keepers: number }>('SELECT count(*) AS keepers FROM people WHERE keeper = 1')
  return found?.keepers === 0 && !(await isDemo())
}

/** @param personId who is signed in, null for nobody */
export async function sessionAnswer(personId: string | null): Promise<SessionAnswer> {
  const demo = await isDemo()
  return {
    me: personId === null ? null : await meOf(personId),
    demo,
    empty: await isEmpty(),
    demoAccounts: demo ? await demoAccounts() : [],
  }
}

async function demoAccounts(): Promise<SessionAnswer['demoAccounts']> {
  const found = await rows<{ email: string; name: string }>(
    'SELECT email, name FROM people WHERE email IN (:emails) AND disabled_at IS NULL AND password_hash IS NOT NULL',
    { emails: DEMO_ACCOUNTS.map((account) => `${account}@quayside.example`) },
  )
  return DEMO_ACCOUNTS.flatMap((role) => {
    const account = found.find(({ email }) => email.startsWith(`${role}@`))
    return account ? [{ ...account, role, password: DEMO_PASSWORD }] : []
  })
}
