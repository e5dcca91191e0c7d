import { z } from 'zod'

// Pages forbid making code from text, and report even the attempt: in a browser, schemas do without. Every file of schemas
// imports this one, so that it is said before the first of them is made.
if (typeof window !== 'undefined') z.config({ jitless: true })

/** Sizes that both sides of the wire keep to. Characters, unless a name says otherwise. */
export const LIMITS = {
  nameChars: 80,
  titleChars: 120,
  briefChars: 4_000,
  noteChars: 4_000,
  reasonChars: 1_000,
  commentChars: 4_000,
  emailChars: 254,
  passwordMinChars: 10,
  passwordMaxChars: 200,
  bodyBytes: 512 * 1024,
  shotsPerProduction: 2_000,
} as const

// Tab, line feed and carriage return are the only control characters that prose may carry.
const CONTROL_IN_LINE = /[\u0000-\u001F\u007F-\u009F\u2028\u2029]/
const CONTROL_IN_PROSE = /[\u0000-\u0008\u000B\u000C\u000E-\u001F\u007F-\u009F]/
/** Turn the reading direction of whatever stands after them on the same line: another's words, a file's ending. */
const TURNS_THE_LINE = /[\u202A-\u202E\u2066-\u2069]/
/** Half a character: no store and no mail could keep it, so it would come back as something else. */
const HALF_CHARACTER = /\p{Surrogate}/u
const SEEN = /[^\p{White_Space}\p{Control}\p{Default_Ignorable_Code_Point}]/u

const isWhole = (text: string) => !HALF_CHARACTER.test(text)
const NOT_WHOLE = 'Half a character stands here, perhaps of an emoji that was cut in two.'
/** Nothing, or something that can be seen: a name of invisible characters is nobody's. */
const isEmptyOrSeen = (text: string) => text === '' || SEEN.test(text)
const NOTHING_SEEN = 'Write something here.'

/** One line of text: trimmed, no control characters (so nothing can start a new mail header). */
export const line = (max: number, min = 1) =>
  z
    .string()
    .trim()
    .min(min, min === 1 ? 'Write something here.' : `At least ${min} characters.`)
    .max(max, `At most ${max} characters.`)
    .refine((text) => !CONTROL_IN_LINE.test(text), 'Control characters and line breaks are not allowed here.')
    .refine((text) => !TURNS_THE_LINE.test(text), 'Marks that turn the reading direction are not allowed here.')
    .refine(isWhole, NOT_WHOLE)
    .refine(isEmptyOrSeen, NOTHING_SEEN)

/** Several lines of text, markdown source included. Kept as written apart from surrounding space. */
export const prose = (max: number, min = 0) =>
  z
    .string()
    .trim()
    .min(min, 'Write something here.')
    .max(max, `At most ${max} characters.`)
    .refine((text) => !CONTROL_IN_PROSE.test(text), 'Control characters are not allowed here.')
    .refine(isWhole, NOT_WHOLE)
    .refine(isEmptyOrSeen, NOTHING_SEEN)

/** An id that the client makes, so that sending the same thing twice stores it once. */
export const clientId = z.uuid('An id is a UUID.')
export const serverId = z.uuid('An id is a UUID.')
export const email = z
  .string()
  .trim()
  .toLowerCase()
  .max(LIMITS.emailChars, `At most ${LIMITS.emailChars} characters.`)
  .pipe(z.email('This is not a mail address.'))
export const password = z
  .string()
  .min(LIMITS.passwordMinChars, `At least ${LIMITS.passwordMinChars} characters.`)
  .max(LIMITS.passwordMaxChars, `At most ${LIMITS.passwordMaxChars} characters.`)
  // Every half character hashes alike, so that two different passwords would open the same door.
  .refine(isWhole, NOT_WHOLE)
/** A password offered for checking: any length that could ever have been set, so that old rules still sign in. */
export const offeredPassword = z.string().min(1, 'Write your password.').max(LIMITS.passwordMaxChars)
export const slug = z
  .string()
  .regex(/^[a-z0-9](?:[a-z0-9-]{0,38}[a-z0-9])?$/, 'Small letters, digits and hyphens, at most 40.')
export const sequenceCode = z.string().regex(/^[A-Z0-9]{1,8}$/, 'Capital letters and digits, at most 8.')
/** Small letters are taken for the capital ones: nobody should have to hold Shift to follow a shot. */
export const shotCode = z
  .string()
  .toUpperCase()
  .regex(/^[A-Z0-9]{1,8}(?:-[A-Z0-9]{1,8}){0,2}$/, 'Capital letters, digits and hyphens, like CLK-110.')
export const frame = z.number().int('A frame is a whole number.').min(-1_000_000).max(10_000_000)
export const day = z.iso.date('A date as year-month-day.')
export const version = z.number().int().min(1)
/** The secret part of an invitation or reset link: 256 bits in base64url. */
export const linkToken = z.string().regex(/^[A-Za-z0-9_-]{43}$/, 'This link is not whole.')

/** What every refusal looks like on the wire. */
export interface Refusal {
  statusCode: number
  message: string
  data?: { issues?: Issue[]; current?: unknown }
}
export interface Issue {
  path: string
  message: string
}
/** Times cross the wire as ISO 8601 strings in UTC, days as `YYYY-MM-DD`. */
export type Time = string
export type Day = string
