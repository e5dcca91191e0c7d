import { z } from 'zod'
import { roles } from '../permissions'
import { clientId, email, line, linkToken, LIMITS, offeredPassword, password, serverId, slug, version } from './common'
import type { Time } from './common'
import type { Role } from '../permissions'

export const role = z.enum(roles)
/** Which rulings a person is written to about: all that concern them, only those on their own takes, or none. */
export const mailWishes = ['all', 'own-takes', 'none'] as const
export const mailWish = z.enum(mailWishes)
export type MailWish = (typeof mailWishes)[number]

export const signIn = z.strictObject({ email, password: offeredPassword })
export const firstKeeper = z.strictObject({ name: line(LIMITS.nameChars), email, password })
export const profileChange = z.strictObject({
  name: line(LIMITS.nameChars).optional(),
  mailWish: mailWish.optional(),
  version,
})
export const emailChange = z.strictObject({ email, currentPassword: offeredPassword })
export const passwordChange = z.strictObject({
  currentPassword: offeredPassword,
  password,
  endOtherSessions: z.boolean().default(true),
})
export const resetRequest = z.strictObject({ email })
export const resetUse = z.strictObject({ token: linkToken, password })
export const linkLook = z.strictObject({ token: linkToken })
export const invitationAccept = z.strictObject({ token: linkToken, name: line(LIMITS.nameChars), password })
export const invitation = z
  .strictObject({
    email,
    name: line(LIMITS.nameChars),
    keeper: z.boolean().default(false),
    production: slug.optional(),
    role: role.optional(),
  })
  .refine((value) => (value.production === undefined) === (value.role === undefined), {
    path: ['role'],
    message: 'A production and a role go together.',
  })
export const accountChange = z.strictObject({
  disabled: z.boolean().optional(),
  keeper: z.boolean().optional(),
  version,
})
export const newProduction = z.strictObject({ slug, title: line(LIMITS.titleChars) })
export const newMember = z.strictObject({ email, role })
export const memberChange = z.strictObject({ role, version })
export const personParams = z.strictObject({ person: serverId })
export const sessionParams = z.strictObject({ session: serverId })
export const memberParams = z.strictObject({ production: slug, person: serverId })
export const invitationParams = z.strictObject({ invitation: serverId })
export { clientId }

/** As little of a person as a colleague needs. */
export interface PersonName {
  id: string
  name: string
}
export interface Membership {
  production: string
  title: string
  role: Role
}
/** Who is signed in, for the screens' own use. */
export interface Me {
  id: string
  name: string
  email: string
  keeper: boolean
  mailWish: MailWish
  version: number
  memberships: Membership[]
}
export interface SessionAnswer {
  me: Me | null
  /** True in a demo installation, which says so on every page. */
  demo: boolean
  /** True while an installation has no keeper yet. */
  empty: boolean
  /** Offered on the sign-in page of a demo installation only. */
  demoAccounts: { email: string; role: string; name: string; password: string }[]
}
export interface OwnSession {
  id: string
  createdAt: Time
  seenAt: Time
  device: string
  current: boolean
}
export interface Member extends PersonName {
  /** Null for those who may not manage the members. */
  email: string | null
  role: Role
  version: number
  disabled: boolean
}
export interface Account extends PersonName {
  email: string
  keeper: boolean
  disabled: boolean
  createdAt: Time
  seenAt: Time | null
  version: number
  memberships: Membership[]
}
export interface InvitationRow {
  id: string
  kind: 'invitation' | 'reset'
  email: string
  name: string
  createdAt: Time
  expiresAt: Time
}
/** The address with the secret in its fragment: shown to the keeper this once. */
export interface MadeLink {
  invitation: InvitationRow
  link: string
}
/** What a link that still works is for, and whom. */
export interface LinkAnswer {
  kind: 'invitation' | 'reset'
  email: string
  name: string
}
